import { pairing, type Vector } from './determinants.ts'
import { compareIndices } from './facetTriangulation.ts'
import { LiftedSimplex, type LiftedPoints } from './liftedSimplex.ts'

/** A three-dimensional cone of the fan with the two points that complete it to maximal cones. */
export interface Wall {
  /** Ascending. */
  readonly corners: readonly [number, number, number]
  /** The maximal cones on its sides (indices), and their points opposite to it. */
  readonly cones: readonly number[]
  readonly opposite: readonly number[]
}

/** What examining a set of simplices found. All is exact. */
export interface FanReport {
  readonly degenerate: readonly number[]
  /** Sum and maximum of |det| over the cones. */
  readonly volume: number
  readonly largest: number
  readonly unused: readonly number[]
  readonly walls: readonly Wall[]
  /** Walls that do not lie between exactly two cones on opposite sides. */
  readonly uneven: readonly Wall[]
  /** Walls inside a facet across which the heights are not strictly convex. */
  readonly flat: readonly Wall[]
  /** Simplices whose corners share no facet. */
  readonly astray: readonly number[]
  /**
   * A depth c such that, with the origin at height -c, every wall is strictly convex that is so inside its
   * facet.
   */
  readonly depth: bigint
}

/**
 * Examines whether the cones over `simplices` form a complete simplicial fan that the heights induce, without
 * relying on how the simplices were found.
 *
 * When no cone is degenerate and every wall has exactly two cones on opposite sides, the number of cones above a
 * generic direction does not change across walls, so it is constant; all simplices lying in facets, at lattice
 * distance one, the sum of |det| is that constant times the polytope's lattice volume, and equality with the volume
 * means that every direction is covered once. A piecewise linear function on a complete fan that is strictly
 * convex across every wall is strictly convex (convexity is local along segments), so the fan is regular: the
 * lower hull of its lifted points. Star: every cone has the origin as its apex by construction.
 *
 * With the origin at height -c, the lifted functions gain c times the facet's function -m. Across a wall inside a
 * facet nothing changes. Across a wall between facets m, m' the excess of the opposite point q over the first
 * cone's function grows by c (1 + <m, q>), a positive integer times c, so a finite depth serves for all of them.
 */
export function examineFan(
  lifted: LiftedPoints,
  normals: readonly Vector[],
  simplices: readonly (readonly number[])[],
): FanReport {
  const { points } = lifted
  const cones = simplices.map((corners) => new LiftedSimplex(lifted, corners))
  const facetOf = simplices.map((corners) =>
    normals.findIndex((normal) => corners.every((p) => pairing(normal, points[p]) === -1)),
  )
  const walls = wallsOf(simplices, points.length)
  const uneven: Wall[] = []
  const flat: Wall[] = []
  let depth = 0n
  for (const wall of walls) {
    const [first, second] = wall.cones
    const [own, other] = wall.opposite
    if (wall.cones.length !== 2 || !(cones[first].share(simplices[first].indexOf(own), other) < 0)) {
      uneven.push(wall)
      continue
    }
    const excess = cones[first].exactExcess(other)
    const facet = facetOf[first]
    if (facet === facetOf[second] || facet < 0) {
      if (excess <= 0n) flat.push(wall)
      continue
    }
    const gain = BigInt(1 + pairing(normals[facet], points[other])) * BigInt(cones[first].volume)
    if (gain <= 0n) flat.push(wall)
    else if (excess + depth * gain <= 0n) depth = -excess / gain + 1n
  }
  const used = new Set(simplices.flat())
  return {
    degenerate: [...cones.keys()].filter((n) => cones[n].volume === 0),
    volume: cones.reduce((sum, { volume }) => sum + volume, 0),
    largest: cones.reduce((most, { volume }) => Math.max(most, volume), 0),
    unused: [...points.keys()].filter((p) => !used.has(p)),
    walls,
    uneven,
    flat,
    astray: [...facetOf.keys()].filter((n) => facetOf[n] < 0),
    depth,
  }
}

function wallsOf(simplices: readonly (readonly number[])[], count: number): Wall[] {
  const walls = new Map<number, { corners: [number, number, number]; cones: number[]; opposite: number[] }>()
  simplices.forEach((simplex, n) => {
    for (const opposite of simplex) {
      const corners = simplex.filter((p) => p !== opposite) as [number, number, number]
      corners.sort((a, b) => a - b)
      const code = (corners[0] * count + corners[1]) * count + corners[2]
      let wall = walls.get(code)
      if (wall === undefined) walls.set(code, (wall = { corners, cones: [], opposite: [] }))
      wall.cones.push(n)
      wall.opposite.push(opposite)
    }
  })
  return [...walls.values()].sort((a, b) => compareIndices(a.corners, b.corners))
}

/** The walls that lie on two facets at once: the triangles of the 2-faces, in lexicographic order. */
export function twoFaceTriangles(
  walls: readonly Wall[],
  through: readonly (readonly number[])[],
): [number, number, number][] {
  return walls
    .filter(({ corners: [i, j, k] }) => {
      const common = through[i].filter((a) => through[j].includes(a) && through[k].includes(a))
      return common.length > 1
    })
    .map(({ corners }) => [...corners])
}
