import { CheckList, type Check } from './check.ts'
import type { Claims } from './claims.ts'
import { checkCone, type CertifiedReference } from './coneChecks.ts'
import { checkIntersections, type CertifiedNumbers } from './intersectionChecks.ts'
import { checkMetric, type CertifiedMetric } from './metricChecks.ts'
import { checkPolytope, type CertifiedPolytope } from './polytopeChecks.ts'
import { checkTriangulation, type CertifiedFan } from './triangulationChecks.ts'

/** Version of the independent road: raised with any change of what a check says. */
export const certifierVersion = '1'

/** What was certified, as far as the checks came. */
export interface Certified {
  readonly polytope?: CertifiedPolytope
  readonly fan?: CertifiedFan
  readonly numbers?: CertifiedNumbers
  readonly reference?: CertifiedReference
  readonly metric?: CertifiedMetric
}

/**
 * Goes the independent road from vertices and heights and compares with the claims at every step. It shares no
 * code with the fast road (the linter sees to that): own facets, lattice points, triangulation of facets, fan and
 * intersection ring. Exact up to and including the intersection numbers.
 *
 * @param clock milliseconds from any origin
 */
export function independentRoad(
  claims: Claims,
  clock: () => number,
): { readonly checks: CheckList; readonly certified: Certified } {
  const checks = new CheckList(clock)
  const polytope = checkPolytope(claims, checks)
  const fan = polytope && checkTriangulation(claims, polytope, checks)
  const numbers = polytope && fan && checkIntersections(claims, polytope, fan, checks)
  const reference = polytope && fan && numbers && checkCone(claims, polytope, fan, numbers, checks)
  const metric = numbers && reference && checkMetric(claims, numbers, reference, checks)
  return { checks, certified: { polytope, fan, numbers, reference, metric } }
}

export type { Check }
