import { InputError } from '../errors.ts'
import type { CheckList, Verdict } from './check.ts'
import type { Claims } from './claims.ts'
import { curveClasses, valueAt, type Condition } from './curveClasses.ts'
import { examineFan, twoFaceTriangles } from './fan.ts'
import { innerConditions } from './innerConditions.ts'
import type { CertifiedNumbers } from './intersectionChecks.ts'
import { fanOfFunction, roundedClass } from './kaehlerFan.ts'
import { nonNegativeCombination, type Combination } from './nonNegativeCombination.ts'
import type { CertifiedPolytope } from './polytopeChecks.ts'
import type { CertifiedFan } from './triangulationChecks.ts'

/** How far a condition may fall short of one, and the reference point differ, relative to its largest entry. */
const tolerance = 1e-8
/**
 * How much of the reference point, relative to its largest entry, the combination of conditions may leave: far out in
 * the cone the rows are nearly dependent. A point of another program leaves a tenth or more.
 */
const residualTolerance = 1e-6

/** The Kaehler class of the claims, certified to be the reference point. */
export interface CertifiedReference {
  readonly weights: readonly number[]
  readonly edgeCurvesSuffice: boolean
  readonly curves: readonly Condition[]
}

/**
 * The reference point: inside the cone by two descriptions of it, and of least norm. Floating point from here on;
 * the conditions themselves are exact.
 *
 * What is certified: every curve of an edge and every circuit of the inner cone has at least the value one there; a
 * class within 2^-31 of it has a fan whose 2-faces are triangulated as in the class, which puts the point into the
 * toric Kaehler cone of some fine regular star triangulation of the class, hence inside the Kaehler cone of the
 * threefold; and no class with these properties has a smaller norm. That fan need not be the one of the heights:
 * both belong to the same threefold. The true Kaehler cone may be larger.
 */
export function checkCone(
  claims: Claims,
  { reading, figures }: CertifiedPolytope,
  fan: CertifiedFan,
  numbers: CertifiedNumbers,
  checks: CheckList,
): CertifiedReference | undefined {
  const { weights, edgeCurvesSuffice } = claims.numbers.reference
  const { points } = claims
  const { triangles } = fan
  const curves = checks.run('edge-curves', () => {
    if (weights.length !== points.length)
      throw new InputError(
        'certificate.wrong-count',
        `The reference point has ${weights.length} entries for ${points.length} points.`,
      )
    const value = curveClasses(numbers, triangles, figures)
    const least = value.reduce((smallest, curve) => Math.min(smallest, valueAt(curve, weights)), Infinity)
    const note = `${value.length} curves D_i . D_j, primitive classes from the certified numbers.`
    return { ...atLeastOne(least, note), value }
  })
  if (curves === undefined) return undefined
  const inner = checks.run('circuits', () => {
    const value = innerConditions(points, triangles, weights, 1 + tolerance)
    return { ...atLeastOne(value.least, `All ${value.count} circuits of the inner cone.`), value }
  })
  if (inner === undefined) return undefined
  checks.run('kaehler-fan', () => {
    const { heights, unit } = roundedClass(weights)
    const found = fanOfFunction(points, heights, triangles[0])
    if (found === undefined)
      return {
        passed: false,
        fast: null,
        independent: null,
        note: 'The class is not convex on the triangles.',
      }
    const report = examineFan(found.lifted, reading.normals, found.simplices)
    const own = twoFaceTriangles(report.walls, figures.through)
    const sound =
      report.uneven.length + report.flat.length + report.unused.length + report.degenerate.length === 0 &&
      report.volume === fan.report.volume &&
      report.depth === 0n
    const same = own.join(' ') === triangles.join(' ')
    return {
      passed: sound && same,
      fast: triangles.length,
      independent: own.length,
      note: `The fan of the class, rounded to units of ${unit.toExponential(1)}: ${found.simplices.length} cones, ${same ? 'the same triangles on the 2-faces' : 'other triangles on the 2-faces'}.`,
    }
  })
  const active = distinct(curves.filter((curve) => valueAt(curve, weights) <= 1 + tolerance))
  let byEdges: Combination | undefined
  checks.run('edge-curves-suffice', () => {
    byEdges = nonNegativeCombination(active, weights)
    const suffice = byEdges.residual <= residualTolerance
    return {
      passed: suffice === edgeCurvesSuffice,
      fast: edgeCurvesSuffice ? 'yes' : 'no',
      independent: suffice ? 'yes' : 'no',
      tolerance: residualTolerance,
      note: `As a non-negative combination of ${active.length} edge curves of value one it leaves ${byEdges.residual.toExponential(1)}.`,
    }
  })
  const optimal = checks.run('reference-point', () => {
    const combination =
      byEdges !== undefined && byEdges.residual <= residualTolerance
        ? byEdges
        : nonNegativeCombination(distinct([...active, ...inner.active]), weights)
    const { leastNormPoint, multipliers, residual } = combination
    const most = weights.reduce((largest, entry) => Math.max(largest, Math.abs(entry)), 0)
    const difference = weights.reduce(
      (largest, entry, p) => Math.max(largest, Math.abs(entry - leastNormPoint[p]) / most),
      0,
    )
    return {
      passed: residual <= residualTolerance && difference <= tolerance,
      fast: norm(weights),
      independent: norm(leastNormPoint),
      tolerance,
      note: `Shown are norms. ${multipliers.length} conditions hold the point: residual ${residual.toExponential(1)}, least multiplier ${Math.min(...multipliers).toExponential(1)}; solved again from them it differs by ${difference.toExponential(1)} of its largest entry.`,
      value: true,
    }
  })
  return optimal ? { weights, edgeCurvesSuffice, curves } : undefined
}

const atLeastOne = (least: number, note: string): Verdict => ({
  passed: least >= 1 - tolerance,
  fast: 1,
  independent: least,
  tolerance,
  note: `${note} Shown is the least value, to be at least one.`,
})

function distinct(conditions: readonly Condition[]): Condition[] {
  return [
    ...new Map(conditions.map((row) => [`${row.points.join()};${row.coefficients.join()}`, row])).values(),
  ]
}

const norm = (w: ArrayLike<number>): number =>
  Math.sqrt(Array.from(w).reduce((sum, entry) => sum + entry * entry, 0))
