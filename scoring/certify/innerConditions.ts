import type { Condition } from './curveClasses.ts'
import { crossForm, greatestCommonDivisor, pairing, type Vector } from './determinants.ts'
import { LiftedSimplex, liftedPoints } from './liftedSimplex.ts'

/** All circuits of the inner cone, examined at one Kaehler class. */
export interface InnerReport {
  /** How many conditions there are. */
  readonly count: number
  /** The least value. */
  readonly least: number
  /** Distinct conditions whose value is at most the threshold. */
  readonly active: readonly Condition[]
}

/**
 * The conditions of the inner cone of a class, the union of the toric Kaehler cones of all its fine regular star
 * triangulations, one for every triangle (i, j, k) and every point in its plane's span or pair of points on both
 * sides of it. A piecewise linear function with the values w on the points has the cone over the triangle in its
 * fan if and only if every relation
 *
 *     a v_p + b v_q = c_i v_i + c_j v_j + c_k v_k,   a, b >= 0,
 *
 * has a w_p + b w_q > c_i w_i + c_j w_j + c_k w_k. With x = det(v_i, v_j, v_k, .), which is primitive, and any point d
 * off the span, p = (x_p / x_d) d + (combination of i, j, k); let r_p be (w_p less the same combination of w) / x_p.
 * The primitive relation has the value lcm(x_p, |x_q|) (r_p - r_q) for x_p > 0 > x_q, and w_p less the combination
 * for x_p = 0. All pairs are gone through; where the difference of ratios already exceeds the threshold and
 * the least value so far, the lcm, which is at least one, cannot matter.
 */
export function innerConditions(
  points: readonly Vector[],
  triangles: readonly (readonly number[])[],
  w: readonly number[],
  threshold: number,
): InnerReport {
  const flat = liftedPoints(points, new Float64Array(points.length))
  const active = new Map<string, Condition>()
  let count = 0
  let least = Infinity
  const ratio = new Float64Array(points.length)
  const x = new Float64Array(points.length)
  for (const [i, j, k] of triangles) {
    const form = crossForm(points[i], points[j], points[k])
    const d = points.findIndex((point) => pairing(form, point) !== 0)
    const basis = new LiftedSimplex(flat, [i, j, k, d])
    const sides: [number[], number[], number[]] = [[], [], []]
    for (let p = 0; p < points.length; p++) {
      x[p] = pairing(form, points[p])
      const rest =
        w[p] - (basis.share(0, p) * w[i] + basis.share(1, p) * w[j] + basis.share(2, p) * w[k]) / basis.volume
      ratio[p] = x[p] === 0 ? rest : rest / x[p]
      if (p !== i && p !== j && p !== k) sides[Math.sign(x[p]) + 1].push(p)
    }
    const [below, inside, above] = sides
    count += inside.length + below.length * above.length
    for (const p of inside) {
      least = Math.min(least, ratio[p])
      if (ratio[p] <= threshold) keep(basis, [p], [1])
    }
    for (const p of above) {
      for (const q of below) {
        const difference = ratio[p] - ratio[q]
        if (difference > threshold && difference > least) continue
        const common = greatestCommonDivisor(x[p], x[q])
        const value = ((x[p] * -x[q]) / common) * difference
        least = Math.min(least, value)
        if (value <= threshold) keep(basis, [p, q], [-x[q] / common, x[p] / common])
      }
    }
  }
  return { count, least, active: [...active.values()] }

  /** The relation of the points with the corners of the basis, its fourth corner excepted. */
  function keep(basis: LiftedSimplex, ends: readonly number[], factors: readonly number[]): void {
    const entries: [number, number][] = ends.map((p, n) => [p, factors[n]])
    for (let at = 0; at < 3; at++) {
      const share = ends.reduce((sum, p, n) => sum + factors[n] * basis.share(at, p), 0) / basis.volume
      if (share !== 0) entries.push([basis.corners[at], -share])
    }
    entries.sort((a, b) => a[0] - b[0])
    active.set(entries.join(' '), {
      points: entries.map(([p]) => p),
      coefficients: entries.map(([, coefficient]) => coefficient),
    })
  }
}
