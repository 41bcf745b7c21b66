// @vitest-environment happy-dom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { cleanup, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { caution } from '../../shared/caution.ts'
import { ShortlistPage } from '../../src/routes/shortlist/ShortlistPage.tsx'
import { renderPage } from './renderPage.tsx'
import { key, row, shortlist, verdict } from './shortlistFixture.ts'
import { stubApi, type Call } from './stubApi.ts'

const path = '/campaigns/:campaignId/shortlists/:shortlistId'
const address = '/campaigns/c1/shortlists/l1'
let stop = () => {}

beforeEach(() => window.localStorage.clear())
afterEach(() => {
  stop()
  cleanup()
  vi.unstubAllGlobals()
})

function open(role: 'lead' | 'reviewer' | 'reader' = 'reviewer') {
  const verdicts = Object.fromEntries(
    [1, 2, 3].map((n) => [
      `POST /campaigns/c1/candidates/${key(n)}/verdicts`,
      ({ body }: Call) => {
        const { value } = body as { value: 'verified' | 'rejected' }
        return verdict(value, value === 'verified')
      },
    ]),
  )
  const calls = stubApi({
    'GET /campaigns/c1/shortlists/l1': shortlist([row(1, -4.5), row(2, -4.9), row(3, -5.2)]),
    ...verdicts,
  })
  const page = renderPage(<ShortlistPage />, path, address, role)
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
})
