import {
  buildCandidate,
  canonicalClass,
  classFromHeights,
  InvariantError,
  normalForm,
  polytopeFromPoints,
  type Candidate,
  type IntersectionNumbers,
} from '../../../scoring/index.ts'
import type { CandidateGeometry } from '../../../shared/candidates.ts'

export interface CandidateGeometryInput {
  readonly key: string
  /** Vertices in normal-form coordinates. */
  readonly vertices: readonly number[][]
  readonly heights: readonly number[]
}

/** A candidate's dossier but for what the library knows of its polytope. */
export type ComputedGeometry = Omit<CandidateGeometry, 'key' | 'polytope'>

/** Everything the dossier shows, on the canonical representative, at scale 1. */
export function candidateGeometry({ key, vertices, heights }: CandidateGeometryInput): ComputedGeometry {
  const form = normalForm(polytopeFromPoints(vertices))
  const given = classFromHeights(form.polytope, heights)
  if (!given.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
  const canonical = canonicalClass(form, given.class)
  if (canonical.key !== key || canonical.class !== given.class) {
    throw new InvariantError(
      `The stored heights of candidate ${key} give the class ${canonical.key}, or not its canonical form.`,
    )
  }
  const candidate = buildCandidate(form, canonical.class, key)
  const numbers = candidate.numbers()
  const reference = candidate.reference()
  const volumes = candidate.volumes()
  const basis = candidate.basisSpectrum()
  return {
    heights: [...heights],
    triangles: triples(canonical.class.triangles),
    faceOf: [...canonical.class.faceOf],
    intersections: intersectionList(numbers),
    secondChern: [...numbers.secondChern],
    divisors: divisorList(candidate, numbers),
    curves: curveList(candidate),
    reference: {
      weights: [...reference.weights],
      volume: volumes.total,
      norm: Math.hypot(...reference.weights),
      edgeCurvesSuffice: reference.edgeCurvesSuffice,
    },
    metric: {
      divisorSpectrum: [...candidate.divisorSpectrum()],
      basisSpectrum: [...basis.eigenvalues],
      basis: [...basis.basis],
    },
  }
}

function triples(flat: ArrayLike<number>): [number, number, number][] {
  return Array.from({ length: flat.length / 3 }, (_, t) => [flat[3 * t], flat[3 * t + 1], flat[3 * t + 2]])
}

/** Non-zero kappa_ijk with i <= j <= k, in lexicographic order. */
function intersectionList(numbers: IntersectionNumbers): ComputedGeometry['intersections'] {
  const { triangles, triangleNumbers, edges, edgeNumbers, cubes } = numbers
  const list: ComputedGeometry['intersections'] = []
  const put = (i: number, j: number, k: number, value: number) => {
    if (value !== 0) list.push([i, j, k, value])
  }
  cubes.forEach((value, i) => put(i, i, i, value))
  for (let e = 0; e < edges.length / 2; e++) {
    const [i, j] = [edges[2 * e], edges[2 * e + 1]]
    put(i, i, j, edgeNumbers[2 * e])
    put(i, j, j, edgeNumbers[2 * e + 1])
  }
  triangleNumbers.forEach((value, t) =>
    put(triangles[3 * t], triangles[3 * t + 1], triangles[3 * t + 2], value),
  )
  return list.sort((a, b) => a[0] - b[0] || a[1] - b[1] || a[2] - b[2])
}

function divisorList(candidate: Candidate, numbers: IntersectionNumbers): ComputedGeometry['divisors'] {
  const { chi, h1, h2, components, rigid } = candidate.divisorTopology()
  const { divisors } = candidate.volumes()
  return Array.from(chi, (value, i) => ({
    chi: value,
    h1: h1[i],
    h2: h2[i],
    components: components[i],
    rigid: rigid[i] === 1,
    cube: numbers.cubes[i],
    volume: divisors[i],
  }))
}

function curveList(candidate: Candidate): ComputedGeometry['curves'] {
  const { starts, points, coefficients } = candidate.curves()
  const { curves } = candidate.volumes()
  return Array.from(curves, (volume, row) => {
    const entries: [number, number][] = []
    for (let at = starts[row]; at < starts[row + 1]; at++) entries.push([points[at], coefficients[at]])
    return { row: entries, volume }
  })
}
