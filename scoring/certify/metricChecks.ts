import { EigenvalueDecomposition, Matrix } from 'ml-matrix'
import { InputError } from '../errors.ts'
import type { CheckList, Verdict } from './check.ts'
import type { Claims } from './claims.ts'
import type { CertifiedReference } from './coneChecks.ts'
import { CubicForm, ToricPart } from './cubicForm.ts'
import type { CertifiedNumbers } from './intersectionChecks.ts'
import { firstLatticeBasis } from './latticeBasis.ts'
import { PotentialDifferences } from './potentialDifferences.ts'

/** Largest relative differences: of volumes, of eigenvalues, and of the metric measured by differences. */
const volumeTolerance = 1e-9
const eigenvalueTolerance = 1e-7
const differenceTolerance = 1e-7

/**
 * A divisor volume smaller than this share of the sizes of its terms is compared on the scale of that share: what
 * cancels there is rounding of the Kaehler class itself.
 */
const cancellation = 1e-4

/** Up to this many moduli the metric is measured along every eigenvector, beyond along some. */
const allDirections = 24

export interface CertifiedMetric {
  readonly total: number
  readonly divisors: Float64Array
  /** Eigenvalues of the field-space metric over all prime toric divisors, ascending. */
  readonly divisorSpectrum: Float64Array
  readonly basis: readonly number[]
  readonly basisSpectrum: Float64Array
}

/**
 * Volumes and field-space metric from the certified intersection numbers at the certified reference point. The
 * inverse metric M = 4 (tau tau^T - V A) on the toric part is decomposed in full by ml-matrix; its eigenvalues,
 * inverted, are the divisor spectrum. Their relative error is about the condition number times 1e-16. That M is the
 * inverse of the metric is not taken from a formula alone: K is differenced along eigenvectors and sums of two.
 */
export function checkMetric(
  claims: Claims,
  numbers: CertifiedNumbers,
  reference: CertifiedReference,
  checks: CheckList,
): CertifiedMetric | undefined {
  const { points } = claims
  const { volumes, metric } = claims.numbers
  const { weights } = reference
  const form = new CubicForm(numbers.triples, points.length)
  const divisors = form.divisorVolumes(weights)
  const total = form.volume(weights, divisors)
  checks.run('volume-total', () => near([volumes.total], [total], volumeTolerance, () => total > 0))
  checks.run('divisor-volumes', () =>
    near(
      volumes.divisors,
      divisors,
      volumeTolerance,
      () => divisors.every((tau) => tau > 0),
      form.termSizes(weights).map((size) => cancellation * size),
    ),
  )
  const part = new ToricPart(points)
  const pairs = form.pairMatrix(weights)
  const inverse = pairs.map((row, i) =>
    row.map((entry, j) => 4 * (divisors[i] * divisors[j] - total * entry)),
  )
  let spectrum: { eigenvalues: Float64Array; vectors: Float64Array[] } | undefined
  const agrees = checks.run('divisor-spectrum', () => {
    const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(
      new Matrix(part.block(inverse)),
      { assumeSymmetric: true },
    )
    const order = [...realEigenvalues.keys()].sort((a, b) => realEigenvalues[b] - realEigenvalues[a])
    const eigenvalues = Float64Array.from(order, (n) => 1 / realEigenvalues[n])
    const vectors = order.map((n) => Float64Array.from(eigenvectorMatrix.getColumn(n)))
    const condition = realEigenvalues[order[0]] / realEigenvalues[order[order.length - 1]]
    const verdict = near(metric.divisorSpectrum, eigenvalues, eigenvalueTolerance, () => condition > 0)
    const note = `${verdict.note} Condition number ${condition.toExponential(1)}. Shown are the largest.`
    if (condition > 0) spectrum = { eigenvalues, vectors }
    return { ...verdict, note, value: true }
  })
  if (spectrum === undefined) return undefined
  const { eigenvalues, vectors } = spectrum
  checks.run('top-eigenvalue', () =>
    near([metric.top], eigenvalues.subarray(-1), eigenvalueTolerance, () => true),
  )
  checks.run('metric-differences', () => {
    const potential = new PotentialDifferences(form, part, pairs, weights, vectors, eigenvalues)
    const count = eigenvalues.length
    const chosen = chosenDirections(count)
    const claimed: number[] = []
    const measured: number[] = []
    let error = 0
    const measure = (direction: Float64Array, value: number): void => {
      const length = potential.along(direction, value)
      claimed.push(value)
      measured.push(length.value)
      error = Math.max(error, length.error)
    }
    for (const [at, n] of chosen.entries()) {
      measure(vectors[n], metric.divisorSpectrum[n])
      const other = chosen[at + 1]
      if (other === undefined) continue
      const sum = vectors[n].map((entry, axis) => entry + vectors[other][axis])
      measure(sum, metric.divisorSpectrum[n] + metric.divisorSpectrum[other])
    }
    // Far out in the cone rounding leaves the differences fewer digits; the spectrum is compared as sharply there.
    const verdict = near(claimed, measured, Math.max(differenceTolerance, 4 * error), () => true)
    const all = chosen.length === count ? 'all' : `${chosen.length} of ${count}`
    return {
      ...verdict,
      passed: verdict.passed && error < 1e-3,
      note: `${verdict.note} Along ${all} eigenvectors and sums of two; steps e, e/2, e/4, extrapolated; error at most about ${error.toExponential(1)}. Shown are the largest.`,
    }
  })
  const basis = checks.run('lattice-basis', () => {
    const { excluded, index } = firstLatticeBasis(points)
    const value = [...points.keys()].filter((p) => !excluded.includes(p))
    return {
      passed: value.join() === metric.basis.join(),
      fast: metric.basis.length,
      independent: value.length,
      note: `Without points ${excluded.join(', ')}, the first four whose determinant is ${index}, the greatest common divisor of all.`,
      value,
    }
  })
  if (basis === undefined) return undefined
  const basisSpectrum = checks.run('basis-spectrum', () => {
    const block = basis.map((i) => Float64Array.from(basis, (j) => inverse[i][j]))
    const found = new EigenvalueDecomposition(new Matrix(block), { assumeSymmetric: true }).realEigenvalues
    const value = Float64Array.from(found, (entry) => 1 / entry).sort()
    const verdict = near(metric.basisSpectrum, value, eigenvalueTolerance, () => value[0] > 0)
    return { ...verdict, note: `${verdict.note} Shown are the largest.`, value }
  })
  if (basisSpectrum === undefined || !agrees) return undefined
  return { total, divisors, divisorSpectrum: eigenvalues, basis, basisSpectrum }
}

/** All, or the ends and some between. */
function chosenDirections(count: number): number[] {
  if (count <= allDirections) return Array.from({ length: count }, (_, n) => n)
  return [0, 1, ...[1, 2, 3, 4].map((n) => Math.round((n * count) / 5)), count - 2, count - 1]
}

/** Relative differences of two lists, entries not taken smaller than `scales`; shown are the last entries. */
function near(
  fast: ArrayLike<number>,
  independent: ArrayLike<number>,
  tolerance: number,
  sound: () => boolean,
  scales?: ArrayLike<number>,
): Verdict & { readonly note: string } {
  if (fast.length !== independent.length) {
    throw new InputError(
      'certificate.wrong-count',
      `${fast.length} values are claimed, ${independent.length} found.`,
    )
  }
  let worst = 0
  let at = 0
  for (let n = 0; n < fast.length; n++) {
    const scale = Math.max(Math.abs(fast[n]), Math.abs(independent[n]), scales?.[n] ?? 0)
    const difference = scale === 0 ? 0 : Math.abs(fast[n] - independent[n]) / scale
    if (difference <= worst) continue
    worst = difference
    at = n
  }
  const place = fast.length > 1 ? ` at entry ${at} of ${fast.length}` : ''
  const isSound = sound()
  return {
    passed: worst <= tolerance && isSound,
    fast: fast[fast.length - 1],
    independent: independent[independent.length - 1],
    tolerance,
    note: `Largest relative difference ${worst.toExponential(1)}${place}.${isSound ? '' : ' Not all are positive.'}`,
  }
}
