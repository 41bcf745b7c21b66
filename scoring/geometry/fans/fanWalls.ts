import { InvariantError } from '../../errors.ts'
import { circuitOf, circuitSign, type Circuit } from './fanCircuits.ts'
import { wallCode, type Wall } from './facetTriangulation.ts'
import type { FanSimplices } from './fan.ts'

/**
 * A triangle between two simplices of one facet. Its circuit is the relation among its vertices and the two
 * vertices opposite, both of which have positive coefficients; heights give the fan exactly when
 * sum_m coefficient_m w_m > 0 for all walls (a piecewise linear function on a convex set is convex when it is so
 * across each wall). Walls in 2-faces, between facets, take no part: the origin's low height makes the lifted fan
 * convex there.
 */
export interface FanWall {
  readonly vertices: Wall
  readonly opposite: readonly [number, number]
  readonly facet: number
  readonly circuit: Circuit
}

const known = new WeakMap<FanSimplices, readonly FanWall[]>()

/** The walls interior to facets, computed once; ordered by facet, then by the order of the simplices. */
export function fanWalls(fan: FanSimplices): readonly FanWall[] {
  let walls = known.get(fan)
  if (walls === undefined) {
    walls = read(fan)
    known.set(fan, walls)
  }
  return walls
}

function read({ polytope, simplices, facetOf }: FanSimplices): FanWall[] {
  const half: Map<number, readonly [number, number]>[] = []
  const walls: FanWall[][] = []
  for (let s = 0; s < facetOf.length; s++) {
    const a = facetOf[s]
    const open = (half[a] ??= new Map())
    const found = (walls[a] ??= [])
    for (let m = 0; m < 4; m++) {
      const [i, j, k] = [0, 1, 2, 3].filter((n) => n !== m).map((n) => simplices[4 * s + n])
      const code = wallCode(polytope, i, j, k)
      const other = open.get(code)
      if (other === undefined) {
        open.set(code, [s, m])
        continue
      }
      const [t, n] = other
      const [p, q] = [simplices[4 * t + n], simplices[4 * s + m]]
      const circuit = circuitOf(polytope, [i, j, k, p], q)
      if (circuit.coefficients[circuit.points.indexOf(p)] <= 0)
        throw new InvariantError(`Two simplices lie on one side of the wall (${i}, ${j}, ${k}).`)
      found.push({ vertices: [i, j, k], opposite: [p, q], facet: a, circuit })
    }
  }
  return walls.flat()
}

/** Walls whose circuit vanishes on the heights: the triangulation is one choice among several there. */
export function tiedWalls(fan: FanSimplices, heights: ArrayLike<number>): FanWall[] {
  return fanWalls(fan).filter(({ circuit }) => circuitSign(circuit, heights) === 0)
}

/** True when the heights give exactly this fan, strictly: every wall's circuit is positive. */
export function isStrict(fan: FanSimplices, heights: ArrayLike<number>): boolean {
  return fanWalls(fan).every(({ circuit }) => circuitSign(circuit, heights) > 0)
}
