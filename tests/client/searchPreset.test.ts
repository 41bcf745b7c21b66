import { describe, expect, it } from 'vitest'
import {
  addressOfDraft,
  cloneAddress,
  draftFromAddress,
  draftOfSearch,
  startAddress,
  type Draft,
} from '../../src/routes/searches/new/searchPreset.ts'
import type { SearchDetail } from '../../shared/searches.ts'

const key = (n: number) => n.toString(16).padStart(32, '0')
const draft: Draft = {
  target: 't1',
  version: 'v2',
  scope: { kind: 'polytopes', keys: [key(1), key(2)] },
  method: 'genetic',
  budget: '5000',
  seed: '7',
  islands: '4',
  keep: '20',
  descents: '3',
  patience: '',
  surrogate: false,
  starts: { kind: 'shortlist', id: 'l1', candidateKeys: [key(9)] },
}

const again = (one: Partial<Draft>) => draftFromAddress(new URLSearchParams(addressOfDraft(one).toString()))

describe('the address of a composer', () => {
  it('fills it in as it was, but for what is empty', () => {
    const { patience, ...filled } = draft
    expect(patience).toBe('')
    expect(again(draft)).toEqual(filled)
  })

  it.each<Partial<Draft>>([
    { scope: { kind: 'filter', filter: { h11Min: 4, h11Max: 9, favourable: 'yes' } } },
    { scope: { kind: 'filter', filter: {} } },
    { scope: { kind: 'collection', collection: 'c1' } },
    { starts: { kind: 'search', id: 's1', size: 12 } },
    { starts: { kind: 'imported' } },
    { starts: { kind: 'imported', candidateKeys: [key(3), key(4)] } },
    { starts: { kind: 'same', id: 's1' } },
  ])('holds %j', (part) => {
    expect(again(part)).toEqual(part)
  })

  it('leaves out what does not fit its form, and long lists', () => {
    const odd = new URLSearchParams('method=magic&budget=many&start=nowhere:1&candidates=x&seed=-1')
    expect(draftFromAddress(odd)).toEqual({})
    const keys = Array.from({ length: 61 }, (_, n) => key(n))
    expect(again({ scope: { kind: 'polytopes', keys } })).toEqual({})
  })
})

describe('a search’s settings', () => {
  const search = {
    id: 's9',
    targetId: 't1',
    targetVersionId: 'v2',
    scope: draft.scope,
    method: 'annealing',
    budget: 3000,
    seed: 11,
    islands: 2,
    keep: 100,
    settings: { descents: 2 },
    surrogate: true,
    starts: { kind: 'shortlist', id: 'l1', name: 'L', count: 3, used: true },
  } as unknown as SearchDetail

  it('are cloned with a seed of its own', () => {
    const [path, query] = cloneAddress('c1', search).split('?')
    expect(path).toBe('/campaigns/c1/searches/new')
    const { seed, patience, ...same } = draftOfSearch(search)
    expect([seed, patience]).toEqual(['11', ''])
    expect(draftFromAddress(new URLSearchParams(query))).toEqual(same)
    expect(same.starts).toEqual({ kind: 'same', id: 's9' })
  })

  it('name the search where its polytopes are too many for an address', () => {
    const keys = Array.from({ length: 61 }, (_, n) => key(n))
    const wide = { ...search, scope: { kind: 'polytopes', keys } } as SearchDetail
    expect(new URLSearchParams(cloneAddress('c1', wide).split('?')[1]).get('clone')).toBe('s9')
  })

  it('may begin from chosen candidates', () => {
    const query = startAddress('c1', { kind: 'shortlist', id: 'l1' }, { target: 't1' }).split('?')[1]
    expect(draftFromAddress(new URLSearchParams(query))).toEqual({
      target: 't1',
      starts: { kind: 'shortlist', id: 'l1' },
    })
  })
})
