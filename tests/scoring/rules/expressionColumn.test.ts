import { describe, expect, it } from 'vitest'
import { scoringHash } from '../../../scoring/rules/hash.ts'
import {
  checkColumn,
  type ExpressionColumn,
  evaluateColumn,
} from '../../../scoring/rules/expressionColumn.ts'
import { inventedCandidate } from './inventedCandidate.ts'

function column(text: string, at?: Parameters<typeof checkColumn>[1]): ExpressionColumn {
  const check = checkColumn(text, at)
  if (!check.ok) throw new Error(check.issues.map(({ message }) => message).join('; '))
  return check.column
}

const hash = (...given: Parameters<typeof column>) => scoringHash(column(...given).rule, '1')
const volume100 = { kind: 'volume', value: 100 } as const

describe('an expression as a column', () => {
  it('is checked, and described', () => {
    expect(column('metric.divisor.top')).toMatchObject({
      name: 'metric.divisor.top',
      expression: 'metric.divisor.top',
      type: 'number',
      stage: 'metric',
    })
    expect(column('metric.divisor.top').unit).toBeTruthy()
    expect(column('rigid = count( d in divisors : d.k3 ) # all of them')).toMatchObject({
      name: 'rigid',
      expression: 'count(d in divisors : d.k3)',
      type: 'integer',
      stage: 'topology',
      unit: null,
    })
    expect(column('favourable').type).toBe('truth')
  })

  it('is known by what it means: name, layout and remarks change no hash', () => {
    expect(hash('a = volume+1 # one')).toBe(hash('volume + 1'))
    expect(hash('volume + 1')).not.toBe(hash('volume + 2'))
  })

  it('is taken at the place on the ray, where that matters', () => {
    expect(hash('volume', volume100)).not.toBe(hash('volume'))
    expect(hash('h11 + 1', volume100)).toBe(hash('h11 + 1'))
    expect(evaluateColumn(column('volume', volume100), inventedCandidate())).toEqual({
      value: expect.closeTo(100, 9),
    })
  })

  it('has the value that a report would have, or the reason why it has none', () => {
    const candidate = inventedCandidate()
    expect(evaluateColumn(column('1 + 1'), candidate)).toEqual({ value: 2 })
    expect(evaluateColumn(column('1 < 2'), candidate)).toEqual({ value: true })
    expect(evaluateColumn(column('log10(h11 - h11)'), candidate)).toEqual({
      value: null,
      reason: expect.stringMatching(/^log10 .*\(column 1\)$/),
    })
  })

  it.each([
    ['', 'empty-column', 0],
    ['  # nothing', 'empty-column', 0],
    ['volum', 'unknown-name', 0],
    ['1 +\n  volum', 'unknown-name', 6],
    ['volume, h11', 'not-one-expression', 8],
    ['volume require favourable', 'not-one-expression', 7],
    ['volume score 1', 'not-one-expression', 7],
    ['volume\nat volume 3', 'not-one-expression', 7],
    ['divisors', 'set-as-value', 0],
  ])('refuses %j (%s at %i)', (text, code, from) => {
    const check = checkColumn(text, volume100)
    expect(check.ok).toBe(false)
    expect(check.issues[0]).toMatchObject({ code, from, severity: 'error' })
  })

  it('says line, column and repair in its own text', () => {
    const [issue] = checkColumn('1 +\n  volum').issues
    expect(issue).toMatchObject({ line: 2, column: 3, from: 6, to: 11 })
    expect(issue.suggestion).toMatchObject({ from: 6, to: 11, insert: 'volume' })
  })

  it.each(['(volume', 'volume)', 'count(d in divisors', '1 +', 'label "x"', '= 3', '"'])(
    'says of %j what is wrong, inside the text',
    (text) => {
      const check = checkColumn(text)
      expect(check.ok).toBe(false)
      expect(check.issues.length).toBeGreaterThan(0)
      for (const { from, to } of check.issues) {
        expect(from).toBeGreaterThanOrEqual(0)
        expect(to).toBeLessThanOrEqual(text.length)
      }
    },
  )
})
