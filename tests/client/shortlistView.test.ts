// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { nextKey, nextUndecided, readView, visibleRows } from '../../src/routes/shortlist/shortlistView.ts'
import { key, row, verdict } from './shortlistFixture.ts'

const rows = [
  row(1, -4.5),
  row(2, -4.9, { verdict: verdict('rejected') }),
  row(3, -5.2, { outcome: { kind: 'undefined', reason: 'log of zero', stage: 'metric' } }),
  row(4, -5.6, { polytopeName: 'large-017' }),
]
const view = (address: string) => readView(new URLSearchParams(address))
const ranks = (address: string) => visibleRows(rows, view(address)).map(({ rank }) => rank)

describe('the view of a shortlist', () => {
  it('is read from the address', () => {
    expect(view('verdict=rejected&hits=yes&sort=score&order=desc')).toEqual({
      verdict: 'rejected',
      certificate: 'all',
      hits: true,
      text: '',
      sort: 'score',
      descending: true,
    })
    expect(view('verdict=splendid').verdict).toBe('all')
  })

  it('filters by verdict, hit and name', () => {
    expect(ranks('')).toEqual([1, 2, 3, 4])
    expect(ranks('verdict=undecided')).toEqual([1, 3, 4])
    expect(ranks('hits=yes')).toEqual([1, 2])
    expect(ranks('text=LARGE')).toEqual([4])
  })

  it('sorts by score and by report column, what has none last or first, ties by rank', () => {
    expect(ranks('sort=score')).toEqual([3, 4, 2, 1])
    expect(ranks('sort=score&order=desc')).toEqual([1, 2, 4, 3])
    expect(ranks('sort=report:k3&order=desc')).toEqual([2, 4, 1, 3])
  })

  it('knows where to go next', () => {
    expect(nextKey(rows, key(1))).toBe(key(2))
    expect(nextKey(rows, key(4))).toBe(key(3))
    expect(nextUndecided(rows, key(1))).toBe(key(3))
    expect(nextUndecided(rows, key(4))).toBe(key(1))
    expect(nextUndecided([rows[1]!], key(2))).toBeNull()
  })
})
