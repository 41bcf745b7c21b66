import { describe, expect, it } from 'vitest'
import {
  intersectionNumber,
  intersectionNumbers,
  type IntersectionNumbers,
} from '../../scoring/geometry/intersectionNumbers.ts'
import type { Polytope } from '../../scoring/geometry/polytope.ts'
import { referenceClass } from '../../scoring/geometry/twoFaceClass.ts'
import { polytopeFromWeights } from '../../scoring/geometry/weights.ts'

/** A divisor class as a combination of prime toric divisors. */
type Combination = readonly (readonly [point: number, coefficient: number])[]

class Ring {
  readonly polytope: Polytope
  readonly numbers: IntersectionNumbers
  /** w_v for each vertex v: sum_v w_v v = 0, so that D_v has degree w_v. */
  readonly degree: number[]

  constructor(weights: readonly number[]) {
    this.polytope = polytopeFromWeights(weights, 'fan')
    this.numbers = intersectionNumbers(referenceClass(this.polytope))
    this.degree = this.vertexWeights()
  }

  triple(a: Combination, b: Combination, c: Combination): number {
    let sum = 0
    for (const [i, x] of a) {
      for (const [j, y] of b)
        for (const [k, z] of c) sum += x * y * z * intersectionNumber(this.numbers, i, j, k)
    }
    return sum
  }

  chern(a: Combination): number {
    return a.reduce((sum, [i, x]) => sum + x * this.numbers.secondChern[i], 0)
  }

  /** The prime divisor of the first vertex with this weight. */
  vertex(weight: number): Combination {
    return [[this.degree.indexOf(weight), 1]]
  }

  /** The prime divisor of the only point that is no vertex. */
  exceptional(): Combination {
    expect(this.polytope.pointCount).toBe(6)
    return [[5, 1]]
  }

  private vertexWeights(): number[] {
    const { points, vertexCount } = this.polytope
    expect(vertexCount).toBe(5)
    const rows = [0, 1, 2, 3, 4].map((v) => Array.from(points.subarray(4 * v, 4 * v + 4)))
    const minors = rows.map((_, v) => Math.abs(determinant(rows.filter((__, u) => u !== v))))
    const least = Math.min(...minors)
    return minors.map((minor) => minor / least)
  }
}

function determinant(rows: number[][]): number {
  if (rows.length === 0) return 1
  return rows[0].reduce(
    (sum, entry, n) =>
      sum + (n % 2 ? -1 : 1) * entry * determinant(rows.slice(1).map((row) => row.filter((_, c) => c !== n))),
    0,
  )
}

describe('one modulus', () => {
  // Weights (1,1,1,1,1): Candelas, de la Ossa, Green, Parkes 1991. The others: Klemm, Theisen 1992; Font 1992.
  it.each([
    { weights: [1, 1, 1, 1, 1], cube: 5, chern: 50, euler: -200 },
    { weights: [1, 1, 1, 1, 2], cube: 3, chern: 42, euler: -204 },
    { weights: [1, 1, 1, 1, 4], cube: 2, chern: 44, euler: -296 },
    { weights: [1, 1, 1, 2, 5], cube: 1, chern: 34, euler: -288 },
  ])('weights $weights: H^3 = $cube, c2.H = $chern', ({ weights, cube, chern, euler }) => {
    const ring = new Ring(weights)
    expect(ring.polytope.pointCount).toBe(5)
    expect([...ring.degree].sort((a, b) => a - b)).toEqual(weights)
    expect(ring.numbers.euler).toBe(euler)
    // D_v = w_v H.
    ring.degree.forEach((w, v) => {
      expect(ring.numbers.cubes[v]).toBe(w ** 3 * cube)
      expect(ring.numbers.secondChern[v]).toBe(w * chern)
    })
  })
})

describe('two moduli', () => {
  // Candelas, de la Ossa, Font, Katz, Morrison 1994 (hep-th/9308083). L is the prime divisor of weight 1, E that of
  // the midpoint of the edge that joins the two vertices of weight 1, H = 2 L + E, which is that of weight 2.
  it('weights (1,1,2,2,2): H^3 = 8, H^2 L = 4, c2.H = 56, c2.L = 24, E^3 = -16, c2.E = 8', () => {
    const ring = new Ring([1, 1, 2, 2, 2])
    const line = ring.vertex(1)
    const exceptional = ring.exceptional()
    for (const h of [ring.vertex(2), [...line.map(([i]) => [i, 2] as const), ...exceptional]]) {
      expect(ring.triple(h, h, h)).toBe(8)
      expect(ring.triple(h, h, line)).toBe(4)
      expect(ring.triple(h, line, line)).toBe(0)
      expect(ring.triple(line, line, line)).toBe(0)
      expect(ring.chern(h)).toBe(56)
    }
    expect(ring.chern(line)).toBe(24)
    expect(ring.triple(exceptional, exceptional, exceptional)).toBe(-16)
    expect(ring.chern(exceptional)).toBe(8)
    expect(ring.numbers.euler).toBe(2 * (2 - 86))
  })

  // Same source.
  it('weights (1,1,2,2,6): H^3 = 4, H^2 L = 2, c2.H = 52, c2.L = 24', () => {
    const ring = new Ring([1, 1, 2, 2, 6])
    const line = ring.vertex(1)
    const h = ring.vertex(2)
    expect(ring.triple(h, h, h)).toBe(4)
    expect(ring.triple(h, h, line)).toBe(2)
    expect(ring.triple(h, line, line)).toBe(0)
    expect(ring.triple(line, line, line)).toBe(0)
    expect(ring.chern(h)).toBe(52)
    expect(ring.chern(line)).toBe(24)
    expect(ring.numbers.euler).toBe(2 * (2 - 128))
  })

  // Candelas, Font, Katz, Morrison 1994 (hep-th/9403187). L is the prime divisor of weight 1, E the section,
  // H = 3 L + E; the prime divisors of weights 6 and 9 are 2 H and 3 H.
  it('weights (1,1,1,6,9): H^3 = 9, H^2 L = 3, H L^2 = 1, c2.H = 102, c2.L = 36, E^3 = 9, c2.E = -6', () => {
    const ring = new Ring([1, 1, 1, 6, 9])
    const line = ring.vertex(1)
    const section = ring.exceptional()
    const h: Combination = [...line.map(([i]) => [i, 3] as const), ...section]
    expect(ring.triple(h, h, h)).toBe(9)
    expect(ring.triple(h, h, line)).toBe(3)
    expect(ring.triple(h, line, line)).toBe(1)
    expect(ring.triple(line, line, line)).toBe(0)
    expect(ring.chern(h)).toBe(102)
    expect(ring.chern(line)).toBe(36)
    expect(ring.triple(section, section, section)).toBe(9)
    expect(ring.chern(section)).toBe(-6)
    expect(ring.triple(ring.vertex(6), ring.vertex(6), ring.vertex(6))).toBe(8 * 9)
    expect(ring.triple(ring.vertex(9), ring.vertex(9), line)).toBe(9 * 3)
    expect(ring.numbers.euler).toBe(2 * (2 - 272))
  })
})

describe('weights (1,1,12,28,42)', () => {
  // Kreuzer, Skarke, hep-th/0002240: h = (11, 491), mirror (491, 11) with 495 points, 680 lattice points in all.
  it('has Euler number 960 on the newton side, from 1,091 triangles on 495 points', () => {
    const polytope = polytopeFromWeights([1, 1, 12, 28, 42], 'newton')
    const numbers = intersectionNumbers(referenceClass(polytope))
    expect(numbers.euler).toBe(960)
    expect(numbers.pointCount).toBe(495)
    expect(numbers.triangles.length / 3).toBe(1091)
  })
})
