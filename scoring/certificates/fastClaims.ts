import { evaluationUnits, scoreEntry } from '../evaluation.ts'
import { InputError } from '../errors.ts'
import { intersectionList, sortedTriangles } from '../evaluation/relabelled.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import { facetGenericity } from '../certify/facetTriangulation.ts'
import type { Claims } from '../certify/claims.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { genericWitness } from '../geometry/genericWitness.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../geometry/polytope.ts'
import { transportHeights } from '../geometry/transport.ts'
import { classFromHeights } from '../geometry/twoFaceClass.ts'
import { buildCandidate } from '../observables/buildCandidate.ts'
import type { Candidate } from '../observables/candidate.ts'
import { evaluateRule } from '../rules/evaluate.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import type { CertificateNumbers } from './schema.ts'
import { plainScore } from './scoreChecks.ts'

/** What is to be certified. */
export interface CertificateRequest {
  /** The polytope's normal form. */
  readonly vertices: readonly (readonly number[])[]
  /** One integer per point of the normal form. */
  readonly heights: ArrayLike<number>
  readonly candidateKey: string
  /** Text of the scoring rule whose score is to be certified. */
  readonly rule: string | null
}

/** The fast road's answer on the canonical representative of the class, in the labels that candidates have. */
export interface FastClaims {
  readonly claims: Claims & { readonly numbers: CertificateNumbers }
  readonly candidate: Candidate
  readonly form: NormalForm
  readonly rule: CheckedRule | null
  readonly heightsReplaced: boolean
  readonly units: string
}

/**
 * @throws InputError of the geometry and the language; certificate.not-normal-form, certificate.heights-not-fine
 */
export function fastClaims(request: CertificateRequest): FastClaims {
  const rule = request.rule === null ? null : ruleOfInput(request.rule)
  const given = polytopeFromPoints(request.vertices)
  const form = normalForm(given)
  if (!form.polytope.points.every((entry, n) => entry === given.points[n])) {
    throw new InputError(
      'certificate.not-normal-form',
      'The vertices are not in normal form, so the order of the heights is not determined.',
      'vertices',
    )
  }
  const { polytope } = form
  const outcome = classFromHeights(polytope, request.heights)
  if (!outcome.fine) {
    throw new InputError(
      'certificate.heights-not-fine',
      `The heights leave ${outcome.unused.length} points unused, the first of them point ${outcome.unused[0]}.`,
      'heights',
      [...outcome.unused],
    )
  }
  const canonical = canonicalClass(form, outcome.class)
  const points = rows(polytope)
  const vertices = points.slice(0, polytope.vertexCount)
  const generic = facetGenericity(vertices, points)
  let heights = transportHeights(request.heights, canonical.relabelling)
  const heightsReplaced = !generic(heights)
  if (heightsReplaced) heights = genericWitness(canonical.class, heights, { accept: generic })
  const candidate = buildCandidate(form, canonical.class, canonical.key)
  return {
    claims: {
      polytopeKey: form.key,
      candidateKey: request.candidateKey,
      vertices,
      points,
      heights: [...heights],
      numbers: numbersOf(candidate, rule),
    },
    candidate,
    form,
    rule,
    heightsReplaced,
    units: evaluationUnits,
  }
}

function numbersOf(candidate: Candidate, rule: CheckedRule | null): CertificateNumbers {
  const { polytope } = candidate
  const { basis, eigenvalues } = candidate.basisSpectrum()
  const { weights, edgeCurvesSuffice } = candidate.reference()
  const { total, divisors } = candidate.volumes()
  const same = Int32Array.from({ length: polytope.pointCount }, (_, p) => p)
  return {
    facets: polytope.facetCount,
    faces: { edges: polytope.edges.length, twoFaces: polytope.twoFaces.length },
    normalisedVolumes: { ...candidate.normalisedVolumes() },
    latticePoints: polytope.latticePoints,
    dualLatticePoints: polytope.dualLatticePoints,
    hodge: { ...polytope.hodge },
    favourable: polytope.favourable,
    carriers: [...polytope.carrierDimension],
    components: [...polytope.components],
    dualInterior: [...polytope.dualInterior],
    triangles: sortedTriangles(candidate.class.triangles, null) as [number, number, number][],
    simplices: null,
    intersections: intersectionList(candidate, { to: same, back: same }) as [
      number,
      number,
      number,
      number,
    ][],
    c2: [...candidate.numbers().secondChern],
    reference: { weights: [...weights], edgeCurvesSuffice },
    volumes: { total, divisors: [...divisors] },
    metric: {
      top: candidate.topEigenvalue(),
      divisorSpectrum: [...candidate.divisorSpectrum()],
      basis: [...basis],
      basisSpectrum: [...eigenvalues],
    },
    score: rule && plainScore(scoreEntry(evaluateRule(rule, candidate), rule)),
  }
}

function rows({ points, pointCount }: Polytope): number[][] {
  return Array.from({ length: pointCount }, (_, p) => [...points.subarray(4 * p, 4 * p + 4)])
}
