import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../scoring/errors.ts'
import { hull } from '../../scoring/geometry/hull.ts'
import { gcdOf } from '../../scoring/geometry/integers.ts'
import { normalForm } from '../../scoring/geometry/normalForm.ts'
import { dualPolytope, polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { affineDimension } from '../../scoring/geometry/polytopeInput.ts'
import { polytopeFromWeights } from '../../scoring/geometry/weights.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'

describe('numbers of reflexive polytopes', () => {
  // Kreuzer, Skarke (hep-th/0002240) and Altman et al. (arXiv:1411.1418, table of polytopes with h11 up to 6; there
  // the favourable ones too): 5, 36, 244, 1,197, 4,990 with h11 = 1..5.
  it('bundled with h11 = 1 to 5 are pairwise inequivalent and as many as there are', () => {
    const keys = new Map<number, Set<string>>()
    const favourable = new Map<number, number>()
    for (const { vertices } of [...bundledPolytopes('small'), ...bundledPolytopes('h11-5')]) {
      const polytope = polytopeFromPoints(vertices)
      const { h11 } = polytope.hodge
      keys.set(h11, (keys.get(h11) ?? new Set()).add(normalForm(polytope).key))
      favourable.set(h11, (favourable.get(h11) ?? 0) + (polytope.favourable ? 1 : 0))
    }
    const digest = createHash('sha256')
    for (const key of [...keys.values()].flatMap((set) => [...set]).sort()) digest.update(key)
    // Addresses are permanent: this changes only with every stored candidate.
    expect(digest.digest('hex')).toBe('3faf8ae0ca5f028cfa079ab9035d4b3e87e76a76679a048eae096016967db723')
    const found = [1, 2, 3, 4, 5].map((h11) => [h11, keys.get(h11)?.size, favourable.get(h11)])
    expect(found).toEqual([
      [1, 5, 5],
      [2, 36, 36],
      [3, 244, 243],
      [4, 1197, 1185],
      [5, 4990, 4897],
    ])
  }, 240_000)

  it('bundled in the larger set are pairwise inequivalent', () => {
    const keys = bundledPolytopes('large').map(({ vertices }) => normalForm(polytopeFromPoints(vertices)).key)
    expect(new Set(keys).size).toBe(76)
  })
})

/** Partitions of `total` into `parts` positive parts in ascending order, without a common factor. */
function* primitiveSystems(total: number, parts: number): Generator<number[]> {
  function* partitions(rest: number, count: number, least: number): Generator<number[]> {
    if (count === 1) yield [rest]
    else {
      for (let first = least; first * count <= rest; first++) {
        for (const others of partitions(rest - first, count - 1, first)) yield [first, ...others]
      }
    }
  }
  for (const weights of partitions(total, parts, 1)) if (gcdOf(weights) === 1) yield weights
}

describe('weight systems', () => {
  // Counted by us with other means. That an interior monomial x1 x2 x3 x4 x5 implies reflexivity is a theorem
  // (Skarke, alg-geom/9603007).
  it('of the 16,587 primitive ones with d < 46, 3,208 give a reflexive Newton polytope', () => {
    const outcomes = new Map<string, number>()
    for (let degree = 5; degree < 46; degree++) {
      for (const weights of primitiveSystems(degree, 5)) {
        let outcome = 'reflexive'
        try {
          polytopeFromWeights(weights, 'newton')
        } catch (error) {
          if (!(error instanceof InputError)) throw error
          outcome = error.code
        }
        outcomes.set(outcome, (outcomes.get(outcome) ?? 0) + 1)
      }
    }
    expect(Object.fromEntries(outcomes)).toEqual({
      reflexive: 3208,
      'weights.not-four-dimensional': 1382,
      'weights.not-interior': 11997,
    })
  }, 240_000)

  // Reid's 95 weighted K3 surfaces; as weight systems with the interior-point property: Skarke, alg-geom/9603007.
  // The largest degree is 66 (from memory).
  it('with four weights and the interior-point property are 95', () => {
    let count = 0
    let largest = 0
    for (let degree = 4; degree <= 72; degree++) {
      for (const weights of primitiveSystems(degree, 4)) {
        if (2 * weights[3] > degree || !hasInteriorPoint(weights, degree)) continue
        count++
        largest = degree
      }
    }
    expect([count, largest]).toEqual([95, 66])
  })
})

/** Is (1,1,1,1) interior to the hull of the monomials? The solid is suspended to four dimensions. */
function hasInteriorPoint(weights: readonly number[], degree: number): boolean {
  const solid: number[][] = []
  for (let a = 0; a * weights[3] <= degree; a++) {
    for (let b = 0; a * weights[3] + b * weights[2] <= degree; b++) {
      for (let c = 0; a * weights[3] + b * weights[2] + c * weights[1] <= degree; c++) {
        const rest = degree - a * weights[3] - b * weights[2] - c * weights[1]
        if (rest % weights[0] === 0) solid.push([a - 1, b - 1, c - 1, 0])
      }
    }
  }
  if (affineDimension(solid) < 3) return false
  return hull([...solid, [0, 0, 0, 1], [0, 0, 0, -1]]).kind === 'hull'
}

describe('lattice points', () => {
  // Kreuzer, Skarke (hep-th/0002240): the polytope with h11 = 491 has 680 lattice points.
  it('of the polytope with the largest h11', () => {
    const newton = polytopeFromWeights([1, 1, 12, 28, 42], 'newton')
    expect([newton.latticePoints, newton.pointCount, newton.vertexCount]).toEqual([680, 495, 5])
    expect(newton.twoFaces.reduce((sum, { area }) => sum + area, 0)).toBe(1091)
    const mirror = dualPolytope(newton)
    expect([mirror.latticePoints, mirror.pointCount]).toEqual([26, 15])
  })

  // The weights (41,42,498,1162,1743), d = 3,486, have the largest degree of all (Kreuzer, Skarke hep-th/9805190,
  // from memory) and give the same pair of polytopes with its sides exchanged.
  it('of the weight system with the largest degree', () => {
    const fan = normalForm(polytopeFromWeights([41, 42, 498, 1162, 1743], 'fan'))
    const newton = normalForm(polytopeFromWeights([1, 1, 12, 28, 42], 'newton'))
    expect(fan.key).toBe(newton.key)
  })
})
