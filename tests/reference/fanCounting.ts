import { enumerateFans } from '../../scoring/geometry/fans/enumerateFans.ts'
import type { FanSimplices } from '../../scoring/geometry/fans/fan.ts'
import { commonFacets, facetPoints } from '../../scoring/geometry/fans/facetPoints.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import type { BundledPolytope } from './bundledPolytopes.ts'

export interface FanCounts {
  fans: number
  classes: number
  favourableFans: number
  favourableClasses: number
}

/** The FRSTs of some polytopes and the 2-face classes that these have, before symmetry. */
export function countFans(polytopes: readonly BundledPolytope[]): FanCounts {
  const counts = { fans: 0, classes: 0, favourableFans: 0, favourableClasses: 0 }
  for (const { vertices, favourable } of polytopes) {
    const { fans } = enumerateFans(polytopeFromPoints(vertices))
    const classes = new Set(fans.map(trianglesOnFaces)).size
    counts.fans += fans.length
    counts.classes += classes
    if (!favourable) continue
    counts.favourableFans += fans.length
    counts.favourableClasses += classes
  }
  return counts
}

/** The triangles of a fan that lie in 2-faces, where two facets meet, as a string. */
function trianglesOnFaces({ polytope, simplices }: FanSimplices): string {
  const frame = facetPoints(polytope)
  const triangles = new Set<string>()
  for (let s = 0; s < simplices.length; s += 4) {
    const simplex = [...simplices.subarray(s, s + 4)]
    for (const apex of simplex) {
      const triangle = simplex.filter((p) => p !== apex)
      if (commonFacets(frame, triangle).length === 2) triangles.add(triangle.join())
    }
  }
  return [...triangles].sort().join(';')
}
