import { InputError } from '../errors.ts'
import { hull } from './hull.ts'
import { gcdOf } from './integers.ts'
import { applyBig, reducedBasis, transposed } from './latticeReduction.ts'
import { linearForm } from './linearForm.ts'
import { outerMonomials } from './monomials.ts'
import type { Polytope } from './polytope.ts'
import { dualPolytope, polytopeFromPoints } from './polytope.ts'
import { affineDimension } from './polytopeInput.ts'
import type { WeightSystem } from './weightSystem.ts'
import { weightSystem } from './weightSystem.ts'

/**
 * The polytope of a weight system w1..w5 of degree d = w1 + .. + w5. The Newton polytope is the hull of the exponents
 * e >= 0 with w . e = d, shifted by (1,1,1,1,1), in a reduced basis of the lattice { m : w . m = 0 }.
 *
 * @param side 'newton': the Newton polytope, the N side of the mirror; 'fan': its dual, the N side of the weighted
 *   hypersurface
 * @throws InputError with the codes of `weightSystem`, and weights.not-four-dimensional, weights.not-interior
 */
export function polytopeFromWeights(weights: readonly number[], side: 'fan' | 'newton'): Polytope {
  const newton = polytopeFromPoints(newtonVertices(weightSystem(weights)))
  return side === 'newton' ? newton : dualPolytope(newton)
}

/** Vertices of the Newton polytope, checked to span four dimensions and to have the origin inside. */
function newtonVertices(system: WeightSystem): number[][] {
  const { weights, degree } = system
  const heaviest = weights.indexOf(Math.max(...weights))
  if (2 * weights[heaviest] > degree) {
    // Then that exponent is at most 1, and a full list of monomials (there may be very many) is not needed.
    requireSpan(withProductFirst(system), degree)
    throw notInterior(
      weights.map((_, i) => (i === heaviest ? -1 : 0)),
      degree,
    )
  }
  const monomials = [...outerMonomials(system)]
  requireSpan(monomials, degree)
  const chart = latticeChart(system)
  const points = monomials.map((exponents) =>
    chart.map((row) => row.reduce((sum, entry, i) => sum + entry * (exponents[i] - 1), 0)),
  )
  const found = hull(points)
  if (found.kind === 'hull') return found.vertices.map((index) => points[index])
  if (found.kind === 'origin-not-interior') {
    const { normal } = found
    const coefficients = weights.map((_, i) => chart.reduce((sum, row, k) => sum + normal[k] * row[i], 0))
    throw notInterior(shortest(coefficients, weights), degree)
  }
  throw new InputError(
    'weights.degree-too-large',
    `The Newton polytope of degree ${degree} is too large for exact arithmetic; give smaller weights.`,
    '',
    degree,
  )
}

/** The monomial x1 x2 x3 x4 x5 first: the others need not be gone through to the end to find that they span. */
function* withProductFirst(system: WeightSystem): Generator<number[]> {
  yield [1, 1, 1, 1, 1]
  yield* outerMonomials(system)
}

function requireSpan(monomials: Iterable<number[]>, degree: number): void {
  const dimension = affineDimension(monomials)
  if (dimension === 4) return
  throw new InputError(
    'weights.not-four-dimensional',
    `The monomials of degree ${degree} span only ${dimension} of 4 dimensions.`,
    '',
    dimension,
  )
}

function notInterior(coefficients: readonly number[], degree: number): InputError {
  const level = coefficients.reduce((sum, entry) => sum + entry, 0)
  const upper = coefficients.every((entry) => entry <= 0)
  const inequality = upper
    ? `${linearForm(
        coefficients.map((entry) => -entry),
        'e',
      )} <= ${-level}`
    : `${linearForm(coefficients, 'e')} >= ${level}`
  return new InputError(
    'weights.not-interior',
    `The monomial x1 x2 x3 x4 x5 lies on the boundary of the Newton polytope: the exponents of all monomials of degree ${degree} satisfy ${inequality}, and it has equality.`,
    '',
    inequality,
  )
}

/**
 * A form on the exponents is determined up to multiples of the weights (w . e is constant). The shortest of those
 * that leave one exponent out, primitive.
 */
function shortest(coefficients: readonly number[], weights: readonly number[]): number[] {
  const size = (form: readonly number[]): number => form.reduce((sum, entry) => sum + Math.abs(entry), 0)
  const forms = weights.map((weight, i) => {
    const form = coefficients.map((entry, j) => weight * entry - coefficients[i] * weights[j])
    const common = gcdOf(form)
    return form.map((entry) => entry / common)
  })
  return forms.reduce((best, form) => (size(form) < size(best) ? form : best))
}

/**
 * Coordinates on { m in Z^5 : w . m = 0 }: four rows that map it onto Z^4, in a basis that is reduced for the
 * simplex { m >= -1 }, which contains the Newton polytope.
 */
function latticeChart({ weights, degree }: WeightSystem): number[][] {
  const rows = kernelChart(weights)
  const product = weights.reduce((all, weight) => all * BigInt(weight), 1n)
  // Vertex i of the simplex is d / w_i e_i - (1,1,1,1,1); all are stretched by the product of the weights.
  const corners = weights.map((weight, i) => {
    const stretched = weights.map(
      (_, j) => (i === j ? (product / BigInt(weight)) * BigInt(degree) : 0n) - product,
    )
    return applyBig(rows, stretched)
  })
  const { matrix } = reducedBasis(corners)
  return matrix.map((row) => applyBig(transposed(rows), row).map(Number))
}

/**
 * Four rows that map { m : w . m = 0 } isomorphically onto Z^4: the last rows of the inverse of a unimodular matrix
 * whose columns Euclid's algorithm makes out of the weights, w U = (1,0,0,0,0).
 */
function kernelChart(weights: readonly number[]): bigint[][] {
  const rest = weights.map(BigInt)
  const inverse = weights.map((_, i) => weights.map((_weight, j) => (i === j ? 1n : 0n)))
  for (;;) {
    const alive = rest.map((_, i) => i).filter((i) => rest[i] !== 0n)
    const smallest = alive.reduce((best, i) => (rest[i] < rest[best] ? i : best))
    if (alive.length === 1) return inverse.filter((_, i) => i !== smallest)
    for (const i of alive) {
      if (i === smallest) continue
      const quotient = rest[i] / rest[smallest]
      rest[i] -= quotient * rest[smallest]
      for (let j = 0; j < 5; j++) inverse[smallest][j] += quotient * inverse[i][j]
    }
  }
}
