import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { base64Of, bytesOf } from '../../../scoring/search/base64.ts'
import { interleaved, thinned } from '../../../scoring/search/curve.ts'
import { codeOfHeights, heightsOfCode } from '../../../scoring/search/heightsCode.ts'
import { Histogram } from '../../../scoring/search/histogram.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { Reservoir } from '../../../scoring/search/reservoir.ts'
import { SeenTable, seenKey } from '../../../scoring/search/seenTable.ts'

describe('base64', () => {
  it('agrees with the platform and comes back', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 50 }), (bytes) => {
        const text = base64Of(bytes)
        expect(text).toBe(Buffer.from(bytes).toString('base64'))
        expect(bytesOf(text)).toEqual(bytes)
      }),
    )
  })

  it('refuses what is not base64', () => {
    expect(() => bytesOf('abc')).toThrow(RangeError)
    expect(() => bytesOf('ab*d')).toThrow(RangeError)
    expect(() => bytesOf('=AAA')).toThrow(RangeError)
  })

  it('carries heights', () => {
    const heights = [0, -1, 2 ** 31 - 1, -(2 ** 31), 12345]
    expect([...heightsOfCode(codeOfHeights(heights))]).toEqual(heights)
  })
})

describe('table of classes seen', () => {
  it('knows what was added, through a JSON round trip', () => {
    const table = new SeenTable(64)
    const key = seenKey('0123456789abcdef0123456789abcdef', 'fedcba98765432100000000000000000')
    expect(table.find(...key)).toBeNull()
    table.add(...key, 3, -0.25)
    const restored = SeenTable.restore(JSON.parse(JSON.stringify(table.state())))
    expect(restored.find(...key)).toEqual({ kind: 3, value: -0.25 })
    expect(restored.state()).toEqual(table.state())
    expect(restored.used).toBe(1)
  })

  it('forgets in a fixed order when a bucket is full, and never grows', () => {
    const stream = new RandomStream(seededState(3))
    const table = new SeenTable(64)
    const size = JSON.stringify(table.state()).length
    for (let n = 0; n < 1000; n++) table.add(stream.below(2 ** 32), stream.below(2 ** 32), 1, n)
    expect(table.used).toBe(64)
    expect(JSON.stringify(table.state()).length).toBeLessThan(size + 10)
    table.add(1, 2, 5, 0)
    expect(table.find(1, 2)).toEqual({ kind: 5, value: 0 })
  })

  it('tells apart equal triangle lists on different polytopes', () => {
    const word = 'aaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaa'
    expect(seenKey('00000000000000010000000000000000', word)).not.toEqual(seenKey('0'.repeat(32), word))
  })
})

describe('histogram', () => {
  const value = fc.oneof(
    fc.double({ min: -1e3, max: 1e3, noNaN: true }),
    fc.double({ min: -7, max: -5, noNaN: true }),
  )

  it('counts every value once, in the bin that holds it', () => {
    fc.assert(
      fc.property(fc.array(value, { minLength: 1, maxLength: 60 }), (values) => {
        const histogram = new Histogram()
        for (const v of values) histogram.add(v)
        const restored = new Histogram(JSON.parse(JSON.stringify(histogram.state())))
        const view = restored.view(20)
        if (view === null) throw new Error('no view')
        expect(view.counts.length).toBeLessThanOrEqual(20)
        expect(view.edges.length).toBe(view.counts.length + 1)
        for (const [n, count] of view.counts.entries()) {
          expect(values.filter((v) => v >= view.edges[n] && v < view.edges[n + 1]).length).toBe(count)
        }
        expect(view.counts.reduce((a, b) => a + b)).toBe(values.length)
      }),
    )
  })

  it('counts what lies above a line, exactly but for the values of one bin', () => {
    fc.assert(
      fc.property(
        fc.array(value, { minLength: 1, maxLength: 60 }),
        value,
        fc.nat(59),
        (values, other, pick) => {
          const histogram = new Histogram()
          for (const v of values) histogram.add(v)
          for (const line of [other, values[pick % values.length]]) {
            const { least, most } = histogram.countAbove(line)
            const above = values.filter((v) => v > line).length
            expect(least).toBeLessThanOrEqual(above)
            expect(most).toBeGreaterThanOrEqual(above)
          }
        },
      ),
    )
  })

  it('counts equal values exactly, and says so of a state that does not know its values', () => {
    const histogram = new Histogram()
    for (const v of [0, 3, 3, 3, 4, 1000]) histogram.add(v)
    expect(histogram.countAbove(3)).toEqual({ least: 2, most: 2 })
    const { ends, ...earlier } = histogram.state()
    expect(ends).toHaveLength(4)
    expect(new Histogram(earlier).countAbove(3)).toEqual({ least: 2, most: 5 })
    const narrow = { width: 1, start: -64, counts: new Array<number>(128).fill(1) }
    const restored = new Histogram(narrow)
    restored.add(500)
    expect(restored.countAbove(62.5)).toEqual({ least: 1, most: 3 })
    expect(restored.view()?.counts.reduce((a, b) => a + b)).toBe(129)
  })

  it('merges with another without moving a count across an edge', () => {
    fc.assert(
      fc.property(fc.array(value, { maxLength: 30 }), fc.array(value, { maxLength: 30 }), (a, b) => {
        const [first, second] = [new Histogram(), new Histogram()]
        for (const v of a) first.add(v)
        for (const v of b) second.add(v)
        first.addAll(second.state())
        const view = first.view()
        const all = [...a, ...b]
        if (view === null) expect(all).toEqual([])
        else {
          for (const [n, count] of view.counts.entries()) {
            expect(all.filter((v) => v >= view.edges[n] && v < view.edges[n + 1]).length).toBe(count)
          }
        }
      }),
    )
  })
})

describe('reservoir', () => {
  it('holds every row with the same probability', () => {
    const held = new Array<number>(20).fill(0)
    const stream = new RandomStream(seededState(11))
    for (let run = 0; run < 4000; run++) {
      const reservoir = new Reservoir<number>({ capacity: 5, offered: 0, rows: [] })
      for (let n = 0; n < 20; n++) reservoir.offer(n, stream)
      for (const n of reservoir.state().rows) held[n]++
    }
    for (const count of held) expect(Math.abs(count - 1000)).toBeLessThan(120)
  })
})

describe('curve', () => {
  it('interleaves islands evaluation by evaluation', () => {
    const curve = interleaved([
      { evaluations: 3, curve: [[1, 1], [3, 5]] }, // prettier-ignore
      { evaluations: 10, curve: [[1, 2], [2, 3], [9, 6]] }, // prettier-ignore
    ])
    expect(curve).toEqual([[1, 1], [2, 2], [4, 3], [5, 5], [12, 6]]) // prettier-ignore
  })

  it('keeps first and last step when it is thinned', () => {
    const long = Array.from({ length: 1001 }, (_, n): [number, number] => [n + 1, n])
    const short = thinned(long)
    expect(short.length).toBeLessThanOrEqual(400)
    expect(short[0]).toEqual([1, 0])
    expect(short.at(-1)).toEqual([1001, 1000])
  })
})
