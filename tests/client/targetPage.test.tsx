// @vitest-environment happy-dom
import { act, cleanup, screen, waitFor, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { undo } from '@codemirror/commands'
import { EditorView } from '@codemirror/view'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Preview, TargetDetail, TargetUses } from '../../shared/targets.ts'
import { starterTargets } from '../../shared/starterTargets.ts'
import { previewKey } from '../../src/api/previews.ts'
import { NewTargetPage } from '../../src/routes/target/NewTargetPage.tsx'
import { TargetPage } from '../../src/routes/target/TargetPage.tsx'
import { renderPage } from './renderPage.tsx'
import { stubApi, type Call } from './stubApi.ts'

const older = 'score log10(volume)\n'
const newer = 'let reach = log10(metric.divisor.top)\nscore reach\nreport reach\n'

const version = (number: number, text: string) => ({
  id: `v${number}`,
  number,
  text,
  scoringHash: `h${number}`,
  author: 'Ada',
  createdAt: '2026-01-02T03:04:05Z',
  searches: number,
})
const target: TargetDetail = {
  id: 't1',
  name: 'Range',
  versions: [version(2, newer), version(1, older)],
  latestScope: { kind: 'filter', filter: { h11Min: 50, h11Max: 50 } },
}
const uses: TargetUses = [
  {
    versionId: 'v1',
    searches: [{ id: 's1', name: 'First run', state: 'finished', createdAt: '2026-01-02T03:04:05Z' }],
    shortlists: [{ id: 'l1', name: 'Best 40', createdAt: '2026-01-02T03:04:05Z' }],
  },
]
const running: Preview = {
  id: 'p1',
  state: 'running',
  message: null,
  size: 200,
  evaluated: 20,
  law: 'law',
  feasible: 18,
  infeasible: 0,
  undefined: 2,
  undefinedReasons: [{ reason: '`log10` needs a positive number (line 1, column 7)', count: 2 }],
  requires: [],
  histogram: null,
  hit: null,
  cost: { median: 1, stages: [] },
  best: [],
  typical: [],
  worst: [],
}

const one = { count: 1, h11Min: 50, h11Max: 50, pointsMax: 60 }
let scope: object = one
let calls: Call[] = []
let asked = 0

function open(role: 'lead' | 'reader' = 'lead') {
  return renderPage(
    <TargetPage />,
    '/campaigns/:campaignId/targets/:targetId',
    '/campaigns/c1/targets/t1',
    role,
  )
}

const editor = async (): Promise<EditorView> => {
  const box = await screen.findByRole('textbox', { name: 'Scoring rule' })
  const view = EditorView.findFromDOM(box)
  if (!view) throw new Error('no editor')
  return view
}
const write = (view: EditorView, text: string) =>
  act(() => view.dispatch({ changes: { from: 0, to: view.state.doc.length, insert: text } }))
const previews = () => calls.filter(({ path }) => path === '/campaigns/c1/previews')

beforeEach(() => {
  localStorage.clear()
  scope = one
  asked = 0
  calls = stubApi({
    'GET /campaigns/c1/targets/t1': target,
    'GET /campaigns/c1/targets/t1/uses': uses,
    'POST /campaigns/c1/previews': () => ({ ...running, id: `p${++asked}` }),
    'DELETE /campaigns/c1/previews': undefined,
    'POST /campaigns/c1/scope': () => scope,
  })
})
afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})

describe('the page of a target', () => {
  it('asks for previews of the scope last searched, by meaning, and stops what is outdated', async () => {
    const { unmount } = open()
    const view = await editor()
    await waitFor(() => expect(previews()).toHaveLength(1))
    expect(previews()[0]?.body).toMatchObject({ scope: target.latestScope, size: 200 })
    await screen.findByText(/the scope of its last search/)

    // A comment and blanks are no news.
    write(view, `# a word\n\n${newer.replace('= log10', '=    log10')}`)
    const save = screen.getByRole('button', { name: 'Save as version 3' })
    await waitFor(() => expect(save.getAttribute('aria-disabled')).toBeNull())
    write(view, newer.replace('score reach', 'score -reach'))
    await waitFor(() => expect(previews().map(({ method }) => method)).toEqual(['POST', 'DELETE', 'POST']))
    expect((previews()[2]?.body as { text: string }).text).toContain('score -reach')
    unmount()
    await waitFor(() => expect(previews().at(-1)?.method).toBe('DELETE'))
  })

  it('asks for no preview while no polytope is in the scope, and for one when there is', async () => {
    scope = { count: 0, h11Min: null, h11Max: null, pointsMax: null }
    const { client } = open()
    await screen.findByText('No polytope matches; widen the filter.')
    expect(previews()).toEqual([])
    scope = one
    await act(() => client.invalidateQueries({ queryKey: ['polytopes'] }))
    await waitFor(() => expect(previews()).toHaveLength(1))
  })

  it('shows reasons at the place where they were written', async () => {
    const { client } = open()
    const view = await editor()
    write(view, `# two lines more\n\n${older}`)
    await waitFor(() => expect(previews().some(({ method }) => method === 'POST')).toBe(true))
    await waitFor(() => expect(client.getQueryData(previewKey(`p${asked}`))).toBeDefined())
    await userEvent.click(await screen.findByRole('button', { name: 'Go to line 3, column 7' }))
    expect(view.state.selection.main.head).toBe(view.state.doc.line(3).from + 6)
  })

  it('renames a name everywhere, and takes it back in one step', async () => {
    open()
    const view = await editor()
    act(() => view.dispatch({ selection: { anchor: newer.indexOf('score reach') + 8 } }))
    await userEvent.click(screen.getByRole('button', { name: 'Rename a name' }))
    const field = await screen.findByRole('textbox', { name: 'New name' })
    await userEvent.clear(field)
    await userEvent.type(field, 'volume{Enter}')
    await screen.findByText('“volume” is an observable.')
    await userEvent.clear(field)
    await userEvent.type(field, 'span{Enter}')
    expect(view.state.doc.toString()).toBe(newer.replaceAll('reach', 'span'))
    // The test environment tells of selections in the midst of an update while the editor has the focus.
    view.contentDOM.blur()
    act(() => void undo(view))
    expect(view.state.doc.toString()).toBe(newer)
  })

  it('compares any two versions, says what used them, and begins a draft from an old one', async () => {
    open()
    const view = await editor()
    write(view, `${newer}# mine\n`)
    await userEvent.click(screen.getByRole('tab', { name: 'Versions' }))
    await screen.findByRole('link', { name: 'First run' })
    expect(screen.getByRole('link', { name: 'Best 40' }).getAttribute('href')).toBe(
      '/campaigns/c1/shortlists/l1',
    )
    await userEvent.click(screen.getByRole('button', { name: 'Compare version 1 with the editor' }))
    const comparison = screen.getByRole('region', { name: 'Comparison' })
    await userEvent.selectOptions(within(comparison).getByRole('combobox', { name: 'To' }), 'v2')
    expect(within(comparison).getByRole('list').textContent).toContain(
      'only in Version 1: score log10(volume)',
    )
    await userEvent.selectOptions(within(comparison).getByRole('combobox', { name: 'Laid out' }), 'beside')
    expect(within(comparison).getByRole('columnheader', { name: 'Version 2' })).toBeTruthy()

    await userEvent.click(screen.getByRole('button', { name: 'Edit from version 1' }))
    await waitFor(() => expect(view.state.doc.toString()).toBe(older))
    // What stood there is offered back.
    await userEvent.click(await screen.findByRole('button', { name: 'Go on with it' }))
    await waitFor(() => expect(view.state.doc.toString()).toBe(`${newer}# mine\n`))
  })

  it('offers unsaved text back after the tab went away, and asks before it is left', async () => {
    const first = open()
    write(await editor(), `${newer}# lost?\n`)
    window.dispatchEvent(new Event('pagehide'))
    first.unmount()

    const { router } = open()
    const view = await editor()
    expect(view.state.doc.toString()).toBe(newer)
    await userEvent.click(await screen.findByRole('button', { name: 'Go on with it' }))
    await waitFor(() => expect(view.state.doc.toString()).toBe(`${newer}# lost?\n`))
    await act(() => router.navigate('/elsewhere'))
    const dialog = await screen.findByRole('dialog', { name: 'Leave without saving?' })
    await userEvent.click(within(dialog).getByRole('button', { name: 'Leave, keep the draft' }))
    await screen.findByText('elsewhere')
    expect(localStorage.getItem('tessellary.drafts.t1')).toContain('# lost?')
  })
})

describe('a new target', () => {
  it('begins from a starter with its scope, and lets none of the own text go', async () => {
    renderPage(<NewTargetPage />, '/campaigns/:campaignId/targets/new', '/campaigns/c1/targets/new')
    const view = await editor()
    const [first, second] = starterTargets
    write(view, 'score h11\n')
    await userEvent.click(screen.getByRole('button', { name: new RegExp(`^${first?.name}`) }))
    await waitFor(() => expect(view.state.doc.toString()).toBe(first?.text))
    expect(screen.getByRole('textbox', { name: 'Name of the target' })).toHaveProperty('value', first?.name)
    await screen.findByText(/what this starter is meant for/)
    await waitFor(() => expect(previews().at(-1)?.body).toMatchObject({ scope: first?.scope }))
    expect(localStorage.getItem('tessellary.drafts.new.c1')).toContain('score h11')
    await userEvent.click(screen.getByRole('button', { name: new RegExp(`^${second?.name}`) }))
    await waitFor(() => expect(view.state.doc.toString()).toBe(second?.text))
    await screen.findByRole('button', { name: 'Go on with it' })
  })
})
