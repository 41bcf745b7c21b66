import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { explorationRequestSchema } from '../../shared/explorations.ts'
import type { Scope } from '../../shared/polytopes.ts'
import { checkRule } from '../../scoring/index.ts'
import { scaleOver } from '../../src/components/charts/axisScale.ts'
import { binsOf } from '../../src/components/charts/valueBins.ts'
import { draftFaults } from '../../src/routes/explore/ColumnFields.tsx'
import { members, quantile, selectedRows, summarise } from '../../src/routes/explore/columnValues.ts'
import {
  changedExplore,
  readExplore,
  requestOf,
  startColumns,
} from '../../src/routes/explore/exploreAddress.ts'
import { targetDraft } from '../../src/routes/explore/targetDraft.ts'

const key = '0123456789abcdef0123456789abcdef'
const row = (...cells: (number | boolean | { undefined: string })[]) => ({
  candidateKey: key,
  polytope: { key, name: 'p', h11: 1, h21: 101 },
  cells,
})

describe('the address of an exploration', () => {
  it('holds everything, and reads back as it was written', () => {
    const change = {
      scope: { kind: 'filter', filter: { h11Min: 3, h11Max: 9, favourable: 'yes' } },
      size: 300,
      seed: 12,
      at: { kind: 'smallest divisor', value: 0.5 },
      columns: ['a = volume, and', 'h11 + 1 : & = ?'],
      log: [1],
      ranges: new Map([
        [0, { low: -5.25 }],
        [1, { low: 1, high: 2e-7 }],
      ]),
      by: 1,
    } as const
    const written = changedExplore(new URLSearchParams(), change).toString()
    const view = readExplore(new URLSearchParams(written))
    expect(view).toEqual({ ...change, search: null, ranges: view.ranges })
    expect([...view.ranges]).toEqual([
      [0, { low: -5.25, high: undefined }],
      [1, { low: 1, high: 2e-7 }],
    ])
    expect(explorationRequestSchema.parse(requestOf(view))).toEqual(requestOf(view))
  })

  const scopes: Scope[] = [
    { kind: 'polytopes', keys: [key] },
    { kind: 'collection', collection: 'abc' },
    { kind: 'filter', filter: {} },
  ]
  it.each(scopes)('keeps the scope %j, and nothing of the one before', (scope) => {
    const before = new URLSearchParams('h11Min=3&text=x&collection=old&polytopes=')
    expect(readExplore(changedExplore(before, { scope })).scope).toEqual(scope)
  })

  it('takes what does not fit for not written', () => {
    const view = readExplore(
      new URLSearchParams('size=5&seed=-1&at=nowhere:1&by=7&range=x:1:2&log=a&h11Min=b'),
    )
    expect(view).toMatchObject({ size: 10, seed: 1, at: { kind: 'scale', value: 1 }, columns: startColumns })
    expect(view.ranges.size).toBe(0)
    expect(draftFaults(startColumns)).toEqual([null, null])
  })
})

describe('columns over rows', () => {
  const rows = [row(3, true), row({ undefined: 'why' }, false), row(1, true), row(2, false)]

  it('are summed up, with reasons for what is undefined', () => {
    const [numbers, truths] = [summarise(rows, 0), summarise(rows, 1)]
    expect(numbers).toEqual({ values: [3, null, 1, 2], sorted: [1, 2, 3], reasons: [['why', 1]] })
    expect(truths.values).toEqual([1, 0, 1, 0])
    expect([0, 0.05, 0.5, 0.95, 1].map((p) => quantile(numbers.sorted, p))).toEqual([1, 1, 2, 3, 3])
    expect(quantile([], 0.5)).toBeNull()
  })

  it('select rows by intervals; what is undefined lies in none', () => {
    const summaries = [summarise(rows, 0), summarise(rows, 1)]
    expect(selectedRows(summaries, new Map(), 4)).toEqual([0, 1, 2, 3])
    expect(selectedRows(summaries, new Map([[0, { low: 2 }]]), 4)).toEqual([0, 3])
    expect(selectedRows(summaries, new Map([[0, { low: 2 }], [1, { low: 1 }]]), 4)).toEqual([0]) // prettier-ignore
    expect(members(summaries[0]!, 1)).toEqual({ largest: [0], median: [3], smallest: [2] })
  })

  it('are told apart by name', () => {
    expect(draftFaults(['volume', 'volum', 'x = volume', 'x = h21'])).toEqual([
      null,
      expect.any(String),
      null,
      expect.stringContaining('column 3 has the same name'),
    ])
  })

  it('become a rule that scores by one and reports the others', () => {
    const column = (name: string, expression = name) => ({
      ...({ name, expression, type: 'number', unit: null, stage: 'metric', cost: 'dear' } as const),
    })
    const text = targetDraft(
      [column('volume'), column('small', 'min(d in divisors : d.volume)'), column('h11')],
      1,
      { kind: 'volume', value: 100 },
      'a\nsample',
    )
    const check = checkRule(text)
    expect(check.ok && check.rule).toMatchObject({
      at: { kind: 'volume', value: 100 },
      report: [{ name: 'volume' }, { name: 'h11' }],
    })
    expect(text).toContain('score min(d in divisors : d.volume)\n')
    expect(checkRule(targetDraft([column('h11')], 0, { kind: 'scale', value: 1 }, 'x')).ok).toBe(true)
  })
})

describe('bins of a histogram', () => {
  const values = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 80 })

  it('count every value once, in the bin that holds it', () => {
    fc.assert(
      fc.property(values, fc.boolean(), (list, log) => {
        const sorted = [...list].sort((a, b) => a - b)
        const { edges, counts } = binsOf(sorted, { log, whole: false })
        const shown = log ? sorted.filter((value) => value > 0) : sorted
        expect(counts.reduce((sum, count) => sum + count, 0)).toBe(shown.length)
        for (const [n, count] of counts.entries()) {
          const last = n === counts.length - 1
          const inside = shown.filter(
            (value) => (n === 0 || value >= edges[n]!) && (last || value < edges[n + 1]!),
          )
          expect(inside.length).toBe(count)
        }
        expect(counts.length).toBeLessThanOrEqual(40)
      }),
    )
  })

  it('give whole numbers a bin each', () => {
    expect(binsOf([1, 1, 2, 4], { log: false, whole: true })).toEqual({
      edges: [0.5, 1.5, 2.5, 3.5, 4.5],
      counts: [2, 1, 0, 1],
    })
  })
})

describe('an axis', () => {
  it('names truth values, and gives whole numbers whole ticks', () => {
    const axis = { label: 'x', log: false, truth: false, whole: true }
    const scale = scaleOver([8, 9], axis, 0, 100, 5)
    expect(scale.ticks.map(scale.format)).toEqual(['8', '9'])
    const truth = scaleOver([0, 1], { ...axis, truth: true }, 0, 100, 5)
    expect(truth.ticks.map(truth.format)).toEqual(['no', 'yes'])
    expect(scaleOver([], axis, 0, 100, 5)(0)).toBeGreaterThan(0)
  })
})
