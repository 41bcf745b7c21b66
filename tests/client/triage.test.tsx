// @vitest-environment happy-dom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { act, cleanup, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { Toaster } from 'sonner'
import type { ShortlistRow } from '../../shared/shortlists.ts'
import { caution } from '../../shared/caution.ts'
import { applyEvent } from '../../src/api/liveEvents.ts'
import { ShortlistPage } from '../../src/routes/shortlist/ShortlistPage.tsx'
import { renderPage } from './renderPage.tsx'
import { certification, key, row, shortlist, verdict } from './shortlistFixture.ts'
import { problem, Status, stubApi, type Call } from './stubApi.ts'

const path = '/campaigns/:campaignId/shortlists/:shortlistId'
const address = '/campaigns/c1/shortlists/l1'
const me = { id: 'a7', name: 'Ada Quill', email: 'ada@tests.example' }
let stop = () => {}

beforeEach(() => window.localStorage.clear())
afterEach(() => {
  stop()
  cleanup()
  vi.unstubAllGlobals()
})

function open(
  role: 'lead' | 'reviewer' | 'reader' = 'reviewer',
  rows: ShortlistRow[] = [row(1, -4.5), row(2, -4.9), row(3, -5.2)],
  answers: Record<string, unknown> = {},
  query = '',
) {
  const verdicts = Object.fromEntries(
    [1, 2, 3].map((n) => [
      `POST /campaigns/c1/candidates/${key(n)}/verdicts`,
      ({ body }: Call) => {
        const { value, reason } = body as { value: 'verified' | 'rejected'; reason: string }
        return { ...verdict(value, value === 'verified' && reason !== ''), id: String(100 + n) }
      },
    ]),
  )
  const calls = stubApi({
    'GET /campaigns/c1/shortlists/l1': shortlist(rows),
    'GET /campaigns/c1/certifications': [],
    'GET /campaigns/c1/rescorings': [],
    'GET /session': { account: me, version: '1' },
    'GET /campaigns/c1': { members: [] },
    'POST /campaigns/c1/certifications': ({ body }: Call) =>
      certification((body as { candidateKeys: string[] }).candidateKeys.length),
    ...verdicts,
    ...answers,
  })
  const page = renderPage(
    <>
      <ShortlistPage />
      <Toaster />
    </>,
    path,
    address + query,
    role,
  )
  stop = page.stopKeys
  return { ...page, calls, sent: () => calls.filter(({ method }) => method === 'POST') }
}
const inHand = () => screen.getByRole('group', { name: 'Candidate in hand' })

describe('triage of a shortlist', () => {
  it('shows candidates with their report columns and the caution', async () => {
    open()
    expect(await screen.findByRole('table', { name: 'Candidates' })).toBeTruthy()
    expect(screen.getByText(caution)).toBeTruthy()
    expect(screen.getByRole('button', { name: 'reach' })).toBeTruthy()
  })

  it('r rejects the candidate in hand and goes on to the next', async () => {
    const { sent, router } = open()
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('r')
    await waitFor(() => expect(router.state.location.search).toContain(`row=${key(2)}`))
    expect(sent()).toEqual([
      {
        method: 'POST',
        path: `/campaigns/c1/candidates/${key(1)}/verdicts`,
        body: { targetVersionId: 'tv1', value: 'rejected', reason: '' },
      },
    ])
    expect(await within(inHand()).findByText('Rank 2')).toBeTruthy()
    expect(screen.getAllByText('rejected').length).toBeGreaterThan(0)
  })

  it('v asks for a reason and does not send without one', async () => {
    const { sent } = open()
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('v')
    const dialog = await screen.findByRole('dialog', { name: 'Verify by override' })
    await userEvent.click(within(dialog).getByRole('button', { name: 'Verify by override' }))
    expect(within(dialog).getByText(/what was checked, and how/)).toBeTruthy()
    expect(sent()).toHaveLength(0)
    await userEvent.type(within(dialog).getByLabelText('Reason and evidence'), 'recomputed by hand')
    await userEvent.click(within(dialog).getByRole('button', { name: 'Verify by override' }))
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
    expect(sent()[0]?.body).toEqual({
      targetVersionId: 'tv1',
      value: 'verified',
      reason: 'recomputed by hand',
    })
    expect(await screen.findByText('verified by override')).toBeTruthy()
  })

  it('v decides at once on a passing certificate, without an override', async () => {
    const passed = { state: 'passed', id: 'z1' } as const
    const { sent } = open('reviewer', [row(1, -4.5, { certificate: passed }), row(2, -4.9)])
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('v')
    expect(await screen.findByText('verified')).toBeTruthy()
    expect(screen.queryByRole('dialog')).toBeNull()
    expect(sent()[0]?.body).toEqual({ targetVersionId: 'tv1', value: 'verified', reason: '' })
  })

  it('the dialog offers to certify, and turns when the certificate has come', async () => {
    const { sent, client } = open()
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('v')
    const dialog = await screen.findByRole('dialog', { name: 'Verify by override' })
    await userEvent.click(within(dialog).getByRole('button', { name: 'Certify now' }))
    expect(sent()[0]).toMatchObject({
      path: '/campaigns/c1/certifications',
      body: { targetVersionId: 'tv1', candidateKeys: [key(1)], again: false },
    })
    const event = { kind: 'certification', certification: certification(1), made: null } as const
    const made = { candidateKey: key(1), state: 'passed', id: 'z1' } as const
    act(() => applyEvent(client, 'c1', { ...event, made }))
    const turned = await screen.findByRole('dialog', { name: 'Verdict: verified' })
    await userEvent.click(within(turned).getByRole('button', { name: 'Verify' }))
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
    expect(sent().at(-1)?.body).toEqual({ targetVersionId: 'tv1', value: 'verified', reason: '' })
  })

  it('certifies all undecided candidates without a certificate, or those selected with x and by range', async () => {
    const failed = { state: 'failed', id: 'z9' } as const
    const { sent } = open('reviewer', [
      row(1, -4.5),
      row(2, -4.9, { certificate: failed }),
      row(3, -5.2),
      row(4, -5.3, { verdict: verdict('rejected') }),
    ])
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.click(screen.getByRole('button', { name: 'Certify all undecided (2)' }))
    expect(sent()[0]?.body).toMatchObject({ candidateKeys: [key(1), key(3)] })
    await userEvent.keyboard('x')
    const user = userEvent.setup()
    await user.keyboard('{Shift>}')
    await user.click(screen.getByRole('checkbox', { name: 'Select rank 3' }))
    await user.keyboard('{/Shift}')
    await user.click(screen.getByRole('button', { name: 'Certify the 3 selected' }))
    expect(sent()[1]?.body).toMatchObject({ candidateKeys: [key(1), key(2), key(3)] })
    expect(await screen.findByRole('button', { name: /Certify all undecided/ })).toBeTruthy()
  })

  it('says how ranks changed, for which version a verdict was given, and hides columns by the address', async () => {
    const previous = { rank: 3, kind: 'feasible', score: -4.8 } as const
    const { router } = open('reviewer', [
      row(1, -4.5, { previous, verdict: { ...verdict('rejected'), targetVersion: 4 } }),
      row(2, -4.9, { previous: { ...previous, rank: 1 } }),
      row(3, -5.2, { previous }),
    ])
    const table = await screen.findByRole('table', { name: 'Candidates' })
    for (const word of ['up 2', 'down 1', 'same', '(given for v4)']) {
      expect(within(table).getByText(word)).toBeTruthy()
    }
    expect(screen.getByRole('option', { name: 'given for another version (1)' })).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Columns' }))
    await userEvent.click(await screen.findByRole('checkbox', { name: 'change of rank' }))
    await waitFor(() => expect(within(table).queryByText('up 2')).toBeNull())
    expect(router.state.location.search).toContain('hide=change')
  })

  it('j and k move without deciding', async () => {
    const { sent } = open()
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('jj')
    expect(within(inHand()).getByText('Rank 3')).toBeTruthy()
    await userEvent.keyboard('k')
    expect(within(inHand()).getByText('Rank 2')).toBeTruthy()
    expect(sent()).toHaveLength(0)
  })

  it('a reader cannot decide, and is told why', async () => {
    const { sent } = open('reader')
    await screen.findByRole('table', { name: 'Candidates' })
    const reject = within(inHand()).getByRole('button', { name: /Reject/ })
    expect(reject.getAttribute('aria-disabled')).toBe('true')
    expect(reject.title).toContain('reader')
    await userEvent.click(reject)
    await userEvent.keyboard('r')
    expect(sent()).toHaveLength(0)
  })

  it('shows a verdict before the answer, takes it back when it is refused, and names the row', async () => {
    let refuse = (): void => {}
    const { router } = open('reviewer', undefined, {
      [`POST /campaigns/c1/candidates/${key(1)}/verdicts`]: () =>
        new Promise((answer) => {
          refuse = () => answer(new Status(409, problem(409, 'closed', 'The target was closed.')))
        }),
    })
    const table = await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('r')
    expect(await within(table).findByText('rejected')).toBeTruthy()
    expect(router.state.location.search).toContain(`row=${key(2)}`)
    refuse()
    await waitFor(() => expect(within(table).queryByText('rejected')).toBeNull())
    expect(await screen.findByText('Not rejected: rank 1 (r5-0001): The target was closed.')).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Go to it' }))
    expect(router.state.location.search).toContain(`row=${key(1)}`)
  })

  it('z takes verdicts back, the last one first', async () => {
    const undone: string[][] = []
    const { router } = open('reviewer', undefined, {
      'POST /campaigns/c1/verdicts/undo': ({ body }: Call) => {
        const { ids } = body as { ids: string[] }
        undone.push(ids)
        const n = Number(ids[0]) - 100
        const back = { ...verdict('undecided'), id: String(200 + n), undoneBy: 'Ada Quill' }
        return { given: [{ candidateKey: key(n), verdict: back }], refused: [] }
      },
    })
    const table = await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('rr')
    expect(await within(table).findAllByText('rejected')).toHaveLength(2)
    await userEvent.keyboard('z')
    await waitFor(() => expect(within(table).getAllByText('rejected')).toHaveLength(1))
    expect(router.state.location.search).toContain(`row=${key(2)}`)
    await userEvent.keyboard('z')
    await waitFor(() => expect(within(table).queryByText('rejected')).toBeNull())
    expect(undone).toEqual([['102'], ['101']])
    await userEvent.keyboard('z')
    expect(await screen.findByText(/^Nothing to take back/)).toBeTruthy()
    expect(undone).toHaveLength(2)
  })

  it('one word on many, selected with Shift and the arrow key; what is refused goes back', async () => {
    const { sent } = open('reviewer', undefined, {
      'POST /campaigns/c1/verdicts': ({ body }: Call) => {
        const [first, second] = (body as { candidateKeys: string[] }).candidateKeys
        return {
          given: [{ candidateKey: first, verdict: { ...verdict('rejected'), id: '300' } }],
          refused: [{ candidateKey: second, code: 'not-found', message: 'There is no such candidate.' }],
        }
      },
    })
    const table = await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.keyboard('{Shift>}{ArrowDown}{/Shift}')
    const selected = screen.getByRole('group', { name: 'Selected candidates' })
    expect(within(selected).getByText('2 selected')).toBeTruthy()
    await userEvent.click(within(selected).getByRole('button', { name: 'Reject all' }))
    expect(sent().at(-1)?.body).toMatchObject({ value: 'rejected', candidateKeys: [key(1), key(2)] })
    expect(await screen.findByText(/^Not rejected: rank 2 \(r5-0001\)/)).toBeTruthy()
    expect(within(table).getAllByText('rejected')).toHaveLength(1)
    expect(await screen.findByText('1 candidate, rejected')).toBeTruthy()
  })

  it('shows who is to judge, keeps to one’s own rows, and says when a second reader is needed', async () => {
    const half = { ...verdict('verified', true), readers: [{ id: 'b8', name: 'Bo Lind' }] }
    open(
      'reviewer',
      [
        row(1, -4.5, { assignee: me, verdict: half }),
        row(2, -4.9, { assignee: { id: 'b8', name: 'Bo Lind' } }),
      ],
      {},
      '?reviewer=me&sort=nothing',
    )
    const table = await screen.findByRole('table', { name: 'Candidates' })
    expect(await within(table).findByText('Ada Quill')).toBeTruthy()
    expect(within(table).queryByText('Bo Lind')).toBeNull()
    expect(within(table).getByText('verified by one reader by override')).toBeTruthy()
    expect(screen.getByRole('option', { name: 'me (1)' })).toBeTruthy()
    expect(screen.getByText(/names a column that this list does not have.*nothing/)).toBeTruthy()
  })

  it('the same rows as pictures, with the same keys, and two columns as a scatter', async () => {
    const { router, sent } = open()
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.click(screen.getByRole('button', { name: 'Pictures' }))
    const pictures = await screen.findByRole('list', { name: 'Candidates as pictures' })
    expect(within(pictures).getAllByRole('listitem')).toHaveLength(3)
    await userEvent.keyboard('jx')
    expect(within(inHand()).getByText('Rank 2')).toBeTruthy()
    expect(screen.getByText('1 selected')).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Scatter' }))
    expect(await screen.findByRole('img', { name: /^score against reach: 3 candidates/ })).toBeTruthy()
    expect(router.state.location.search).toContain('across=report%3Areach&up=score')
    await act(() => router.navigate(-1))
    expect(screen.queryByRole('img', { name: /^score against reach/ })).toBeNull()
    expect(sent()).toHaveLength(0)
  })

  it('views are opened and kept', async () => {
    const view = {
      ...{ id: 'w1', name: 'Hits only', address: 'hits=yes', shortlistId: null },
      ...{ authorId: 'b8', author: 'Bo Lind', createdAt: '2026-01-02T03:04:05.000Z' },
    }
    const { router, sent } = open('reviewer', undefined, {
      'GET /campaigns/c1/shortlist-views': [view],
      'POST /campaigns/c1/shortlist-views': view,
    })
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.click(screen.getByRole('button', { name: 'Views' }))
    await userEvent.click(await screen.findByRole('button', { name: /^Hits only/ }))
    expect(router.state.location.search).toBe('?hits=yes')
    await userEvent.click(screen.getByRole('button', { name: 'Views' }))
    expect(screen.queryByRole('button', { name: 'Remove “Hits only”' })).toBeNull()
    await userEvent.type(await screen.findByLabelText('Keep what is shown now as'), 'Mine')
    await userEvent.click(screen.getByRole('button', { name: 'Keep' }))
    expect(sent()[0]?.body).toEqual({ name: 'Mine', address: 'hits=yes', shortlistId: 'l1' })
  })

  it('a newer issue leaves the rejected rows out', async () => {
    const { sent, router } = open('lead', [row(1, -4.5), row(2, -4.9, { verdict: verdict('rejected') })], {
      'GET /campaigns/c1/searches': [],
      'POST /campaigns/c1/shortlists/l1/reissues': { shortlistId: 'l2', rescoring: null },
    })
    await screen.findByRole('table', { name: 'Candidates' })
    await userEvent.click(screen.getByRole('button', { name: 'New issue' }))
    const dialog = await screen.findByRole('dialog', { name: 'New issue' })
    await userEvent.click(within(dialog).getByRole('radio', { name: 'These rows without the 1 rejected' }))
    await userEvent.click(within(dialog).getByRole('button', { name: 'Make issue 2' }))
    await waitFor(() => expect(router.state.location.pathname).toBe('/campaigns/c1/shortlists/l2'))
    expect(sent()[0]?.body).toEqual({
      name: 'First pass, issue 2',
      how: { kind: 'rows', without: [key(2)] },
    })
  })
})
