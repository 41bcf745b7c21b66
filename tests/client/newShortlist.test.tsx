// @vitest-environment happy-dom
import { afterEach, describe, expect, it, vi } from 'vitest'
import { cleanup, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { assemblySchema, type AssemblyCounts } from '../../shared/assemblies.ts'
import type { SearchSummary } from '../../shared/searches.ts'
import type { DraftShortlist, ShortlistDraft } from '../../shared/shortlists.ts'
import {
  assemblyAddress,
  assemblyPath,
  readAssembly,
} from '../../src/routes/shortlists/new/assemblyAddress.ts'
import { NewShortlistPage } from '../../src/routes/shortlists/new/NewShortlistPage.tsx'
import { renderPage } from './renderPage.tsx'
import { row, shortlist } from './shortlistFixture.ts'
import { stubApi, type Call } from './stubApi.ts'

const search = (id: string, more: Partial<SearchSummary> = {}): SearchSummary => ({
  id,
  name: `Search ${id}`,
  state: 'finished',
  method: 'annealing',
  targetId: 't1',
  targetName: 'Long reach',
  targetVersion: 1,
  polytopes: 3,
  budget: 100,
  seed: 1,
  evaluations: 100,
  best: -4.5,
  createdAt: '2026-01-02T03:04:05.000Z',
  finishedAt: null,
  author: 'Ada Quill',
  ...more,
})

const counts = (polytope: number): AssemblyCounts => ({
  finds: 40,
  distinct: 30,
  leftOut: { infeasible: 2, withoutValue: 0, polytope, invariants: 0, near: 0, beyond: 0, broken: 0 },
  withoutInvariants: 30,
  firstFront: null,
})

let stop = () => {}
afterEach(() => {
  stop()
  cleanup()
  vi.unstubAllGlobals()
})

function open(address: string, searches = [search('s1'), search('s2')], scored = true) {
  const version = {
    id: 'tv2',
    number: 2,
    text: 'score 1',
    scoringHash: 'h',
    author: 'Ada Quill',
    createdAt: '2026-01-02T03:04:05.000Z',
    searches: 0,
  }
  const calls = stubApi({
    'GET /campaigns/c1/searches': searches,
    'GET /campaigns/c1/targets': [{ id: 't1', name: 'Long reach', latest: version, versions: 2 }],
    'GET /campaigns/c1/targets/t1': { id: 't1', name: 'Long reach', versions: [version], latestScope: null },
    'GET /campaigns/c1/rescorings': [],
    'POST /campaigns/c1/rescorings': {
      id: 'r1',
      name: 'Best',
      state: 'queued',
      fromId: null,
      targetVersionId: 'tv2',
      targetName: 'Long reach',
      targetVersion: 2,
      total: 30,
      scored: 0,
      broken: 0,
      shortlistId: null,
      failure: null,
      author: 'Ada Quill',
      createdAt: '2026-01-02T03:04:05.000Z',
      finishedAt: null,
    },
    'POST /campaigns/c1/shortlists/draft': ({ body }: Call): ShortlistDraft => {
      const { perPolytope } = body as DraftShortlist
      const left = perPolytope === null ? 0 : 20
      return {
        targetVersionId: 'tv2',
        columns: ['reach', 'k3'],
        distinct: 30,
        scored: scored ? 30 : 10,
        counts: scored ? counts(left) : null,
        size: scored ? 28 - left : 0,
        best: scored ? [row(1, -4.5)] : [],
      }
    },
    'POST /campaigns/c1/shortlists': shortlist([row(1, -4.5)]),
  })
  const page = renderPage(<NewShortlistPage />, '/campaigns/:campaignId/shortlists/new', address)
  stop = page.stopKeys
  return {
    ...page,
    sent: (path: string) => calls.filter((call) => call.path === path && call.method === 'POST'),
  }
}

describe('the address of an assembly', () => {
  it('holds every choice and is read back', () => {
    const settings = assemblySchema.parse({
      size: 7,
      feasibleOnly: false,
      perPolytope: 2,
      apart: 6,
      perInvariants: 1,
      pareto: [
        { column: 'score', direction: 'max' },
        { column: 'report:a & b', direction: 'min' },
      ],
    })
    const assembly = { searchIds: ['s1', 's2'], versionId: 'tv2', settings }
    expect(readAssembly(new URLSearchParams(String(assemblyAddress(assembly))))).toEqual(assembly)
    const usual = readAssembly(new URLSearchParams('search=s1&size=0&polytope=-1&axis=max score&axis=odd'))
    expect(usual).toEqual({
      searchIds: ['s1'],
      versionId: '',
      settings: assemblySchema.parse({ feasibleOnly: true }),
    })
    expect(assemblyPath('c1', ['s1', 's2'])).toBe('/campaigns/c1/shortlists/new?search=s1&search=s2')
  })
})

describe('the assembly page', () => {
  it('shows what each choice leaves, and makes the list with these choices', async () => {
    const { sent, router } = open('/campaigns/c1/shortlists/new?search=s1')
    await screen.findByRole('button', { name: 'Make the shortlist of 28 candidates' })
    await userEvent.click(screen.getByRole('checkbox', { name: 'Search s2' }))
    await userEvent.type(screen.getByLabelText('Of one polytope, at most'), '3')
    await screen.findByRole('button', { name: 'Make the shortlist of 8 candidates' })
    expect(screen.getByRole('row', { name: /more than 3 of a polytope −20/ })).toBeTruthy()
    expect(router.state.location.search).toBe('?search=s1&search=s2&polytope=3')
    await userEvent.click(screen.getByRole('button', { name: /^Make the shortlist/ }))
    await waitFor(() => expect(router.state.location.pathname).toBe('/campaigns/c1/shortlists/l1'))
    expect(sent('/campaigns/c1/shortlists')[0]?.body).toMatchObject({
      name: 'Best of 2 searches',
      searchIds: ['s1', 's2'],
      perPolytope: 3,
      feasibleOnly: true,
      pareto: null,
    })
  })

  it('asks for a version where the searches ran with different ones, and scores first where it must', async () => {
    const { sent } = open(
      '/campaigns/c1/shortlists/new?search=s1&search=s2',
      [search('s1'), search('s2', { targetVersion: 2 })],
      false,
    )
    await screen.findByText('Choose the version to rank by.')
    expect(sent('/campaigns/c1/shortlists/draft')).toEqual([])
    await userEvent.selectOptions(await screen.findByLabelText('Target version'), 'tv2')
    await screen.findByText(/20 of them have no score/)
    await userEvent.click(screen.getByRole('button', { name: 'Score them and make the shortlist' }))
    await waitFor(() => expect(sent('/campaigns/c1/rescorings')).toHaveLength(1))
    expect(sent('/campaigns/c1/rescorings')[0]?.body).toMatchObject({
      targetVersionId: 'tv2',
      from: { searchIds: ['s1', 's2'] },
      assembly: { size: 50, feasibleOnly: true },
    })
  })

  it('ranks by fronts of two or three different columns', async () => {
    const { router } = open('/campaigns/c1/shortlists/new?search=s1')
    await userEvent.click(await screen.findByRole('radio', { name: /Pareto/ }))
    await waitFor(() =>
      expect(screen.getByLabelText<HTMLSelectElement>('Column 2').value).toBe('report:reach'),
    )
    await userEvent.click(screen.getByRole('button', { name: 'Add a third column' }))
    await waitFor(() => expect(screen.getByLabelText<HTMLSelectElement>('Column 3').value).toBe('report:k3'))
    const axes = new URLSearchParams(router.state.location.search).getAll('axis')
    expect(axes).toEqual(['max score', 'max report:reach', 'max report:k3'])
  })
})
