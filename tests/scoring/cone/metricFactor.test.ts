import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import { factoriseDense, solveDense } from '../../../scoring/geometry/denseCholesky.ts'
import { inverseMetric, relationSpace } from '../../../scoring/geometry/fieldSpaceMetric.ts'
import { MetricFactor } from '../../../scoring/geometry/metricFactor.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { classOf, someVertices, stagesOf, volumesAt } from './stages.ts'

describe('sparse factor of the metric', () => {
  it('solves like the dense factor', () => {
    const ids = ['w50-7', 'w60-20', 'w86-2', 'w93-87', 'w120-6-fan']
    const vertices = [
      ...someVertices(100).map((sample) => sample.vertices),
      ...ids.map((id) => largePolytope(id).vertices),
    ]
    for (const rows of vertices) {
      const { polytope, pairs, volumes } = stagesOf(classOf(rows, 8))
      const { others } = relationSpace(polytope)
      const dense = inverseMetric(pairs, volumes, others)
      expect(factoriseDense(others.length, dense)).toBe(true)
      const right = Float64Array.from(others, (p) => 1 + (p % 5))
      const solution = Float64Array.from(right)
      new MetricFactor(others, pairs, volumes).solve(solution, solution)
      solveDense(others.length, dense, right)
      const size = Math.max(...right.map(Math.abs))
      right.forEach((value, a) => expect(Math.abs(solution[a] - value)).toBeLessThan(1e-9 * size))
    }
  })

  it('refuses a point outside the cone where the metric is not positive', () => {
    // With 2 V in place of V the direction of J has w^T M w = 4 (9 - 12) V^2 < 0.
    const { polytope, pairs, volumes } = stagesOf(classOf(largePolytope('w10-46').vertices, 1))
    const { others } = relationSpace(polytope)
    expect(() => new MetricFactor(others, pairs, { ...volumes, total: 2 * volumes.total })).toThrow(
      InvariantError,
    )
  })

  it('has no volume to start from at a negative class', () => {
    const stages = stagesOf(classOf(largePolytope('w10-46').vertices, 1))
    const negative = stages.reference.weights.map((w) => -w)
    expect(() => volumesAt(stages, negative)).toThrow(InvariantError)
  })
})
