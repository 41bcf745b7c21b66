import type { Certified } from '../certify/independentRoad.ts'
import { classFromTriangles } from '../geometry/classFromTriangles.ts'
import { edgeRow, type IntersectionNumbers } from '../geometry/intersectionNumbers.ts'
import { normalForm } from '../geometry/normalForm.ts'
import { polytopeFromPoints } from '../geometry/polytope.ts'
import { buildCandidate } from '../observables/buildCandidate.ts'
import type { Candidate } from '../observables/candidate.ts'

/**
 * A candidate all of whose numbers are certified ones, for the scoring language to read: intersection numbers,
 * reference point, volumes and spectra are the independent road's. Stages that the road does not supply are derived
 * from these by the ordinary code.
 */
export function certifiedCandidate(certified: Required<Certified>, candidateKey: string): Candidate {
  const { polytope, fan, metric, reference } = certified
  const form = normalForm(polytopeFromPoints(polytope.reading.vertices))
  const canonical = classFromTriangles(form.polytope, fan.triangles.flat())
  const numbers = sparseNumbers(certified)
  return buildCandidate(form, canonical, candidateKey, {
    numbers: () => numbers,
    reference: () => ({
      weights: Float64Array.from(reference.weights),
      edgeCurvesSuffice: reference.edgeCurvesSuffice,
      rounds: reference.edgeCurvesSuffice ? 0 : 1,
    }),
    volumes: () => ({ total: metric.total, divisors: metric.divisors }),
    topEigenvalue: () => metric.divisorSpectrum[metric.divisorSpectrum.length - 1],
    divisorSpectrum: () => metric.divisorSpectrum,
    basisSpectrum: () => ({ basis: Int32Array.from(metric.basis), eigenvalues: metric.basisSpectrum }),
  })
}

/** Certified numbers in the arrays that observables read. */
function sparseNumbers({ fan, numbers, polytope }: Required<Certified>): IntersectionNumbers {
  const pointCount = polytope.figures.points.length
  const triangles = Int32Array.from(fan.triangles.flat())
  const codes = new Set<number>()
  for (const [i, j, k] of fan.triangles) {
    codes
      .add(i * pointCount + j)
      .add(i * pointCount + k)
      .add(j * pointCount + k)
  }
  const edges = Int32Array.from(
    [...codes].sort((a, b) => a - b).flatMap((code) => [Math.floor(code / pointCount), code % pointCount]),
  )
  const placeOf = new Map(fan.triangles.map((triangle, t) => [triangle.join(), t]))
  const triangleNumbers = new Float64Array(fan.triangles.length)
  const edgeNumbers = new Float64Array(edges.length)
  const cubes = new Float64Array(pointCount)
  for (const [i, j, k, value] of numbers.triples) {
    if (i === k) cubes[i] = value
    else if (i === j) edgeNumbers[2 * edgeRow(edges, i, k)] = value
    else if (j === k) edgeNumbers[2 * edgeRow(edges, i, k) + 1] = value
    else triangleNumbers[placeOf.get(`${i},${j},${k}`) as number] = value
  }
  const secondChern = Float64Array.from(numbers.secondChern)
  return {
    pointCount,
    triangles,
    triangleNumbers,
    edges,
    edgeNumbers,
    cubes,
    secondChern,
    euler: numbers.euler,
  }
}
