import type { Polytope, TwoFace } from '../../../scoring/geometry/polytope.ts'

type PlanePoint = readonly [number, number]

/**
 * A lattice polygon posing as a polytope with a single 2-face, for what concerns triangulations only: its
 * points lie at height 1 in Z^4, facet data are empty.
 */
export function polygonAlone(points: readonly PlanePoint[]): Polytope {
  const corners = cornersOf(points)
  const face: TwoFace = {
    facets: [0, 1],
    dualLength: 1,
    points: Int32Array.from(points.keys()),
    plane: Int32Array.from(points.flat()),
    corners: Int32Array.from(corners),
    area: doubleArea(corners.map((c) => points[c])),
  }
  return {
    points: Int32Array.from(points.flatMap(([x, y]) => [x, y, 1, 0])),
    pointCount: points.length,
    vertexCount: corners.length,
    carrierDimension: new Uint8Array(points.length),
    dualInterior: new Int32Array(points.length),
    components: new Int32Array(points.length).fill(1),
    // Coordinate axes in place of facet normals: the quadratic form over "facets" is then Euclidean.
    facets: Int32Array.from([1, 0, 0, 0, 0, 1, 0, 0]),
    facetCount: 2,
    twoFaces: [face],
    edges: [],
    hodge: { h11: 0, h21: 0, euler: 0 },
    favourable: true,
    latticePoints: 0,
    dualLatticePoints: 0,
  }
}

/** All lattice points of the m x n rectangle. */
export function rectangle(m: number, n: number): PlanePoint[] {
  return Array.from({ length: (m + 1) * (n + 1) }, (_, p) => [Math.floor(p / (n + 1)), p % (n + 1)] as const)
}

/** All lattice points of the hull of the given corners, lexicographically. */
export function latticePolygon(corners: readonly PlanePoint[]): PlanePoint[] {
  const hull = cornersOf(corners).map((c) => corners[c])
  const xs = hull.map(([x]) => x)
  const ys = hull.map(([, y]) => y)
  const inside: PlanePoint[] = []
  for (let x = Math.min(...xs); x <= Math.max(...xs); x++) {
    for (let y = Math.min(...ys); y <= Math.max(...ys); y++) {
      if (hull.every((p, n) => turn(p, hull[(n + 1) % hull.length], [x, y]) >= 0)) inside.push([x, y])
    }
  }
  return inside
}

export function turn(p: PlanePoint, q: PlanePoint, r: PlanePoint): number {
  return (q[0] - p[0]) * (r[1] - p[1]) - (q[1] - p[1]) * (r[0] - p[0])
}

function doubleArea(corners: readonly PlanePoint[]): number {
  return corners.reduce((sum, [x, y], n) => {
    const [u, v] = corners[(n + 1) % corners.length]
    return sum + x * v - y * u
  }, 0)
}

/** Indices of the corners, counterclockwise (monotone chain). */
function cornersOf(points: readonly PlanePoint[]): number[] {
  const order = [...points.keys()].sort((a, b) => points[a][0] - points[b][0] || points[a][1] - points[b][1])
  const chain = (sorted: number[]): number[] => {
    const kept: number[] = []
    for (const p of sorted) {
      while (
        kept.length > 1 &&
        turn(points[kept[kept.length - 2]], points[kept[kept.length - 1]], points[p]) <= 0
      ) {
        kept.pop()
      }
      kept.push(p)
    }
    return kept.slice(0, -1)
  }
  return [...chain(order), ...chain(order.reverse())]
}
