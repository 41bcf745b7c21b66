import { InputError } from '../errors.ts'
import { equality, equalRows, type CheckList } from './check.ts'
import type { Claims } from './claims.ts'
import { pointsOnFacets, triangulateFacet } from './facetTriangulation.ts'
import { examineFan, twoFaceTriangles, type FanReport } from './fan.ts'
import { keyOfTriangles } from './keys.ts'
import { heightLimit, liftedPoints, type LiftedPoints } from './liftedSimplex.ts'
import type { CertifiedPolytope } from './polytopeChecks.ts'

export interface CertifiedFan {
  readonly lifted: LiftedPoints
  /** Maximal cones, ascending points, lexicographic order. */
  readonly simplices: readonly (readonly number[])[]
  readonly report: FanReport
  readonly triangles: readonly (readonly [number, number, number])[]
}

/** The fan of the heights, triangulated facet by facet and then examined without regard to how it was found. */
export function checkTriangulation(
  claims: Claims,
  { reading, figures }: CertifiedPolytope,
  checks: CheckList,
): CertifiedFan | undefined {
  const { numbers, points, heights } = claims
  const found = checks.run('heights-generic', () => {
    checkHeights(heights, points.length)
    const lifted = liftedPoints(points, heights)
    const onFacets = pointsOnFacets(points, reading.normals)
    const simplices: (readonly number[])[] = []
    for (const facet of onFacets.keys()) {
      const outcome = triangulateFacet(lifted, onFacets, facet)
      if (!outcome.generic) {
        return {
          passed: false,
          fast: null,
          independent: null,
          note: `The heights tie on a facet: points ${outcome.tied.join(', ')} lie on one lifted hyperplane. Heights in general position inside the class serve.`,
        }
      }
      simplices.push(...outcome.simplices)
    }
    simplices.sort((a, b) => a[0] - b[0] || a[1] - b[1] || a[2] - b[2] || a[3] - b[3])
    const note = `${reading.normals.length} facets triangulated as lower hulls in exact arithmetic.`
    return { passed: true, fast: null, independent: simplices.length, note, value: { lifted, simplices } }
  })
  if (found === undefined) return undefined
  const { lifted, simplices } = found
  const report = checks.run('cones-full', () => {
    const value = examineFan(lifted, reading.normals, simplices)
    const sound = value.degenerate.length === 0 && value.astray.length === 0
    const note = sound
      ? `${simplices.length} cones.`
      : `Degenerate: ${value.degenerate.length}; across facets: ${value.astray.length}.`
    return { passed: sound, fast: null, independent: value.largest, note, value }
  })
  if (report === undefined) return undefined
  checks.run('volume', () => ({
    passed: report.volume === reading.volume,
    fast: numbers.normalisedVolumes.own,
    independent: report.volume,
    note: `The polytope’s lattice volume, by pulling its vertices, is ${reading.volume}.`,
  }))
  checks.run('points-used', () => {
    const { unused } = report
    const used = points.length - unused.length
    const note =
      unused.length === 0 ? '' : `Point ${unused[0]} (${points[unused[0]].join(', ')}) is in no cone.`
    return equality(points.length, used, note)
  })
  const regular = checks.run('regular', () => {
    const { uneven, flat, depth, walls } = report
    const bad = uneven[0] ?? flat[0]
    const note =
      bad === undefined
        ? `${walls.length} walls, each between two cones, with the origin at height ${-depth} or lower.`
        : `Wall (${bad.corners.join(', ')}): ${uneven.length > 0 ? `${bad.cones.length} cones` : 'not strictly convex'}.`
    return { passed: bad === undefined, fast: null, independent: `${-depth}`, note, value: true }
  })
  checks.run('simplices', () => ({
    ...equalRows(numbers.simplices ?? simplices, simplices, 'cones'),
    ...(numbers.simplices === null && { fast: null, note: 'The fast road builds none.' }),
  }))
  const triangles = twoFaceTriangles(report.walls, figures.through)
  const agree = checks.run('triangles', () => ({
    ...equalRows(numbers.triangles, triangles, 'triangles'),
    value: true,
  }))
  checks.run('candidate-key', () =>
    equality(claims.candidateKey, keyOfTriangles(claims.polytopeKey, triangles)),
  )
  if (!regular || !agree || report.unused.length > 0 || report.volume !== reading.volume) return undefined
  return { lifted, simplices, report, triangles }
}

function checkHeights(heights: readonly number[], count: number): void {
  const wrong = heights.findIndex((height) => !Number.isInteger(height) || Math.abs(height) > heightLimit)
  if (heights.length === count && wrong < 0) return
  throw new InputError(
    'certificate.heights',
    wrong < 0
      ? `There are ${heights.length} heights for ${count} points.`
      : `Height ${wrong} is ${heights[wrong]}, no integer up to 2^52 in size.`,
    'heights',
  )
}
