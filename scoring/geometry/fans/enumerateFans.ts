import { InvariantError } from '../../errors.ts'
import { quadraticHeights } from '../heights.ts'
import type { Polytope } from '../polytope.ts'
import { fanFromHeights, type FanSimplices } from './fan.ts'
import { fanNeighbours } from './fanFlips.ts'
import { isRegularFan } from './fanRegularity.ts'

export interface EnumeratedFans {
  /** All fine regular star triangulations (FRSTs), before symmetry, in the order of the walk. */
  readonly fans: readonly FanSimplices[]
  /** Integer heights that give each, strictly. */
  readonly heights: readonly Float64Array[]
  /** Distinct fine star triangulations one flip away from a regular one that are not regular. */
  readonly irregularNeighbours: number
  /** False when the limit ended the walk before all were found. */
  readonly complete: boolean
}

/**
 * All FRSTs of a polytope, walking flips breadth first. Complete because the cones of heights of the FRSTs fill the
 * convex cone of fine heights and neighbours across a wall differ by a flip; each result of a flip is kept when it
 * is exactly regular. Only for small polytopes: there are more FRSTs than classes, which grow exponentially with h11.
 *
 * @param limit stop after so many
 */
export function enumerateFans(polytope: Polytope, limit = Infinity): EnumeratedFans {
  const first = fanFromHeights(polytope, quadraticHeights(polytope, { form: 'facets' }))
  const start = first && isRegularFan(first)
  if (first === undefined || start?.regular !== true)
    throw new InvariantError('Quadratic heights give no regular fan.')
  const fans: FanSimplices[] = [first]
  const heights = [start.heights]
  const seen = new Set([name(first)])
  const irregular = new Set<string>()
  for (let n = 0; n < fans.length; n++) {
    for (const neighbour of fanNeighbours(fans[n])) {
      const named = name(neighbour)
      if (seen.has(named) || irregular.has(named)) continue
      const answer = isRegularFan(neighbour, heights[n])
      if (!answer.regular) {
        irregular.add(named)
        continue
      }
      if (fans.length >= limit) return { fans, heights, irregularNeighbours: irregular.size, complete: false }
      seen.add(named)
      fans.push(neighbour)
      heights.push(answer.heights)
    }
  }
  return { fans, heights, irregularNeighbours: irregular.size, complete: true }
}

/** The simplices as a string, for sets. */
function name({ simplices }: FanSimplices): string {
  return String.fromCharCode(...simplices)
}
