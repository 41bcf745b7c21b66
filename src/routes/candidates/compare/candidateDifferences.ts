import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { drawingOf, type FaceDrawing, type Triangle } from '../../../components/geometry/faceDrawing.ts'

/** A geometry with its points named as those of another candidate on the same polytope. */
export type Relabelled = Pick<
  CandidateGeometry,
  'triangles' | 'intersections' | 'secondChern' | 'divisors' | 'reference'
>

/** @param image new name of each point: an automorphism of the polytope */
export function relabelled(geometry: CandidateGeometry, image: readonly number[]): Relabelled {
  const at = (point: number) => image[point] ?? point
  const moved = <T>(values: readonly T[]): T[] => {
    const result = [...values]
    values.forEach((value, point) => (result[at(point)] = value))
    return result
  }
  const ascending = (points: readonly [number, number, number]): [number, number, number] => {
    const [a, b, c] = points.map(at).sort((x, y) => x - y)
    return [a ?? 0, b ?? 0, c ?? 0]
  }
  return {
    triangles: geometry.triangles.map(ascending),
    intersections: geometry.intersections.map(([i, j, k, value]) => [...ascending([i, j, k]), value]),
    secondChern: moved(geometry.secondChern),
    divisors: moved(geometry.divisors),
    reference: { ...geometry.reference, weights: moved(geometry.reference.weights) },
  }
}

/** A 2-face on which two classes differ. */
export interface FaceDifference {
  readonly a: FaceDrawing
  readonly b: FaceDrawing
  /** Edges, and triangles of either class that the other does not have. */
  readonly common: readonly (readonly [number, number])[]
  readonly onlyA: readonly (readonly [number, number])[]
  readonly onlyB: readonly (readonly [number, number])[]
  readonly trianglesA: readonly Triangle[]
  readonly trianglesB: readonly Triangle[]
}

/** The 2-faces on which the triangles differ, those with most differences first. */
export function faceDifferences(a: CandidateGeometry, b: Relabelled): FaceDifference[] {
  const faces = a.polytope.twoFaces
  const facesOfPoint = new Map<number, Set<number>>()
  faces.forEach(({ points }, face) => {
    for (const point of points) {
      const known = facesOfPoint.get(point)
      if (known) known.add(face)
      else facesOfPoint.set(point, new Set([face]))
    }
  })
  const faceOf = ([i, j, k]: Triangle) => {
    for (const face of facesOfPoint.get(i) ?? []) {
      if (facesOfPoint.get(j)?.has(face) && facesOfPoint.get(k)?.has(face)) return face
    }
    return -1
  }
  const byFace = (triangles: readonly Triangle[]) => {
    const lists = faces.map((): Triangle[] => [])
    for (const triangle of triangles) lists[faceOf(triangle)]?.push(triangle)
    return lists
  }
  const listsA = byFace(a.triangles)
  const listsB = byFace(b.triangles)
  return faces
    .flatMap((face, index): FaceDifference[] => {
      const own = listsA[index] ?? []
      const other = listsB[index] ?? []
      const trianglesA = without(own, other)
      if (trianglesA.length === 0) return []
      const drawnA = drawingOf(face, index, own)
      const drawnB = drawingOf(face, index, other)
      const onlyA = without(drawnA.edges, drawnB.edges)
      return [
        {
          a: drawnA,
          b: drawnB,
          common: without(drawnA.edges, onlyA),
          onlyA,
          onlyB: without(drawnB.edges, drawnA.edges),
          trianglesA,
          trianglesB: without(other, own),
        },
      ]
    })
    .sort((x, y) => y.trianglesA.length - x.trianglesA.length || x.a.index - y.a.index)
}

function without<T extends readonly number[]>(all: readonly T[], others: readonly T[]): T[] {
  const known = new Set(others.map((entry) => entry.join(' ')))
  return all.filter((entry) => !known.has(entry.join(' ')))
}

export interface NumberDifference {
  readonly points: readonly [number, number, number]
  readonly a: number
  readonly b: number
}

/** κ_ijk that differ, zeros included; in lexicographic order. */
export function intersectionDifferences(
  a: CandidateGeometry['intersections'],
  b: CandidateGeometry['intersections'],
): NumberDifference[] {
  const known = new Map<string, { points: [number, number, number]; a: number; b: number }>()
  for (const [i, j, k, value] of a) known.set(`${i} ${j} ${k}`, { points: [i, j, k], a: value, b: 0 })
  for (const [i, j, k, value] of b) {
    const key = `${i} ${j} ${k}`
    const row = known.get(key)
    if (row) row.b = value
    else known.set(key, { points: [i, j, k], a: 0, b: value })
  }
  return [...known.values()]
    .filter((row) => row.a !== row.b)
    .sort(({ points: x }, { points: y }) => x[0] - y[0] || x[1] - y[1] || x[2] - y[2])
}

export interface DivisorDifference {
  readonly index: number
  readonly cube: readonly [number, number]
  readonly c2: readonly [number, number]
  readonly volume: readonly [number, number]
  /** τ_B / τ_A - 1. */
  readonly change: number
}

/** Volumes and eigenvalues that agree to this relative precision count as equal: both are solutions of a quadratic program. */
export const volumePrecision = 1e-7

/** Every divisor with its numbers in both classes; `differs` says in which. */
export function divisorDifferences(a: CandidateGeometry, b: Relabelled): DivisorDifference[] {
  return a.divisors.map((divisor, index) => {
    const other = b.divisors[index] ?? divisor
    const change = other.volume / divisor.volume - 1
    return {
      index,
      cube: [divisor.cube, other.cube],
      c2: [a.secondChern[index] ?? 0, b.secondChern[index] ?? 0],
      volume: [divisor.volume, other.volume],
      change: Math.abs(change) < volumePrecision ? 0 : change,
    }
  })
}

export const differs = ({ cube, c2, change }: DivisorDifference) => ({
  cube: cube[0] !== cube[1],
  c2: c2[0] !== c2[1],
  volume: change !== 0,
})
