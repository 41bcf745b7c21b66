import { describe, expect, it } from 'vitest'
import { type Comparison, type ComparedSearch } from '../../shared/comparisons.ts'
import { type SearchProgress } from '../../shared/searches.ts'
import { withReport } from '../../src/api/comparisons.ts'
import { compareAddress, readCompareView } from '../../src/routes/searches/compare/compareAddress.ts'
import { settingsOf } from '../../src/routes/searches/compare/settings.ts'

describe('the address of a comparison', () => {
  it('holds all of its view', () => {
    const view = { ids: ['a', 'b', 'c'], allSettings: true, best: 50 } as const
    const address = compareAddress('k', { ...view, ids: [...view.ids] })
    expect(address).toBe('/campaigns/k/searches/compare?with=a,b,c&settings=all&best=50')
    expect(readCompareView(new URL(address, 'http://x').searchParams)).toEqual(view)
  })

  it('is read with what can be made of it', () => {
    const read = (query: string) => readCompareView(new URLSearchParams(query))
    expect(read('')).toEqual({ ids: [], allSettings: false, best: 10 })
    expect(read('with=a,a,,b,c,d,e&best=7')).toEqual({
      ids: ['a', 'b', 'c', 'd'],
      allSettings: false,
      best: 10,
    })
  })
})

const search = (id: string, budget: number) =>
  ({ id, budget, seed: 1, state: 'running', extensions: [], settings: {} }) as unknown as ComparedSearch

describe('compared searches', () => {
  it('differ where any two of them do', () => {
    const differing = settingsOf([search('a', 10), search('b', 10), search('c', 20)])
    expect(differing.filter(({ differs }) => differs).map(({ name }) => name)).toEqual(['Budget'])
  })

  it('follow the reports of their own searches', () => {
    const comparison = { searches: [search('a', 10), search('b', 10)] } as Comparison
    const progress = { evaluations: 7, best: 2 } as SearchProgress
    const after = withReport(comparison, { kind: 'search', id: 'b', state: 'finished', progress })
    expect(after.searches[1]).toMatchObject({ state: 'finished', evaluations: 7, best: 2, progress })
    expect(after.searches[0]).toBe(comparison.searches[0])
    expect(withReport(comparison, { kind: 'search', id: 'z', state: 'finished', progress })).toBe(comparison)
  })
})
