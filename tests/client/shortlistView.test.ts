// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { type ExternalColumn } from '../../shared/externalTables.ts'
import {
  conditionWords,
  givenDecimals,
  listColumns,
  readConditions,
} from '../../src/routes/shortlist/listColumns.ts'
import { differenceOf } from '../../src/routes/shortlist/Issues.tsx'
import { nextKey, nextUndecided, readView, visibleRows } from '../../src/routes/shortlist/shortlistView.ts'
import { key, row, shortlist, verdict } from './shortlistFixture.ts'

const rows = [
  row(1, -4.5),
  row(2, -4.9, { verdict: verdict('rejected') }),
  row(3, -5.2, { outcome: { kind: 'undefined', reason: 'log of zero', stage: 'metric' } }),
  row(4, -5.6, { polytopeName: 'large-017' }),
]
const view = (address: string) => readView(new URLSearchParams(address))
const shownOf = (list: ReturnType<typeof shortlist>, address: string) =>
  visibleRows(list, listColumns(list), view(address)).map(({ rank }) => rank)
const ranks = (address: string) => shownOf(shortlist(rows), address)

describe('the view of a shortlist', () => {
  it('is read from the address', () => {
    expect(view('verdict=rejected&hits=yes&sort=score&order=desc')).toEqual({
      verdict: 'rejected',
      reviewer: 'all',
      scatter: null,
      show: 'table',
      certificate: 'all',
      hits: true,
      text: '',
      conditions: [],
      sort: 'score',
      descending: true,
      hidden: [],
    })
    expect(view('hide=picture&hide=external:a,b').hidden).toEqual(['picture', 'external:a,b'])
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

  it('filters by ranges of columns; what has no value meets none', () => {
    expect(ranks('from:score=-5')).toEqual([1, 2])
    expect(ranks('from:score=-5&to:score=-4.6')).toEqual([2])
    expect(ranks('to:report:reach=-4.9')).toEqual([2, 4])
    expect(ranks('from:score=some&to:none=3')).toEqual([1, 2, 3, 4])
    const conditions = readConditions(new URLSearchParams('from:score=-5&to:score=3&has:external:note=ab'))
    expect(conditions.map((one) => conditionWords(one, one.column))).toEqual([
      '−5 ≤ score ≤ 3',
      'external:note contains “ab”',
    ])
  })

  it('filters and sorts by external columns, numbers and text', () => {
    const column = (name: string, type: ExternalColumn['type']): ExternalColumn => ({
      name,
      type,
      tableId: 'x1',
      tableName: 'mass.csv',
      author: 'Ada Quill',
      createdAt: '2026-01-02T03:04:05.000Z',
    })
    const list = {
      ...shortlist([
        row(1, -4.5, { external: [10, 'beta'] }),
        row(2, -4.6, { external: [9, null] }),
        row(3, -4.7, { external: [null, 'Alpha'] }),
      ]),
      external: [column('mass', 'number'), column('note', 'text')],
    }
    expect(shownOf(list, 'sort=external:mass')).toEqual([3, 2, 1])
    expect(shownOf(list, 'sort=external:note&order=desc')).toEqual([1, 3, 2])
    expect(shownOf(list, 'from:external:mass=9.5')).toEqual([1])
    expect(shownOf(list, 'has:external:note=ALPH')).toEqual([3])
    expect(listColumns(list).map(({ name }) => name)).toContain('external:note')
    expect(givenDecimals([1.25, 3, null, 'text'])).toBe(2)
    expect([givenDecimals([1e-9]), givenDecimals([1 / 3])]).toEqual([null, null])
  })

  it('sorts by the change of rank, and finds verdicts given for another version', () => {
    const before = (rank: number) => ({ rank, kind: 'feasible', score: -1 }) as const
    const list = shortlist([
      row(1, -4.5, { previous: before(3), verdict: { ...verdict('rejected'), targetVersion: 7 } }),
      row(2, -4.6, { previous: before(1), verdict: verdict('verified') }),
      row(3, -4.7, { previous: before(3) }),
    ])
    expect(shownOf(list, 'sort=change&order=desc')).toEqual([1, 3, 2])
    expect(shownOf(list, 'verdict=other-version')).toEqual([1])
    expect(listColumns(list).map(({ name }) => name)).toContain('change')
    expect(listColumns(shortlist(rows)).map(({ name }) => name)).not.toContain('change')
  })

  it('knows where to go next', () => {
    expect(nextKey(rows, key(1))).toBe(key(2))
    expect(nextKey(rows, key(4))).toBe(key(3))
    expect(nextUndecided(rows, key(1))).toBe(key(3))
    expect(nextUndecided(rows, key(4))).toBe(key(1))
    expect(nextUndecided([rows[1]!], key(2))).toBeNull()
  })
})

describe('the difference between two issues', () => {
  const placed = (...ranks: (number | null)[]) =>
    ranks.map((before, at) => ({
      rank: at + 1,
      previous: before === null ? null : { rank: before, kind: 'feasible' as const, score: 0 },
    }))

  it('counts what entered and what passed others, not what closed a gap', () => {
    expect(differenceOf(placed(2, 5, 9))).toEqual({ entered: 0, up: 0, down: 0, stayed: 3 })
    expect(differenceOf(placed(null, 4, 2, 6))).toEqual({ entered: 1, up: 1, down: 1, stayed: 1 })
  })
})
