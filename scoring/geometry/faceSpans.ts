import { InvariantError } from '../errors.ts'
import type { Polytope, TwoFace } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'

/**
 * All points seen from the linear span of a 2-face: a lattice basis b_1, b_2, b_3 of the span (three points of
 * the face) and u that completes it to one of Z^4.
 */
export interface FaceSpan {
  /** 4 integers per point p: y_1, y_2, y_3, x with v_p = y . b + x u; x = <n, v_p>, n the primitive normal. */
  readonly coordinates: Float64Array
  /** The points with x = 0, x > 0 and x < 0, ascending. */
  readonly inside: Int32Array
  readonly above: Int32Array
  readonly below: Int32Array
}

const known = new WeakMap<Polytope, readonly FaceSpan[]>()

/** The span of every 2-face, in the order of `polytope.twoFaces`. Exact; computed once per polytope. */
export function faceSpans(polytope: Polytope): readonly FaceSpan[] {
  const before = known.get(polytope)
  if (before) return before
  const points = reducedCoordinates(polytope)
  const spans = polytope.twoFaces.map((face) => spanOf(face, points))
  known.set(polytope, spans)
  return spans
}

function spanOf(face: TwoFace, points: Float64Array): FaceSpan {
  const basis = unimodularTriple(face).map((p) => Array.from(points.subarray(4 * p, 4 * p + 4)))
  const normal = [0, 1, 2, 3].map((axis) => cofactor([...basis, [0, 0, 0, 0]], 3, axis))
  basis.push(dualVector(normal))
  const inverse = [0, 1, 2, 3].map((row) => [0, 1, 2, 3].map((axis) => cofactor(basis, row, axis)))
  const coordinates = new Float64Array(points.length)
  const sides: [number[], number[], number[]] = [[], [], []]
  for (let p = 0; p < points.length / 4; p++) {
    inverse.forEach((row, r) => {
      for (let axis = 0; axis < 4; axis++) coordinates[4 * p + r] += row[axis] * points[4 * p + axis]
    })
    const x = coordinates[4 * p + 3]
    sides[x === 0 ? 0 : x > 0 ? 1 : 2].push(p)
  }
  const [inside, above, below] = sides.map((side) => Int32Array.from(side))
  return { coordinates, inside, above, below }
}

/** The first three points of a 2-face that form a unimodular triangle: the cone over it has index 1. */
function unimodularTriple({ points, plane }: TwoFace): [number, number, number] {
  for (let b = 1; b < points.length; b++) {
    for (let c = b + 1; c < points.length; c++) {
      const area =
        (plane[2 * b] - plane[0]) * (plane[2 * c + 1] - plane[1]) -
        (plane[2 * b + 1] - plane[1]) * (plane[2 * c] - plane[0])
      if (area === 1 || area === -1) return [points[0], points[b], points[c]]
    }
  }
  throw new InvariantError('A 2-face has no unimodular triangle at its first point.')
}

/** Cofactor of entry (row, axis) of the 4 x 4 matrix with the given rows. */
function cofactor(matrix: readonly (readonly number[])[], row: number, axis: number): number {
  const [a, b, c] = [0, 1, 2, 3].filter((r) => r !== row).map((r) => matrix[r].filter((_, i) => i !== axis))
  const minor =
    a[0] * (b[1] * c[2] - b[2] * c[1]) -
    a[1] * (b[0] * c[2] - b[2] * c[0]) +
    a[2] * (b[0] * c[1] - b[1] * c[0])
  return (row + axis) % 2 === 0 ? minor : -minor
}

/** An integer vector u with <n, u> = 1 for a primitive n, by the extended Euclidean algorithm. */
function dualVector(n: readonly number[]): number[] {
  let common = 0
  let u: number[] = []
  for (const entry of n) {
    const [g, x, y] = extendedGcd(common, entry)
    u = [...u.map((value) => value * x), y]
    common = g
  }
  if (common !== 1) throw new InvariantError(`The cone over a triangle has index ${common}, not 1.`)
  return u
}

/** g = gcd(a, b) >= 0 and x, y with a x + b y = g. */
function extendedGcd(a: number, b: number): [number, number, number] {
  let [r, s] = [a, b]
  let [x, nextX] = [1, 0]
  let [y, nextY] = [0, 1]
  while (s !== 0) {
    const quotient = Math.trunc(r / s)
    ;[r, s] = [s, r - quotient * s]
    ;[x, nextX] = [nextX, x - quotient * nextX]
    ;[y, nextY] = [nextY, y - quotient * nextY]
  }
  return r < 0 ? [-r, -x, -y] : [r, x, y]
}
