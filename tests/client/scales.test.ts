// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { coveredRange } from '../../src/components/charts/HodgeScatter.tsx'
import { alignCurves, bestAt, lastKnownEnd } from '../../src/components/charts/runCurves.ts'
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

describe('the curves of searches', () => {
  const run = {
    label: 'A',
    curve: [
      [1, -6.5],
      [40, -6],
    ] as const,
    evaluations: 90,
  }
  const sample = {
    size: 60,
    best: -5.9,
    expected: [
      [1, -6.4],
      [60, -5.9],
    ] as const,
    range: [
      [1, -7, -6],
      [60, -6.1, null],
    ] as const,
  }

  it('share one list of evaluation counts; a found one is level up to now', () => {
    expect(alignCurves([run], { ...sample, size: 90, expected: [[10, -6.2]], range: [] }, 90)).toMatchObject({
      counts: [1, 10, 40, 90],
      runs: [[-6.5, undefined, -6, -6]],
      expected: [undefined, -6.2, undefined, undefined],
    })
  })

  it('show the null’s best as a bound beyond its size, and for an end that the sample does not know', () => {
    const { counts, high, low, bound } = alignCurves([run], sample, 90)
    expect(counts).toEqual([1, 40, 60, 90])
    expect(bound).toEqual([undefined, undefined, -5.9, -5.9])
    expect(low).toEqual([-7, undefined, -6.1, undefined])
    expect(high).toEqual([-6, undefined, -5.9, undefined])
    expect(lastKnownEnd(sample.range)).toBe(1)
    expect(alignCurves([run], sample, 60).bound).toEqual([undefined, undefined, undefined, undefined])
  })

  it('have no value before the first feasible candidate, nor after the last evaluation', () => {
    expect([0, 1, 39, 40, 90, 91].map((n) => bestAt(run, n))).toEqual([null, -6.5, -6.5, -6, -6, null])
  })
})
