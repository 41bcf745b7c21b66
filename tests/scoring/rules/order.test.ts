import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkRule, compareOutcomes, type Outcome, scoringHash } from '../../../scoring/rules/index.ts'

const feasible = (score: number): Outcome => ({ kind: 'feasible', score, hit: null, report: {} })
const infeasible = (stage: 'polytope' | 'topology' | 'cone' | 'metric', shortfall: number): Outcome => ({
  kind: 'infeasible',
  stage,
  shortfall,
  failed: [],
})
const unknown: Outcome = { kind: 'undefined', reason: 'log10 needs a positive number', stage: 'cone' }

describe('compareOutcomes', () => {
  it('puts feasible before infeasible before undefined, and orders each kind', () => {
    const best: [Outcome, string][] = [
      [feasible(2), 'k'],
      [feasible(1), 'a'],
      [feasible(1), 'b'],
      [infeasible('metric', 9), 'k'],
      [infeasible('cone', 0.1), 'k'],
      [infeasible('cone', 0.2), 'k'],
      [infeasible('polytope', 0.01), 'k'],
      [unknown, 'a'],
      [unknown, 'b'],
    ]
    const shuffled = [4, 8, 0, 6, 2, 7, 1, 5, 3].map((at) => best[at])
    expect(shuffled.sort(([a, keyA], [b, keyB]) => compareOutcomes(a, keyA, b, keyB))).toEqual(best)
  })

  it('is a total order', () => {
    const outcomes = fc.oneof(
      fc.integer({ min: -2, max: 2 }).map(feasible),
      fc
        .tuple(fc.constantFrom('polytope' as const, 'cone' as const), fc.integer({ min: 1, max: 2 }))
        .map(([s, f]) => infeasible(s, f)),
      fc.constant(unknown),
    )
    const keyed = fc.tuple(outcomes, fc.constantFrom('a', 'b', 'c'))
    fc.assert(
      fc.property(keyed, keyed, keyed, ([a, ka], [b, kb], [c, kc]) => {
        const ab = compareOutcomes(a, ka, b, kb)
        expect(Math.sign(ab)).toBe(-Math.sign(compareOutcomes(b, kb, a, ka)) + 0)
        if (ab <= 0 && compareOutcomes(b, kb, c, kc) <= 0)
          expect(compareOutcomes(a, ka, c, kc)).toBeLessThanOrEqual(0)
      }),
    )
  })
})

describe('scoringHash', () => {
  const hash = (text: string, engine = '1') => {
    const checked = checkRule(text)
    if (!checked.ok) throw new Error(checked.issues[0].message)
    return scoringHash(checked.rule, engine)
  }

  it('is 64 hexadecimal digits and forgets comments, layout and needless brackets', () => {
    const first = hash('score volume')
    expect(first).toMatch(/^[0-9a-f]{64}$/)
    expect(hash('# a comment\n\nscore   (volume)  # another')).toBe(first)
  })

  it('changes with the rule, its place on the ray and the engine', () => {
    const hashes = [
      hash('score volume'),
      hash('score volume + 0'),
      hash('at scale 2\nscore volume'),
      hash('at volume 2\nscore volume'),
      hash('score volume', '2'),
    ]
    expect(new Set(hashes).size).toBe(hashes.length)
  })

  it('knows the versions of what the rule reads, `at` included', () => {
    const checked = checkRule(
      'at smallest divisor 1\nlet n = count(p in pairs : p.a.k3)\nscore n * metric.divisor.top',
    )
    expect(checked.ok && checked.rule.versions).toEqual([
      'divisors.k3@1',
      'divisors.volume@1',
      'metric.divisor.top@1',
      'pairs@1',
      'pairs.a@1',
    ])
  })
})
