// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import {
  columnDecimals,
  counted,
  formatDuration,
  formatNumber,
  formatPercent,
  numberParts,
} from '../../src/lib/numbers.ts'

describe('numbers as they are written', () => {
  it('keeps whole columns whole, and lines the points of others up', () => {
    expect(columnDecimals([86, 7, -3], 6)).toBe(0)
    expect(columnDecimals([86, 7.5], 6)).toBe(4)
    expect(columnDecimals([], 6)).toBeNull()
  })

  it('keeps integers exact and groups long ones', () => {
    expect(formatNumber(491)).toBe('491')
    expect(formatNumber(9999)).toBe('9999')
    expect(formatNumber(473_800_776)).toBe('473\u2009800\u2009776')
    expect(formatNumber(-200)).toBe('−200')
  })

  it('writes small and large numbers as a × 10^n', () => {
    expect(numberParts(1.2345e-6)).toEqual({ mantissa: '1.234', exponent: -6 })
    expect(formatNumber(1.2345e-6)).toBe('1.234 × 10⁻⁶')
    expect(formatNumber(-2.5e7 - 0.5)).toBe('−2.500 × 10⁷')
  })

  it('keeps the asked number of significant digits in between', () => {
    expect(formatNumber(-5.77123)).toBe('−5.771')
    expect(formatNumber(0.012345, 3)).toBe('0.0123')
    expect(formatNumber(12345.678)).toBe('12346')
  })

  it('names what is no number', () => {
    expect(formatNumber(Number.NaN)).toBe('undefined')
    expect(formatNumber(Number.POSITIVE_INFINITY)).toBe('∞')
  })

  it('tells small rates apart', () => {
    expect(formatPercent(0)).toBe('0 %')
    expect(formatPercent(0.0042)).toBe('0.42 %')
    expect(formatPercent(0.000012)).toBe('0.0012 %')
    expect(formatPercent(0.5)).toBe('50 %')
  })

  it('words counts and durations', () => {
    expect(counted(1, 'polytope')).toBe('1 polytope')
    expect(counted(6548, 'polytope')).toBe('6548 polytopes')
    expect(formatDuration(0.2)).toBe('under 1 s')
    expect(formatDuration(75)).toBe('75 s')
    expect(formatDuration(600)).toBe('10 min')
    expect(formatDuration(3 * 3600 + 240)).toBe('3 h 4 min')
  })
})
