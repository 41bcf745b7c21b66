import { InvariantError } from '../errors.ts'

/** A lattice polygon in coordinates of its own plane. */
export interface PlanePolygon {
  /** Coordinates in a lattice basis of the plane, 2 per point, the least of each coordinate 0. */
  readonly plane: Int32Array
  /** Positions of the corners among the points, counterclockwise, starting at the first corner given. */
  readonly corners: number[]
  /** Twice the Euclidean area in these coordinates. */
  readonly area: number
}

/**
 * Coordinates for a lattice polygon in Z^4, given all its lattice points: they generate the lattice of the plane,
 * because a triangulation that uses them all is unimodular. The basis is reduced (Lagrange) with respect to the
 * points' spread, so that the polygon is as round as a change of basis allows.
 *
 * @param points all lattice points of the polygon, 4 coordinates each
 * @param corners positions of the polygon's vertices among them
 */
export function facePlane(points: ArrayLike<number>, corners: readonly number[]): PlanePolygon {
  const count = points.length / 4
  const [p, q] = independentAxes(points, corners)
  // Echelon basis (a, b), (0, c) of the projected lattice; the projection is injective on the plane.
  let [a, b, c] = [0, 0, 0]
  for (let i = 0; i < count; i++) {
    let x = points[4 * i + p] - points[p]
    let y = points[4 * i + q] - points[q]
    while (x !== 0) {
      const factor = Math.trunc(a / x)
      ;[a, b, x, y] = [x, y, a - factor * x, b - factor * y]
    }
    while (y !== 0) [c, y] = [y, c % y]
    if (c !== 0) b %= c
  }
  if (a === 0 || c === 0) throw new InvariantError('The lattice points of a 2-face do not span a plane.')
  const plane = new Int32Array(2 * count)
  for (let i = 0; i < count; i++) {
    const s = (points[4 * i + p] - points[p]) / a
    plane[2 * i] = s
    plane[2 * i + 1] = (points[4 * i + q] - points[q] - s * b) / c
  }
  reduce(plane)
  shiftToZero(plane)
  return { plane, ...counterclockwise(plane, corners) }
}

/** The first two axes to which the plane projects injectively. */
function independentAxes(points: ArrayLike<number>, corners: readonly number[]): [number, number] {
  const at = (corner: number, axis: number): number =>
    points[4 * corners[corner] + axis] - points[4 * corners[0] + axis]
  for (let p = 0; p < 4; p++) {
    for (let q = p + 1; q < 4; q++) if (at(1, p) * at(2, q) !== at(1, q) * at(2, p)) return [p, q]
  }
  throw new InvariantError('Three vertices of a 2-face lie on a line.')
}

/** Lagrange's reduction of the basis, in place, by the second moments of the centred coordinates. */
function reduce(plane: Int32Array): void {
  const count = plane.length / 2
  let [sx, sy, xx, xy, yy] = [0, 0, 0, 0, 0]
  for (let i = 0; i < plane.length; i += 2) {
    sx += plane[i]
    sy += plane[i + 1]
    xx += plane[i] * plane[i]
    xy += plane[i] * plane[i + 1]
    yy += plane[i + 1] * plane[i + 1]
  }
  ;[xx, xy, yy] = [count * xx - sx * sx, count * xy - sx * sy, count * yy - sy * sy]
  for (;;) {
    const swapped = xx > yy
    const factor = Math.round(xy / Math.min(xx, yy))
    if (factor === 0) return
    const [target, source] = swapped ? [0, 1] : [1, 0]
    for (let i = 0; i < plane.length; i += 2) plane[i + target] -= factor * plane[i + source]
    if (swapped) [xx, xy] = [xx - 2 * factor * xy + factor * factor * yy, xy - factor * yy]
    else [yy, xy] = [yy - 2 * factor * xy + factor * factor * xx, xy - factor * xx]
  }
}

function shiftToZero(plane: Int32Array): void {
  for (const axis of [0, 1]) {
    let least = plane[axis]
    for (let i = axis; i < plane.length; i += 2) least = Math.min(least, plane[i])
    for (let i = axis; i < plane.length; i += 2) plane[i] -= least
  }
}

/** Orders the corners of a convex polygon about the first one and measures twice its area. */
function counterclockwise(
  plane: Int32Array,
  corners: readonly number[],
): { corners: number[]; area: number } {
  const [first, ...rest] = corners
  const cross = (i: number, j: number): number =>
    (plane[2 * i] - plane[2 * first]) * (plane[2 * j + 1] - plane[2 * first + 1]) -
    (plane[2 * j] - plane[2 * first]) * (plane[2 * i + 1] - plane[2 * first + 1])
  rest.sort((i, j) => cross(j, i))
  let area = 0
  for (let i = 1; i < rest.length; i++) area += cross(rest[i - 1], rest[i])
  return { corners: [first, ...rest], area }
}
