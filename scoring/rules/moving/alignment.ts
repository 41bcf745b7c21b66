import { moveRow } from '../../geometry/moving/sortedRows.ts'
import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'

/**
 * How the elements of a set follow an exchange: which move to other places, and which are touched, that is, have
 * divisors whose numbers for this element change. All sets keep their sizes.
 */
export interface Alignment {
  /** Number of elements; the same for all classes of a polytope. */
  size(moving: MovingNumbers): number
  /** Moves what is kept per element, one entry each, along with the elements. */
  move(moving: MovingNumbers, kept: Float64Array): void
  /** Calls back for the touched elements, as they stand after the exchange. */
  touched(moving: MovingNumbers, element: (n: number) => void): void
  /** Calls back for the elements that one of the parallelogram's four divisors belongs to, touched or not. */
  incident(moving: MovingNumbers, element: (n: number) => void): void
}

/** Calls back for the rows of `width` points that hold one of the exchange's four. */
function incidentRows(
  points: Int32Array,
  width: 2 | 3,
  { last }: MovingNumbers,
  row: (n: number) => void,
): void {
  const [i, j, k, l] = last.points
  for (let at = 0; at < points.length; at += width) {
    for (let c = 0; c < width; c++) {
      const p = points[at + c]
      if (p !== i && p !== j && p !== k && p !== l) continue
      row(at / width)
      break
    }
  }
}

const ofTriangles: Alignment = {
  size: ({ faceOf }) => faceOf.length,
  move({ last }, kept) {
    moveRow(kept, 1, last.trianglesFrom[0], last.trianglesTo[0])
    moveRow(kept, 1, last.trianglesFrom[1], last.trianglesTo[1])
  },
  touched({ last }, element) {
    // The second move may have shifted the row that the first one ended in.
    const [from, to] = [last.trianglesFrom[1], last.trianglesTo[1]]
    const first = last.trianglesTo[0]
    element(first > from && first <= to ? first - 1 : first < from && first >= to ? first + 1 : first)
    element(to)
  },
  incident: (moving, element) => incidentRows(moving.triangles, 3, moving, element),
}

/** By the name of the set. Elements of the others are found anew after every exchange. */
export const alignments: ReadonlyMap<string, Alignment> = new Map<string, Alignment>([
  [
    'divisors',
    {
      size: ({ cubes }) => cubes.length,
      move() {},
      touched({ last }, element) {
        for (const point of last.points) element(point)
      },
      incident({ last }, element) {
        for (const point of last.points) element(point)
      },
    },
  ],
  [
    'pairs',
    {
      size: ({ edges }) => edges.length,
      move: ({ last }, kept) => moveRow(kept, 2, last.edgeFrom, last.edgeTo),
      touched({ last }, element) {
        for (const row of last.sides) {
          element(2 * row)
          element(2 * row + 1)
        }
        element(2 * last.edgeTo)
        element(2 * last.edgeTo + 1)
      },
      incident: (moving, element) =>
        incidentRows(moving.edges, 2, moving, (row) => {
          element(2 * row)
          element(2 * row + 1)
        }),
    },
  ],
  [
    'curves',
    {
      size: ({ edges }) => edges.length / 2,
      move: ({ last }, kept) => moveRow(kept, 1, last.edgeFrom, last.edgeTo),
      touched({ last }, element) {
        for (const row of last.sides) element(row)
        element(last.edgeTo)
      },
      incident: (moving, element) => incidentRows(moving.edges, 2, moving, element),
    },
  ],
  ['triples', ofTriangles],
  ['triangles', ofTriangles],
])
