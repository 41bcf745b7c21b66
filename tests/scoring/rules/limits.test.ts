import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  checkRule,
  completions,
  evaluateRule,
  hoverAt,
  parseRule,
  RULE_LIMITS,
} from '../../../scoring/rules/index.ts'
import { inventedCandidate } from './inventedCandidate.ts'

const codes = (text: string) => checkRule(text).issues.map((issue) => issue.code)

describe('limits, each with its own message', () => {
  it('text length', () => {
    const checked = checkRule(`score 1${' '.repeat(RULE_LIMITS.textLength)}`)
    expect(checked.issues).toMatchObject([
      {
        code: 'too-long',
        message: 'the rule has 20,007 characters; the limit is 20,000',
        from: 20000,
        to: 20007,
      },
    ])
  })

  it('nodes', () => {
    const lets = (count: number) =>
      Array.from({ length: count }, (_, at) => `let a${at} = 1${' + 1'.repeat(199)}\n`)
    expect(codes(`${lets(4).join('')}score a0 + a1 + a2 + a3 + volume`)).toEqual([])
    expect(codes(`${lets(5).join('')}score a0 + a1 + a2 + a3 + a4`)).toContain('too-many-nodes')
  })

  it('operators', () => {
    expect(codes(`score volume${' + 1'.repeat(250)}`)).toEqual([])
    expect(codes(`score volume${' + 1'.repeat(251)}`)).toEqual(['too-many-operators'])
    const heavy = `max(d in divisors : ${'d.volume + '.repeat(100)}1)`
    expect(codes(`score ${heavy}${' + 1'.repeat(150)}`)).toEqual([])
    expect(codes(`score ${'-'.repeat(9000)}1`)).toEqual(['too-many-operators'])
    expect(codes(`score ${'2^'.repeat(9000)}1`)).toEqual(['too-many-operators'])
  })

  it('nesting', () => {
    const brackets = (depth: number) => `score volume + ${'('.repeat(depth)}1${')'.repeat(depth)}`
    expect(codes(brackets(98))).toEqual([])
    expect(codes(brackets(102))).toEqual(['too-deep'])
    expect(codes(brackets(9000))).toEqual(['too-deep'])
    expect(codes(`score ${'-'.repeat(200)}1`)).toEqual(['too-deep'])
    expect(codes(`score ${'2^'.repeat(200)}1`)).toEqual(['too-deep'])
    expect(codes(`score ${'abs('.repeat(3000)}1${')'.repeat(3000)}`)).toEqual(['too-deep'])
    expect(codes(`score ${'('.repeat(9000)}1`)).toEqual(['too-deep'])
  })

  it('issues', () => {
    expect(codes('let 1\n'.repeat(3000))).toHaveLength(RULE_LIMITS.issues)
    expect(codes('score q + r\n'.repeat(200))).toHaveLength(RULE_LIMITS.issues)
  })

  it('long chains check, format and evaluate', () => {
    for (const chain of [' + 1'.repeat(250), ' * 1'.repeat(250), ' else 1'.repeat(90)]) {
      const checked = checkRule(`score volume${chain}`)
      expect(checked.issues).toEqual([])
      if (checked.ok)
        expect(evaluateRule(checked.rule, inventedCandidate())).toMatchObject({ kind: 'feasible' })
    }
    expect(checkRule(`score volume\nhit true${' and true'.repeat(250)}`).ok).toBe(true)
  })
})

describe('whatever is typed', () => {
  const fragment = fc.oneof(
    fc.constantFrom(
      'score',
      'require',
      'let',
      'hit',
      'report',
      'at',
      'volume',
      'd',
      'in',
      'divisors',
      'where',
      ':',
      '(',
      ')',
      ',',
      '.',
      '=',
      '==',
      '<',
      '+',
      '-',
      '*',
      '/',
      '^',
      '1',
      '2.5',
      '"',
      '"x"',
      'label',
      '#',
      '\n',
      'not',
      'and',
      'or',
      'else',
      'count',
      'min',
      'any',
      'log10',
      'metric',
      'top',
      'smallest',
      'divisor',
      'x',
      '&',
      '[',
      '__proto__',
      'é',
    ),
    fc.string({ unit: 'binary', maxLength: 4 }),
  )
  const texts = fc.oneof(
    fc.string({ unit: 'binary', maxLength: 200 }),
    fc.array(fragment, { maxLength: 40 }).map((parts) => parts.join(' ')),
    fc.array(fragment, { maxLength: 40 }).map((parts) => parts.join('')),
  )

  it('nothing throws, and every issue lies inside the text', () => {
    fc.assert(
      fc.property(texts, (text) => {
        parseRule(text)
        const checked = checkRule(text)
        expect(checked.ok).toBe(checked.issues.every((issue) => issue.severity === 'warning'))
        for (const { from, to, line, column, message, suggestion } of checked.issues) {
          expect(0 <= from && from <= to && to <= text.length).toBe(true)
          expect(line >= 1 && column >= 1 && message.length > 0).toBe(true)
          if (suggestion) expect(suggestion.from <= suggestion.to && suggestion.to <= text.length).toBe(true)
        }
        if (checked.ok) evaluateRule(checked.rule, inventedCandidate())
      }),
      { numRuns: 400 },
    )
  })

  it('completion and hover answer everywhere', () => {
    fc.assert(
      fc.property(texts, fc.nat(), (text, place) => {
        const position = text.length === 0 ? 0 : place % (text.length + 1)
        const found = completions(text, position)
        if (found) expect(found.from <= position && position <= found.to).toBe(true)
        hoverAt(text, position)
      }),
      { numRuns: 300 },
    )
  })
})
