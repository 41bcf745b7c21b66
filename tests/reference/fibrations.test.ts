import { describe, expect, it } from 'vitest'
import { boundaryLattice } from '../../scoring/geometry/boundaryLattice.ts'
import { enumerateClasses } from '../../scoring/geometry/enumeration.ts'
import { fibrationBase } from '../../scoring/geometry/fibrationBase.ts'
import { fibrations, type Fibrations } from '../../scoring/geometry/fibrations.ts'
import { intersectionNumber, intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints, type Polytope } from '../../scoring/geometry/polytope.ts'
import { reflexiveSections } from '../../scoring/geometry/sections.ts'
import { referenceClass, type TwoFaceClass } from '../../scoring/geometry/twoFaceClass.ts'
import { polytopeFromWeights } from '../../scoring/geometry/weights.ts'
import { diagonalDelPezzoDegrees } from '../../scoring/observables/specialDivisors.ts'
import { bundledPolytopes, largePolytope } from './bundledPolytopes.ts'

function onReferenceClass(polytope: Polytope) {
  const cls = referenceClass(polytope)
  const numbers = intersectionNumbers(cls)
  return { polytope, numbers, found: fibrations(cls, numbers) }
}

const ofWeights = (...weights: number[]) => onReferenceClass(polytopeFromWeights(weights, 'fan'))

/** Weights w_v > 0 without common factor with sum_v w_v v = 0 for the four vertices of a section, ascending. */
function weightsOfSection(polytope: Polytope, at: number): number[] {
  const { points } = boundaryLattice(polytope)
  const { vertices } = reflexiveSections(polytope).solid[at]
  expect(vertices).toHaveLength(4)
  const range = Array.from({ length: 45 }, (_, n) => n + 1)
  const coordinate = (v: number, axis: number): number => points[4 * vertices[v] + axis]
  const balanced = (w: readonly number[]): boolean =>
    [0, 1, 2, 3].every((axis) => w.reduce((sum, weight, v) => sum + weight * coordinate(v, axis), 0) === 0)
  for (const a of range)
    for (const b of range)
      for (const c of range)
        for (const d of range) if (balanced([a, b, c, d])) return [a, b, c, d].sort((x, y) => x - y)
  throw new Error('no small weights')
}

const rays = ({ genusOne }: Fibrations, at = 0): number[][] =>
  Array.from({ length: genusOne[at].baseRays.length / 2 }, (_, k) => [
    ...genusOne[at].baseRays.slice(2 * k, 2 * k + 2),
  ])

describe('known fibrations', () => {
  // Candelas, de la Ossa, Font, Katz, Morrison 1993, hep-th/9308083 (from memory): K3 fibrations, the fibres a quartic
  // and a sextic in weights (1,1,1,3).
  it('weights (1,1,2,2,2) and (1,1,2,2,6), h = (2,86) and (2,128), are fibred by K3 surfaces', () => {
    for (const [weights, fibre] of [
      [
        [1, 1, 2, 2, 2],
        [1, 1, 1, 1],
      ],
      [
        [1, 1, 2, 2, 6],
        [1, 1, 1, 3],
      ],
    ]) {
      const { polytope, found } = ofWeights(...weights)
      expect([found.k3.length, found.genusOne.length]).toEqual([1, 0])
      expect(weightsOfSection(polytope, found.k3[0].section)).toEqual(fibre)
    }
  })

  // Candelas, Font, Katz, Morrison 1994, hep-th/9403187 (from memory): elliptic over the projective plane; the section
  // is the plane itself, so E^3 = 9.
  it('weights (1,1,1,6,9), h = (2,272), are elliptic over the projective plane', () => {
    const { polytope, numbers, found } = ofWeights(1, 1, 1, 6, 9)
    expect([found.k3.length, found.genusOne.length]).toEqual([0, 1])
    const [{ section, degree }] = found.genusOne
    const { type, points } = reflexiveSections(polytope).planar[section]
    expect([type, degree]).toEqual([10, 1])
    const [a, b, c] = rays(found)
    expect(rays(found)).toHaveLength(3)
    expect([a[0] + b[0] + c[0], a[1] + b[1] + c[1], Math.abs(a[0] * b[1] - a[1] * b[0])]).toEqual([0, 0, 1])
    const degrees = diagonalDelPezzoDegrees(numbers, new Int32Array(polytope.pointCount).fill(1))
    const sectionDivisor = degrees.findIndex((value) => value === 9)
    expect([...points]).toContain(sectionDivisor)
  })

  // Morrison, Vafa 1996, hep-th/9603161 (from memory): weights (1,1,12,28,42), h = (11,491), elliptic over the Hirzebruch
  // surface F_12, with the K3 fibre of weights (1,6,14,21).
  it('weights (1,1,12,28,42), h = (11,491), are elliptic over F_12 with a K3 fibre', () => {
    const { polytope, found } = ofWeights(1, 1, 12, 28, 42)
    expect(polytope.hodge).toMatchObject({ h11: 11, h21: 491 })
    expect([found.k3.length, found.genusOne.length, found.nested]).toEqual([1, 1, [[0, 0]]])
    expect(weightsOfSection(polytope, found.k3[0].section)).toEqual([1, 6, 14, 21])
    expect(reflexiveSections(polytope).planar[found.genusOne[0].section].type).toBe(10)
    expect(found.genusOne[0].degree).toBe(1)
    expect(selfIntersections(rays(found)).sort((a, b) => a - b)).toEqual([-12, 0, 0, 12])
  })
})

/** D_k^2 on a smooth complete toric surface: v_{k-1} + v_{k+1} = - D_k^2 v_k. */
function selfIntersections(fan: readonly number[][]): number[] {
  return fan.map((ray, k) => {
    const before = fan[(k + fan.length - 1) % fan.length]
    const after = fan[(k + 1) % fan.length]
    expect(before[0] * ray[1] - before[1] * ray[0]).toBe(1)
    return before[1] * after[0] - before[0] * after[1] + 0
  })
}

describe('fibres by intersection numbers', () => {
  const ids = ['w3-243', 'w9-39', 'w11-491', 'w18-18', 'w18-72', 'w25-11', 'w40-8', 'w90-6-fan']
  const some = [...bundledPolytopes('small').filter((_, at) => at % 60 === 7), ...ids.map(largePolytope)].map(
    ({ vertices }) => onReferenceClass(polytopeFromPoints(vertices)),
  )

  it('the genus-one fibre meets the divisors of its corners as often as their dual edges are long, and no others', () => {
    let fibres = 0
    let split = 0
    for (const { polytope, numbers, found } of some) {
      const { planar } = reflexiveSections(polytope)
      for (const { section, baseRays, degree } of found.genusOne) {
        const { points, turns } = planar[section]
        const expected = new Array<number>(polytope.pointCount).fill(0)
        points.forEach((p, k) => turns[k] !== 2 && (expected[p] = 2 - turns[k]))
        const { images } = fibrationBase(polytope, planar[section])
        // The fibre is the intersection of pulled-back divisors of two neighbouring rays r, s of the base, times
        // det(r, s); pulled back, D_r is the sum of phi_r(image of p) D_p with phi_r linear on the base's cones.
        const [r0, r1, s0, s1] = baseRays
        const determinant = r0 * s1 - r1 * s0
        const first = pulledBack(images, baseRays, 0)
        const second = pulledBack(images, baseRays, 1)
        for (let k = 0; k < polytope.pointCount; k++) {
          let sum = 0
          first.forEach((a, i) =>
            second.forEach((b, j) => {
              if (a !== 0 && b !== 0) sum += a * b * intersectionNumber(numbers, i, j, k)
            }),
          )
          expect(sum * determinant).toBeCloseTo(expected[k], 9)
        }
        const shares = expected.flatMap((value, p) => (value > 0 ? [value / polytope.components[p]] : []))
        expect(degree).toBe(Math.min(...shares))
        split += expected.filter((value, p) => value > 0 && polytope.components[p] > 1).length
        fibres++
      }
    }
    expect([fibres > 30, split > 0]).toEqual([true, true])
  })

  it('the K3 fibre has c2 . D = 24 and is the same divisor class from either side', () => {
    let fibres = 0
    for (const { polytope, numbers, found } of some) {
      for (const { section, fibre } of found.k3) {
        const { points } = boundaryLattice(polytope)
        const { functional } = reflexiveSections(polytope).solid[section]
        const other = fibre.map((_, p) =>
          Math.max(0, -functional.reduce((sum, f, axis) => sum + f * points[4 * p + axis], 0)),
        )
        const pairing = (divisor: Float64Array, i: number, j: number): number =>
          divisor.reduce((sum, a, p) => (a === 0 ? sum : sum + a * intersectionNumber(numbers, p, i, j)), 0)
        const { edges } = numbers
        for (let e = 0; e < edges.length; e += 2)
          expect(pairing(fibre, edges[e], edges[e + 1])).toBe(pairing(other, edges[e], edges[e + 1]))
        for (const divisor of [fibre, other])
          expect(divisor.reduce((sum, a, p) => sum + a * numbers.secondChern[p], 0)).toBe(24)
        fibres++
      }
    }
    expect(fibres).toBeGreaterThan(20)
  })
})

/** Per point, the function linear on the base's cones that is 1 on one ray and 0 on all others. */
function pulledBack(images: Int32Array, baseRays: Int32Array, at: number): number[] {
  const count = baseRays.length / 2
  const ray = (k: number): [number, number] => {
    const start = 2 * ((k + count) % count)
    return [baseRays[start], baseRays[start + 1]]
  }
  const cross = ([a, b]: readonly number[], [c, d]: readonly number[]): number => a * d - b * c
  return Array.from({ length: images.length / 2 }, (_, p) => {
    const image = [images[2 * p], images[2 * p + 1]]
    for (const side of [1, -1]) {
      const [own, other] = [ray(at), ray(at + side)]
      if (side * cross(own, image) >= 0 && side * cross(image, other) > 0)
        return cross(image, other) / cross(own, other)
    }
    return 0
  })
}

describe('pairs of a class and a section of its polytope', () => {
  // Our own count, over all fine regular classes before symmetry. Up to h11 = 4 two programs of ours agree: see
  // tests/long/fibrationCounts.ts.
  it('that fibre the class, for h11 <= 3', () => {
    const counts = { planar: 0, genusOne: 0, solid: 0, k3: 0 }
    for (const { vertices, h11 } of bundledPolytopes('small')) {
      if (h11 > 3) continue
      const polytope = polytopeFromPoints(vertices)
      const { planar, solid } = reflexiveSections(polytope)
      enumerateClasses(polytope).classes.forEach((cls: TwoFaceClass) => {
        const found = fibrations(cls, intersectionNumbers(cls))
        counts.planar += planar.length
        counts.genusOne += found.genusOne.length
        counts.solid += solid.length
        counts.k3 += found.k3.length
      })
    }
    expect(counts).toEqual({ planar: 236, genusOne: 213, solid: 260, k3: 185 })
  })
})
