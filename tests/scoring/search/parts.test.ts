import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { STAGES } from '../../../scoring/observables/observable.ts'
import { compareOutcomes, type Outcome } from '../../../scoring/rules/outcome.ts'
import { isAccepted, stepCost } from '../../../scoring/search/acceptance.ts'
import { codeOfHeights } from '../../../scoring/search/heightsCode.ts'
import { gaugedHeights, searchHeightBound } from '../../../scoring/search/heightGauge.ts'
import { compareMerits, meritOf } from '../../../scoring/search/merit.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import { islandBudget } from '../../../scoring/search/settings.ts'
import { TopList } from '../../../scoring/search/topList.ts'
import { witnessHeights } from '../../../scoring/search/witness.ts'
import { problemOf } from './problems.ts'

const outcomes: fc.Arbitrary<Outcome> = fc.oneof(
  fc.record({
    kind: fc.constant('feasible' as const),
    score: fc.integer({ min: -5, max: 5 }),
    hit: fc.constant(null),
    report: fc.constant({}),
  }),
  fc.record({
    kind: fc.constant('infeasible' as const),
    stage: fc.constantFrom(...STAGES),
    shortfall: fc.integer({ min: 1, max: 4 }),
    failed: fc.constant([]),
  }),
  fc.record({
    kind: fc.constant('undefined' as const),
    reason: fc.constant('none'),
    stage: fc.constantFrom(...STAGES),
  }),
)

describe('merit', () => {
  it('orders candidates as outcomes are ordered', () => {
    fc.assert(
      fc.property(outcomes, outcomes, (a, b) => {
        const order = Math.sign(compareOutcomes(a, '', b, ''))
        expect(Math.sign(compareMerits(meritOf(a), meritOf(b)))).toBe(order)
      }),
    )
  })
})

describe('acceptance', () => {
  const temperatures = { score: 0.5, shortfall: 0.2 }

  it('takes every step that is not worse, and worse ones the less the worse they are', () => {
    fc.assert(
      fc.property(outcomes, outcomes, (a, b) => {
        const [current, proposed] = [meritOf(a), meritOf(b)]
        const cost = stepCost(current, proposed, temperatures)
        if (compareMerits(proposed, current) <= 0) expect(cost).toBe(0)
        else expect(cost).toBeGreaterThan(0)
        expect(isAccepted(current, proposed, temperatures, 0.999999)).toBe(cost < 1e-6)
      }),
    )
  })

  it('has the probability exp(-loss / temperature) between feasible candidates', () => {
    const current = { kind: meritOf({ kind: 'feasible', score: 0, hit: null, report: {} }).kind, value: 1 }
    const proposed = { ...current, value: 0.5 }
    expect(stepCost(current, proposed, temperatures)).toBeCloseTo(1, 12)
    expect(isAccepted(current, proposed, temperatures, Math.exp(-1) - 1e-9)).toBe(true)
    expect(isAccepted(current, proposed, temperatures, Math.exp(-1) + 1e-9)).toBe(false)
  })
})

describe('list of the best', () => {
  const row = fc.record({ classKey: fc.stringMatching(/^[0-9a-f]{2}$/), outcome: outcomes })

  it('is what sorting all distinct candidates gives', () => {
    fc.assert(
      fc.property(fc.array(row, { maxLength: 40 }), fc.integer({ min: 1, max: 8 }), (rows, size) => {
        const distinct = [...new Map(rows.map((r) => [r.classKey, r])).values()]
        const list = new TopList(size)
        const kept = (r: (typeof distinct)[number]) => ({ ...r, polytopeKey: '', heights: '' })
        for (const r of [...distinct, ...distinct]) list.insert(kept(r))
        const expected = distinct
          .filter(({ outcome }) => outcome.kind !== 'undefined')
          .sort((a, b) => compareOutcomes(a.outcome, a.classKey, b.outcome, b.classKey))
          .slice(0, size)
        expect(list.list()).toEqual(expected.map(kept))
      }),
    )
  })
})

describe('heights of a search', () => {
  it('stay small and in their class', () => {
    const problem = problemOf(['w20-17-newton-4-4-5-5-7', 'r4-0500'], 'score volume', 'random', { budget: 1 })
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1 }), fc.nat(), (index, seed) => {
        const { polytope } = problem.polytopes.at(index)
        const { class: cls, heights } = drawNull(polytope, new RandomStream(seededState(seed)))
        const witness = witnessHeights(cls, heights)
        expect(isGeneric(cls, witness)).toBe(true)
        expect(fineClass(polytope, witness)?.triangles).toEqual(cls.triangles)
        expect(codeOfHeights(witness).startsWith('i')).toBe(true)
        for (let p = 0; p < witness.length; p++)
          expect(Math.abs(witness[p])).toBeLessThanOrEqual(searchHeightBound)
      }),
      { numRuns: 40 },
    )
  })

  it('do not depend on a linear function added to them', () => {
    const problem = problemOf(['w20-17-newton-4-4-5-5-7'], 'score volume', 'random', { budget: 1 })
    const { polytope } = problem.polytopes.at(0)
    const heights = quadraticHeights(polytope)
    const cls = fineClass(polytope, heights)
    if (cls === undefined) throw new Error('quadratic heights are fine')
    const tilted = heights.map((height, p) => {
      const [x, y, z, t] = polytope.points.subarray(4 * p, 4 * p + 4)
      return height + 1e6 * x - 2e6 * y + 3e6 * z + 4e6 * t
    })
    expect(gaugedHeights(cls, tilted)).toEqual(gaugedHeights(cls, heights))
  })
})

describe('budget', () => {
  it('is shared out to the last evaluation', () => {
    for (const [budget, islands] of [
      [10, 3],
      [2000, 2],
      [7, 8],
    ]) {
      // prettier-ignore
      const shares = Array.from({ length: islands }, (_, island) => islandBudget({ budget, islands }, island))
      expect(shares.reduce((a, b) => a + b)).toBe(budget)
      expect(Math.max(...shares) - Math.min(...shares)).toBeLessThanOrEqual(1)
    }
  })
})
