import { describe, expect, it } from 'vitest'
import { exactOptimum, namedPolytopes, optimumRules, searchFor } from './exactOptimum.ts'

describe('guided search against enumeration', () => {
  // A slice of tests/long/exactOptimum.ts: five polytopes, three rules, a hundred seeds.
  it('finds the best of all with a tenth of the candidates scored', () => {
    const [, polytope] = namedPolytopes
    const optimum = exactOptimum(polytope, optimumRules.divisor)
    expect(optimum.candidates).toBe(polytope.classes)
    for (const seed of [1, 2, 3, 4, 5]) {
      const evaluations = searchFor(optimum, 'annealing', seed)
      expect(evaluations).not.toBeNull()
      expect(evaluations).toBeLessThanOrEqual(optimum.budget)
    }
  })
})
