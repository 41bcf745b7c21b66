import { InputError, InvariantError } from '../errors.ts'
import { clipped, squareAround, withoutShortEdges, type Corner } from './clipping.ts'
import { curveRows, type CurveRows } from './curves.ts'
import { InnerCone } from './innerCone.ts'
import type { IntersectionNumbers } from './intersectionNumbers.ts'
import { innerProduct, orthonormalColumns, removeComponents } from './orthonormal.ts'
import type { Polytope } from './polytope.ts'
import { distinctRows, rowCount, rowsBelow, stackRows, timesColumn, type SparseRows } from './sparseRows.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * Where a plane through the reference point leads: straight to one of the nearest walls, along a divisor, or
 * outwards along the ray on which all quantities scale.
 */
export type SliceDirection = { readonly wall: number } | { readonly divisor: number } | { readonly ray: true }

/** A wall C . w >= 0 in the plane: C . w = value + slope . (x, y). */
export interface SliceWall {
  /** The class C as pairs [point, coefficient]. */
  readonly row: readonly (readonly [number, number])[]
  /** Edges of the class whose curve it is; none for a circuit. */
  readonly edges: readonly (readonly [number, number])[]
  /** C . w at the reference point. */
  readonly value: number
  /** Distance from the reference point, over all directions: value / |C|. */
  readonly distance: number
  readonly slope: readonly [number, number]
}

/**
 * A two-plane through the reference point w0, w = w0 + x e1 + y e2, with e1, e2 orthonormal in the norm over all
 * prime toric divisors and orthogonal to the linear relations.
 */
export interface ConeSlice {
  /** Walls that bound one of the polygons, those that are nearest in all directions first. */
  readonly walls: readonly SliceWall[]
  /**
   * The cone and the stretched cone (C . w >= 1), counterclockwise; `line` is an index into walls, -1 the frame. The
   * reference point is a corner of the stretched cone, so a plane may meet it there only: then it is empty.
   */
  readonly cone: readonly Corner[]
  readonly stretched: readonly Corner[]
  /** Half-width of the square they are cut to. */
  readonly reach: number
  /** The two directions asked for, in the plane: the first is (1, 0). */
  readonly directions: readonly (readonly [number, number])[]
  /** The walls nearest to the reference point, of which `wall` in a direction is one. */
  readonly nearest: readonly Omit<SliceWall, 'slope'>[]
  /** Rounds in which circuits were added. */
  readonly rounds: number
}

const nearestListed = 12
/** The reference point has C . w = 1 on many rows, up to rounding. */
const slack = 1e-9
const maximalRounds = 60

/**
 * The slice of the inner cone of a class (its edge curves and circuits) by a plane through the reference point.
 * Circuits are added lazily: at the corners of the polygon, of each triangle the worst that is violated, until
 * there is none; since the conditions are linear and a polygon is the hull of its corners, it is then that of all.
 * The walls nearest to the point are looked for among the edge curves and, of each triangle, the circuit of least
 * value.
 *
 * @throws InputError slice.parallel when the directions span no plane, slice.direction for one that does not exist
 */
export function coneSlice(
  twoFaceClass: TwoFaceClass,
  numbers: IntersectionNumbers,
  reference: Float64Array,
  directions: readonly [SliceDirection, SliceDirection],
  curves: CurveRows = curveRows(twoFaceClass, numbers),
): ConeSlice {
  const inner = new InnerCone(twoFaceClass)
  const edgesOf = edgesByRow(curves, numbers)
  const rowsAtPoint = distinctRows(stackRows(curves, inner.violatedCircuits(reference, 2)))
  const nearest = nearestWalls(rowsAtPoint, reference, edgesOf)
  const [e1, e2, angles] = planeOf(twoFaceClass.polytope, reference, directions, nearest)
  const reach = 8 * Math.sqrt(innerProduct(reference, reference))
  let rows = rowsAtPoint
  let rounds = 0
  const cut = (level: number): readonly Corner[] => {
    for (let round = 0; round < maximalRounds; round++) {
      const polygon = polygonOf(rows, reference, e1, e2, level - slack, reach)
      const violated = polygon.flatMap(({ x, y }) => {
        const weights = reference.map((w, p) => w + x * e1[p] + y * e2[p])
        const below = level - 1e-8 * (1 + Math.hypot(x, y))
        const found = rowsBelow(inner.violatedCircuits(weights, below), weights, below)
        return rowCount(found) > 0 ? [found] : []
      })
      if (violated.length === 0) return polygon
      const before = rowCount(rows)
      rows = distinctRows(violated.reduce(stackRows, rows))
      if (rowCount(rows) === before) return polygon
      rounds++
    }
    throw new InvariantError(`Circuits still cut the slice after ${maximalRounds} rounds.`)
  }
  const cone = cut(0)
  const stretched = cut(1)
  const used = [...new Set([...cone, ...stretched].map(({ line }) => line).filter((line) => line >= 0))]
  const walls = used
    .map((r) => ({ r, wall: wallOf(rows, r, reference, e1, e2, edgesOf) }))
    .sort((a, b) => a.wall.distance - b.wall.distance || a.r - b.r)
  const place = new Map(walls.map(({ r }, at) => [r, at]))
  const renumbered = (polygon: readonly Corner[]) =>
    polygon.map((corner) => ({ ...corner, line: place.get(corner.line) ?? -1 }))
  return {
    walls: walls.map(({ wall }) => wall),
    cone: renumbered(cone),
    stretched: renumbered(stretched),
    reach,
    directions: angles,
    nearest: nearest.map(({ row, edges, value, distance }) => ({ row, edges, value, distance })),
    rounds,
  }
}

function polygonOf(
  rows: SparseRows,
  reference: Float64Array,
  e1: Float64Array,
  e2: Float64Array,
  level: number,
  reach: number,
): Corner[] {
  const count = rowCount(rows)
  const [values, alongX, alongY] = [reference, e1, e2].map((vector) => {
    const result = new Float64Array(count)
    timesColumn(rows, vector, result)
    return result
  })
  let polygon: readonly Corner[] = squareAround(reach)
  for (let r = 0; r < count; r++) polygon = clipped(polygon, values[r] - level, alongX[r], alongY[r], r)
  return withoutShortEdges(polygon, 1e-9 * reach)
}

type PlainWall = Omit<SliceWall, 'slope'>

function nearestWalls(
  rows: SparseRows,
  reference: Float64Array,
  edgesOf: (row: string) => readonly (readonly [number, number])[],
): PlainWall[] {
  const zero = new Float64Array(reference.length)
  return Array.from({ length: rowCount(rows) }, (_, r) => wallOf(rows, r, reference, zero, zero, edgesOf))
    .map((wall, r) => ({ wall, r }))
    .sort((a, b) => a.wall.distance - b.wall.distance || a.r - b.r)
    .slice(0, nearestListed)
    .map(({ wall }) => wall)
}

function wallOf(
  { starts, points, coefficients }: SparseRows,
  r: number,
  reference: Float64Array,
  e1: Float64Array,
  e2: Float64Array,
  edgesOf: (row: string) => readonly (readonly [number, number])[],
): SliceWall {
  const row: [number, number][] = []
  for (let e = starts[r]; e < starts[r + 1]; e++) row.push([points[e], coefficients[e]])
  const along = (vector: Float64Array) =>
    row.reduce((sum, [point, coefficient]) => sum + coefficient * vector[point], 0)
  const value = along(reference)
  return {
    row,
    edges: edgesOf(nameOf(row)),
    value,
    distance: value / Math.hypot(...row.map(([, coefficient]) => coefficient)),
    slope: [along(e1), along(e2)],
  }
}

const nameOf = (row: readonly (readonly [number, number])[]) => row.map((entry) => entry.join(':')).join(' ')

function edgesByRow(
  { starts, points, coefficients }: CurveRows,
  { edges }: IntersectionNumbers,
): (row: string) => readonly (readonly [number, number])[] {
  const known = new Map<string, [number, number][]>()
  for (let r = 0; r + 1 < starts.length; r++) {
    const row: [number, number][] = []
    for (let e = starts[r]; e < starts[r + 1]; e++) row.push([points[e], coefficients[e]])
    const name = nameOf(row)
    known.set(name, [...(known.get(name) ?? []), [edges[2 * r], edges[2 * r + 1]]])
  }
  return (row) => known.get(row) ?? []
}

/** Orthonormal e1, e2 that span the plane, and both directions in it. */
function planeOf(
  { points, pointCount }: Polytope,
  reference: Float64Array,
  directions: readonly [SliceDirection, SliceDirection],
  nearest: readonly PlainWall[],
): [Float64Array, Float64Array, [number, number][]] {
  const relations = orthonormalColumns(
    [0, 1, 2, 3].map((axis) => Float64Array.from({ length: pointCount }, (_, p) => points[4 * p + axis])),
  )
  const [first, second] = directions.map((direction) => {
    const vector = new Float64Array(pointCount)
    if ('divisor' in direction) {
      if (direction.divisor >= pointCount) throw noDirection(`D${direction.divisor}`, `D${pointCount - 1}`)
      vector[direction.divisor] = 1
    } else if ('ray' in direction) {
      vector.set(reference)
    } else {
      const wall = nearest.at(direction.wall)
      if (!wall) throw noDirection(`wall ${direction.wall + 1}`, `wall ${nearest.length}`)
      for (const [point, coefficient] of wall.row) vector[point] = -coefficient
    }
    for (let sweep = 0; sweep < 2; sweep++) removeComponents(relations, vector)
    const length = Math.sqrt(innerProduct(vector, vector))
    if (length < 1e-9) throw parallel()
    return vector.map((entry) => entry / length)
  })
  const across = Float64Array.from(second)
  for (let sweep = 0; sweep < 2; sweep++) removeComponents([first], across)
  const height = Math.sqrt(innerProduct(across, across))
  if (height < 1e-9) throw parallel()
  return [
    first,
    across.map((entry) => entry / height),
    [
      [1, 0],
      [innerProduct(first, second), height],
    ],
  ]
}

const parallel = () =>
  new InputError(
    'slice.parallel',
    'The two directions are the same up to a factor and span no plane; choose another.',
    'second',
    null,
  )

const noDirection = (found: string, last: string) =>
  new InputError('slice.direction', `There is no ${found}; the last is ${last}.`, 'direction', found)
