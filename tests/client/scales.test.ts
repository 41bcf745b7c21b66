// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { coveredRange } from '../../src/components/charts/HodgeScatter.tsx'
import { alignCurves } from '../../src/components/charts/alignCurves.ts'
import { linearScale, linearTicks, logScale, logTicks } from '../../src/components/charts/scales.ts'

describe('scales', () => {
  it('put round ticks inside their range', () => {
    expect(linearTicks(0, 2000)).toEqual([0, 500, 1000, 1500, 2000])
    expect(linearTicks(-6.3, -5.1, 4)).toEqual([-6, -5.5])
    expect(logTicks(1, 500)).toEqual([1, 2, 5, 10, 20, 50, 100, 200, 500])
    expect(logTicks(1e-12, 1e2).every((tick) => Number.isInteger(Math.log10(tick)))).toBe(true)
  })

  it('invert what they map', () => {
    for (const scale of [linearScale(-6, -5, 40, 400), logScale(1, 491, 40, 400)]) {
      const value = scale.ticks[1] ?? 1
      expect(scale.invert(scale(value))).toBeCloseTo(value, 9)
    }
  })

  it('a brush covers the whole numbers inside it', () => {
    expect(coveredRange(2.3, 5.9)).toEqual([3, 5])
    expect(coveredRange(0.8, 1.2)).toEqual([1, 1])
  })
})

describe('the two curves of a search', () => {
  it('share one list of evaluation counts; the found one is level up to now', () => {
    const found = [
      [1, -6.5],
      [40, -6],
    ] as const
    const expected = [
      [1, -6.4],
      [10, -6.2],
    ] as const
    expect(alignCurves(found, expected, 90)).toEqual([
      [1, 10, 40, 90],
      [-6.5, undefined, -6, -6],
      [-6.4, -6.2, undefined, undefined],
    ])
  })
})
