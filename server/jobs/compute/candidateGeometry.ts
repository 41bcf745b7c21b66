import {
  buildCandidate,
  canonicalClass,
  classFromHeights,
  componentNumbers,
  componentsOf,
  InvariantError,
  normalForm,
  polytopeFromPoints,
  type Candidate,
  type IntersectionNumbers,
} from '../../../scoring/index.ts'
import type { CandidateGeometry, CandidateSpectra } from '../../../shared/candidates.ts'
import { outlineOf } from './polytopeStructure.ts'

export interface CandidateGeometryInput {
  readonly key: string
  /** Vertices in normal-form coordinates. */
  readonly vertices: readonly number[][]
  readonly heights: readonly number[]
}

/** A candidate's dossier but for what the library knows of its polytope. */
export type ComputedGeometry = Omit<CandidateGeometry, 'key' | 'polytope'>

/** The candidate that is stored under a key, on its canonical representative. */
export function storedCandidate({ key, vertices, heights }: CandidateGeometryInput): Candidate {
  const form = normalForm(polytopeFromPoints(vertices))
  const given = classFromHeights(form.polytope, heights)
  if (!given.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
  const canonical = canonicalClass(form, given.class)
  if (canonical.key !== key || canonical.class !== given.class) {
    throw new InvariantError(
      `The stored heights of candidate ${key} give the class ${canonical.key}, or not its canonical form.`,
    )
  }
  return buildCandidate(form, canonical.class, key)
}

/** What the dossier shows but for the whole spectra, at scale 1. */
export function candidateGeometry(input: CandidateGeometryInput): ComputedGeometry {
  const candidate = storedCandidate(input)
  const numbers = candidate.numbers()
  const reference = candidate.reference()
  const volumes = candidate.volumes()
  return {
    heights: [...input.heights],
    triangles: triples(candidate.class.triangles),
    faceOf: [...candidate.class.faceOf],
    intersections: intersectionList(numbers),
    secondChern: [...numbers.secondChern],
    divisors: divisorList(candidate, numbers),
    components: componentList(candidate, numbers),
    fibrations: fibrationList(candidate),
    curves: curveList(candidate),
    reference: {
      weights: [...reference.weights],
      volume: volumes.total,
      norm: Math.hypot(...reference.weights),
      edgeCurvesSuffice: reference.edgeCurvesSuffice,
    },
    topEigenvalue: candidate.topEigenvalue(),
  }
}

/** The whole spectra of the field-space metric at the reference point, scale 1. */
export function candidateSpectra(input: CandidateGeometryInput): Omit<CandidateSpectra, 'key'> {
  const candidate = storedCandidate(input)
  const { eigenvalues, basis } = candidate.basisSpectrum()
  return {
    divisorSpectrum: [...candidate.divisorSpectrum()],
    basisSpectrum: [...eigenvalues],
    basis: [...basis],
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

function componentList(candidate: Candidate, numbers: IntersectionNumbers): ComputedGeometry['components'] {
  const { polytope } = candidate
  if (polytope.favourable) return null
  const { pointOf, sheetOf } = componentsOf(polytope)
  const full = componentNumbers(candidate.class, numbers)
  const { divisors } = candidate.volumes()
  return {
    pointOf: [...pointOf],
    sheetOf: [...sheetOf],
    cubes: [...full.cubes],
    secondChern: [...full.secondChern],
    volumes: Array.from(pointOf, (p) => divisors[p] / polytope.components[p]),
    intersections: intersectionList(full),
  }
}

function fibrationList(candidate: Candidate): ComputedGeometry['fibrations'] {
  const { planar, solid } = candidate.sections()
  const { k3, genusOne, nested } = candidate.fibrations()
  return {
    planarSections: planar.length,
    solidSections: solid.length,
    k3: k3.map(({ section, fibre }) => ({
      section,
      latticePoints: solid[section].points.length + 1,
      fibre: Array.from(fibre, (coefficient, p): [number, number] => [p, coefficient]).filter(
        ([, coefficient]) => coefficient !== 0,
      ),
    })),
    genusOne: genusOne.map(({ section, baseRays, degree }) => ({
      section,
      type: planar[section].type,
      outline: outlineOf(planar[section].turns),
      baseRays: Array.from({ length: baseRays.length / 2 }, (_, ray): [number, number] => [
        baseRays[2 * ray],
        baseRays[2 * ray + 1],
      ]),
      degree,
    })),
    nested: nested.map(([outer, inner]): [number, number] => [outer, inner]),
  }
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
