import { describe, expect, it } from 'vitest'
import { polygonType } from '../../scoring/geometry/reflexivePolygons.ts'

type Vector = readonly [number, number]

/** The points around a polygon from its turns: v_{k+1} = a_k v_k - v_{k-1}, beginning with a basis. */
function around(turns: readonly number[]): Vector[] {
  const points: Vector[] = [
    [1, 0],
    [0, 1],
  ]
  for (let k = 1; points.length < turns.length + 2; k++) {
    const turn = turns[k % turns.length]
    points.push([turn * points[k][0] - points[k - 1][0], turn * points[k][1] - points[k - 1][1]])
  }
  return points
}

/** True when the points close up after going around once. */
function closesOnce(turns: readonly number[]): boolean {
  const points = around(turns)
  const [last, first] = points.slice(-2)
  // Consecutive points are less than half a turn apart, so going around once crosses the positive axis once.
  const crossings = points.slice(0, -2).filter(([x, y], k) => {
    const [u, v] = points[k + 1]
    return y < 0 && (v > 0 || (v === 0 && u > 0)) && x * v - y * u > 0
  })
  return (
    String([last, first]) ===
      String([
        [1, 0],
        [0, 1],
      ]) && crossings.length === 1
  )
}

/** Sequences of numbers from -2 to 2 with a given sum. */
function* sequences(length: number, sum: number): Generator<number[]> {
  if (length === 0) {
    if (sum === 0) yield []
    return
  }
  for (let first = -2; first <= 2; first++) {
    if (sum - first > 2 * (length - 1) || sum - first < -2 * (length - 1)) continue
    for (const rest of sequences(length - 1, sum - first)) yield [first, ...rest]
  }
}

/** The least of all rotations and reflections. */
function canonical(turns: readonly number[]): string {
  const images = turns.flatMap((_, k) => {
    const rotated = [...turns.slice(k), ...turns.slice(0, k)]
    return [rotated.join(), [...rotated].reverse().join()]
  })
  return images.sort()[0]
}

/** Turns of the dual polygon: a dual vertex per edge, and points along the dual edge of length 2 - a of each vertex. */
function dualTurns(turns: readonly number[]): number[] {
  const points = around(turns).slice(0, turns.length)
  // m with <m, v> = <m, w> = -1 for consecutive v, w, which form a basis.
  const normals = points.map(([a, b], k): Vector => {
    const [c, d] = points[(k + 1) % points.length]
    return [b - d, c - a]
  })
  const boundary = normals.flatMap((m, k): Vector[] => {
    const next = normals[(k + 1) % normals.length]
    const steps = 2 - turns[(k + 1) % turns.length]
    return Array.from({ length: steps }, (_, s) => [
      m[0] + (s * (next[0] - m[0])) / steps,
      m[1] + (s * (next[1] - m[1])) / steps,
    ])
  })
  const count = boundary.length
  return boundary.map((_, k) => {
    const before = boundary[(k + count - 1) % count]
    const after = boundary[(k + 1) % count]
    return before[0] * after[1] - before[1] * after[0]
  })
}

// The points around a reflexive polygon are the rays of a smooth complete toric surface whose curves have
// self-intersection -a_i >= -2, and conversely; Noether's formula gives sum (3 - a_i) = 12.
const polygons = new Map<string, number[]>()
for (let points = 3; points <= 12; points++) {
  for (const turns of sequences(points, 3 * points - 12))
    if (closesOnce(turns)) polygons.set(canonical(turns), turns)
}

describe('reflexive polygons', () => {
  // Kreuzer, Skarke, hep-th/0002240: 16 in two dimensions; 1, 3, 2, 4, 2, 3, 1 of them with 3 to 9 boundary points.
  it('are 16, told apart by their numbers', () => {
    const found = [...polygons.values()]
    expect(found.map(polygonType).sort((a, b) => a - b)).toEqual(Array.from({ length: 16 }, (_, n) => n + 1))
    const counts = [3, 4, 5, 6, 7, 8, 9].map((n) => found.filter(({ length }) => length === n).length)
    expect(counts).toEqual([1, 3, 2, 4, 2, 3, 1])
  })

  // The twelve-point theorem (Poonen, Rodriguez-Villegas 2000, from memory). Duality of the numbers: Klevers et al.,
  // arXiv:1408.4808 (from memory).
  it('have twelve boundary points together with their duals, F_i and F_{17-i} for i <= 6', () => {
    for (const turns of polygons.values()) {
      const dual = dualTurns(turns)
      expect(turns.length + dual.length).toBe(12)
      const type = polygonType(turns)
      expect(polygonType(dual)).toBe(type >= 7 && type <= 10 ? type : 17 - type)
    }
  })

  // Gauge groups of the same paper's threefolds (from memory): SU(n) factors from edges with n - 1 inner points.
  it('have the inner points on edges that the numbers promise', () => {
    const inner = new Map<number, string>()
    for (const turns of polygons.values()) {
      const start = turns.findIndex((turn) => turn !== 2)
      const lengths: number[] = []
      for (let k = 0; k < turns.length; k++) {
        if (turns[(start + k) % turns.length] === 2) lengths[lengths.length - 1]++
        else lengths.push(1)
      }
      inner.set(
        polygonType(turns),
        lengths
          .filter((length) => length > 1)
          .sort()
          .join(),
      )
    }
    expect([...inner].sort(([a], [b]) => a - b).map(([, lengths]) => lengths)).toEqual([
      '',
      '',
      '',
      '2',
      '',
      '2',
      '',
      '2,2',
      '2',
      '2,3',
      '2,3',
      '2,2',
      '2,2,4',
      '2,2,3',
      '2,2,2,2',
      '3,3,3',
    ])
  })
})
