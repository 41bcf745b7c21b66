import { InvariantError } from '../errors.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates, shortCoordinates } from './reducedCoordinates.ts'

/** Normalised volumes, 4! times the Euclidean one, of a polytope and of its dual. Integers. */
export interface NormalisedVolumes {
  readonly own: number
  readonly dual: number
}

/** Faces of a four-dimensional polytope as lists of indices, each with what lies on it. */
interface FaceLists {
  /** Ends of each edge. */
  readonly edges: readonly (readonly [number, number])[]
  /** Edges on each 2-face. */
  readonly edgesOfFace: readonly (readonly number[])[]
  /** 2-faces on each facet. */
  readonly facesOfFacet: readonly (readonly number[])[]
}

const known = new WeakMap<Polytope, NormalisedVolumes>()

/** Both normalised volumes, exact. Computed once per polytope. */
export function normalisedVolumes(polytope: Polytope): NormalisedVolumes {
  const before = known.get(polytope)
  if (before) return before
  const { own, dual } = faceLists(polytope)
  const vertices = reducedCoordinates(polytope).subarray(0, 4 * polytope.vertexCount)
  const volumes = {
    own: pulledVolume(vertices, own),
    dual: pulledVolume(shortCoordinates(polytope.facets), dual),
  }
  known.set(polytope, volumes)
  return volumes
}

/**
 * Sum of |det| over a triangulation: the origin is joined to every facet, a facet's first vertex to its 2-faces that
 * do not contain it, a 2-face's first vertex to its edges that do not contain it.
 */
function pulledVolume(vertices: Float64Array, { edges, edgesOfFace, facesOfFacet }: FaceLists): number {
  const firstOfFace = edgesOfFace.map((on) => Math.min(...on.map((e) => Math.min(...edges[e]))))
  const verticesOfFace = edgesOfFace.map((on) => new Set(on.flatMap((e) => edges[e])))
  let volume = 0
  for (const faces of facesOfFacet) {
    const apex = Math.min(...faces.map((f) => firstOfFace[f]))
    for (const f of faces) {
      if (verticesOfFace[f].has(apex)) continue
      for (const e of edgesOfFace[f]) {
        if (edges[e].includes(firstOfFace[f])) continue
        volume += Math.abs(determinant(vertices, apex, firstOfFace[f], ...edges[e]))
      }
    }
  }
  if (!Number.isSafeInteger(volume)) throw new InvariantError(`The normalised volume ${volume} is not exact.`)
  return volume
}

/** In the dual, a vertex is a facet, an edge a 2-face, a 2-face an edge and a facet a vertex. */
function faceLists(polytope: Polytope): { own: FaceLists; dual: FaceLists } {
  const { edges, twoFaces, facetCount, vertexCount } = polytope
  const ends = edges.map((edge): [number, number] => [edge[0], edge[edge.length - 1]])
  const facesOfEdge: number[][] = edges.map(() => [])
  const edgesOfFace = twoFaces.map(({ corners }, f) => {
    const on = ends.flatMap((pair, e) => (corners.includes(pair[0]) && corners.includes(pair[1]) ? [e] : []))
    for (const e of on) facesOfEdge[e].push(f)
    return on
  })
  const gathered = (count: number, pairs: readonly (readonly [number, number])[]): number[][] => {
    const lists: number[][] = Array.from({ length: count }, () => [])
    pairs.forEach((pair, index) => pair.forEach((member) => lists[member].push(index)))
    return lists
  }
  const walls = twoFaces.map(({ facets }) => facets)
  return {
    own: { edges: ends, edgesOfFace, facesOfFacet: gathered(facetCount, walls) },
    dual: { edges: walls, edgesOfFace: facesOfEdge, facesOfFacet: gathered(vertexCount, ends) },
  }
}

/** Exact for the sizes that reduced coordinates have. */
function determinant(points: Float64Array, a: number, b: number, c: number, d: number): number {
  const at = (p: number, axis: number): number => points[4 * p + axis]
  const minor = (p: number, q: number, i: number, j: number): number =>
    at(p, i) * at(q, j) - at(p, j) * at(q, i)
  return (
    minor(a, b, 0, 1) * minor(c, d, 2, 3) -
    minor(a, b, 0, 2) * minor(c, d, 1, 3) +
    minor(a, b, 0, 3) * minor(c, d, 1, 2) +
    minor(a, b, 1, 2) * minor(c, d, 0, 3) -
    minor(a, b, 1, 3) * minor(c, d, 0, 2) +
    minor(a, b, 2, 3) * minor(c, d, 0, 1)
  )
}
