import { EigenvalueDecomposition, Matrix } from 'ml-matrix'
import { InvariantError } from '../errors.ts'
import { inverseMetric } from './fieldSpaceMetric.ts'
import { instantonScales, sameClass, type InstantonScales } from './instantons.ts'
import { PointSpan } from './pointSpan.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'
import type { PairNumbers, Volumes } from './volumes.ts'

/** The axions of the four-form at one Kaehler class, by falling instanton scale. Planck units, M_pl = 1. */
export interface AxionSector {
  /** Decay constants f_a. */
  readonly decayConstants: Float64Array
  /** log10 of the masses. */
  readonly logMasses: Float64Array
  /** log10 of the scales Lambda_a (the potential has Lambda^4). */
  readonly logScales: Float64Array
  /** Distance in log10 Lambda to the nearest other axion; zero when tied, Infinity when there is no other. */
  readonly separations: Float64Array
  /** The divisors whose instantons give the axion its mass: all of one scale, when several are tied. */
  readonly divisors: readonly Int32Array[]
}

/**
 * Masses and decay constants for L = - G_ij d theta_i d theta_j - sum_a Lambda_a^4 (1 - cos 2 pi q_a . theta), theta of
 * period 1, so that the kinetic matrix is 2 G. The charges q_a are the divisors given, Lambda_a as in
 * `instantonScales`. By falling Lambda, independent ones are taken; the others are negligible. With P_ab = M_ab / 2
 * over these and P = L L^T, an axion with the heavier ones frozen has the inverse kinetic term L_aa^2, so
 * f_a = 1 / (2 pi L_aa) and m_a = Lambda_a^2 / f_a (Mehta et al. 2021, arXiv:2103.06812, from memory).
 * Valid for widely separated scales: see `separations`.
 *
 * Divisors of different class whose scales are tied are taken together, so that no order among them matters: the squares
 * of 1 / (2 pi f) are the non-zero eigenvalues of P over them, with the heavier axions frozen.
 *
 * @param candidates prime toric divisors whose instantons count, ascending
 * @param scale the Kaehler class is this many times the reference point, where `pairs` and `volumes` are taken
 */
export function axionSector(
  polytope: Polytope,
  pairs: PairNumbers,
  volumes: Volumes,
  candidates: Int32Array,
  scale: number,
): AxionSector {
  const scales = instantonScales(volumes, candidates, scale)
  const independent = independentDivisors(polytope, scales.order)
  const frozen = new FrozenMetric(inverseMetric(pairs, volumes, scales.order), scale)
  const constants: number[] = []
  const logScales: number[] = []
  const divisors: Int32Array[] = []
  for (const [start, end] of tiedRuns(scales)) {
    const chosen = range(start, end).filter((at) => independent[at] === 1)
    if (chosen.length === 0) continue
    const classes = range(start, end).filter(
      (at) => !range(start, at).some((other) => sameClass(polytope, scales.order[other], scales.order[at])),
    )
    for (const inverse of frozen.inverseKineticTerms(classes, chosen.length)) {
      constants.push(1 / (2 * Math.PI * Math.sqrt(inverse)))
      logScales.push(scales.logScales[start])
      divisors.push(scales.order.slice(start, end).sort())
    }
    for (const at of chosen) frozen.freeze(at)
  }
  return {
    decayConstants: Float64Array.from(constants),
    logMasses: Float64Array.from(constants, (f, a) => 2 * logScales[a] - Math.log10(f)),
    logScales: Float64Array.from(logScales),
    separations: Float64Array.from(logScales, (own, a) =>
      Math.min((logScales[a - 1] ?? Infinity) - own, own - (logScales[a + 1] ?? -Infinity)),
    ),
    divisors,
  }
}

const range = (start: number, end: number): number[] =>
  Array.from({ length: end - start }, (_, i) => start + i)

/** Scales this close, relative to their logarithm, are equal but for rounding. */
const tieTolerance = 1e-7

/** Runs [start, end) of the order within which scales are tied. */
function* tiedRuns({ logScales }: InstantonScales): Generator<[number, number]> {
  let start = 0
  for (let at = 1; at <= logScales.length; at++) {
    const gap = logScales[at - 1] - logScales[at]
    if (at < logScales.length && gap <= tieTolerance * Math.max(1, Math.abs(logScales[at]))) continue
    yield [start, at]
    start = at
  }
}

/**
 * 1 for the divisors of the order whose classes are independent of those before them. By duality of matroids these are
 * the ones whose points are dependent on all points that come later or do not occur at all.
 */
function independentDivisors(polytope: Polytope, order: Int32Array): Uint8Array {
  const later = new PointSpan(reducedCoordinates(polytope))
  const occurs = new Set(order)
  for (let p = 0; p < polytope.pointCount; p++) if (!occurs.has(p)) later.add(p)
  const independent = new Uint8Array(order.length)
  for (let at = order.length - 1; at >= 0; at--) independent[at] = later.add(order[at]) ? 0 : 1
  return independent
}

/** The matrix P = M / 2 over the divisors in order, and its Cholesky factor over those that are frozen so far. */
class FrozenMetric {
  private readonly frozen: number[] = []
  private readonly factor: Float64Array[] = []

  /** @param packed lower triangle of M at the reference point, row after row; it goes with the fourth power of the scale */
  constructor(
    private readonly packed: Float64Array,
    private readonly scale: number,
  ) {}

  /** The largest `count` eigenvalues of P over some divisors with the frozen axions eliminated. */
  inverseKineticTerms(members: readonly number[], count: number): number[] {
    const rows = members.map((at) => this.row(at))
    const left = members.map((a, i) => members.map((b, j) => this.entry(a, b) - product(rows[i], rows[j])))
    const values =
      members.length === 1
        ? [left[0][0]]
        : new EigenvalueDecomposition(new Matrix(left), { assumeSymmetric: true }).realEigenvalues
    const largest = values.sort((a, b) => b - a).slice(0, count)
    if (!(largest[count - 1] > 0))
      throw new InvariantError('The field-space metric is not positive definite over independent divisors.')
    return largest.map((value) => value * this.scale ** 4)
  }

  freeze(at: number): void {
    const row = this.row(at)
    const pivot = this.entry(at, at) - product(row, row)
    if (!(pivot > 0))
      throw new InvariantError('The field-space metric is not positive definite over independent divisors.')
    this.factor.push(Float64Array.of(...row, Math.sqrt(pivot)))
    this.frozen.push(at)
  }

  /** Row of the Cholesky factor that the divisor would have, up to the diagonal. */
  private row(at: number): Float64Array {
    const row = new Float64Array(this.frozen.length)
    for (let k = 0; k < row.length; k++) {
      const own = this.factor[k]
      let sum = this.entry(at, this.frozen[k])
      for (let m = 0; m < k; m++) sum -= row[m] * own[m]
      row[k] = sum / own[k]
    }
    return row
  }

  private entry(a: number, b: number): number {
    const [low, high] = a < b ? [a, b] : [b, a]
    return this.packed[(high * (high + 1)) / 2 + low] / 2
  }
}

function product(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}
