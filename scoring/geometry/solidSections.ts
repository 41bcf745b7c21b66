import { boundaryLattice } from './boundaryLattice.ts'
import { gcd, gcdOf } from './integers.ts'
import { planeMinors, spaceNormal } from './minors.ts'
import type { Polytope } from './polytope.ts'

/** A hyperplane through the origin that cuts a three-dimensional reflexive polytope out of the polytope. */
export interface SolidSection {
  /** Primitive functional f that vanishes on it, in the coordinates of `reducedCoordinates`; f and -f are the same. */
  readonly functional: readonly [number, number, number, number]
  /** The lattice points of the section but the origin, ascending, as indices of the boundary lattice. */
  readonly points: Int32Array
  /** Its vertices, ascending: vertices of the polytope, and points inside edges that cross the hyperplane. */
  readonly vertices: Int32Array
}

/**
 * All hyperplanes through the origin whose section with the polytope is a three-dimensional reflexive polytope. It is
 * enough that the section's vertices are lattice points, as its facets are at lattice distance one with those of the
 * polytope. The vertices lie on vertices and edges of the polytope, so three of these span the hyperplane; it is one
 * of those sought when every edge that crosses it does so in a lattice point.
 */
export function solidSections(polytope: Polytope): SolidSection[] {
  const { points } = boundaryLattice(polytope)
  const { vertexCount, carrierDimension, pointCount } = polytope
  let candidates = vertexCount
  while (candidates < pointCount && carrierDimension[candidates] === 1) candidates++
  const cuts = cutsOf(polytope)
  const minors = new Float64Array(6)
  const normal = new Float64Array(4)
  const values = new Float64Array(vertexCount)
  const found = new Map<string, SolidSection>()
  for (let a = 0; a < candidates; a++) {
    for (let b = a + 1; b < candidates; b++) {
      planeMinors(points, a, b, minors)
      for (let c = b + 1; c < candidates; c++) {
        spaceNormal(points, minors, c, normal)
        const [n0, n1, n2, n3] = normal
        if (n0 === 0 && n1 === 0 && n2 === 0 && n3 === 0) continue
        for (let v = 0; v < vertexCount; v++) {
          const at = 4 * v
          values[v] = n0 * points[at] + n1 * points[at + 1] + n2 * points[at + 2] + n3 * points[at + 3]
        }
        if (!cuts(values)) continue
        const functional = primitive(normal)
        const key = functional.join(' ')
        if (!found.has(key)) found.set(key, sectionOf(polytope, functional))
      }
    }
  }
  return [...found.values()]
}

/** Tells from values of a functional at the vertices whether it vanishes at a lattice point of every edge it crosses. */
function cutsOf({ edges }: Polytope): (values: ArrayLike<number>) => boolean {
  const from = Int32Array.from(edges, (edge) => edge[0])
  const to = Int32Array.from(edges, (edge) => edge[edge.length - 1])
  const length = Int32Array.from(edges, (edge) => edge.length - 1)
  return (values) => {
    for (let e = 0; e < from.length; e++) {
      const u = values[from[e]]
      const v = values[to[e]]
      if (u === 0 || v === 0 || u > 0 === v > 0) continue
      // The crossing is at u / (u - v) of the way. Determinants of four points are at most 16 c^4 < 2^52 (Hadamard).
      if (length[e] === 1 || length[e] % (Math.abs(u - v) / gcd(u, v)) !== 0) return false
    }
    return true
  }
}

function sectionOf(polytope: Polytope, functional: SolidSection['functional']): SolidSection {
  const { points, count } = boundaryLattice(polytope)
  const on: number[] = []
  const values = new Float64Array(count)
  for (let p = 0; p < count; p++) {
    for (let axis = 0; axis < 4; axis++) values[p] += functional[axis] * points[4 * p + axis]
    if (values[p] === 0) on.push(p)
  }
  const vertices = new Set(on.filter((p) => p < polytope.vertexCount))
  for (const edge of polytope.edges) {
    const crosses = values[edge[0]] * values[edge[edge.length - 1]] < 0
    if (crosses) vertices.add(edge.find((p) => values[p] === 0) as number)
  }
  return {
    functional,
    points: Int32Array.from(on),
    vertices: Int32Array.from(vertices).sort(),
  }
}

/** Divided by its greatest common divisor, the first entry that is not zero positive. */
function primitive(normal: Float64Array): SolidSection['functional'] {
  const sign = Math.sign(normal.find((entry) => entry !== 0) ?? 1)
  const [a, b, c, d] = normal.map((entry) => (sign * entry) / gcdOf(normal) + 0)
  return [a, b, c, d]
}
