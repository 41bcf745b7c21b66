import { caution } from './caution.ts'
import {
  evaluationInputSchema,
  evaluationParts,
  heightsOfInput,
  parsedInput,
  polytopeOfInput,
  ruleOfInput,
  type EvaluationInput,
  type EvaluationPart,
} from './evaluation/input.ts'
import {
  curveList,
  intersectionList,
  perPoint,
  relabellingOf,
  sortedTriangles,
  type Relabelling,
} from './evaluation/relabelled.ts'
import { canonicalClass } from './geometry/classKey.ts'
import { divisorTopology } from './geometry/divisors.ts'
import { normalForm } from './geometry/normalForm.ts'
import type { Hodge, Polytope } from './geometry/polytope.ts'
import { toNormalForm } from './geometry/transport.ts'
import { classFromHeights } from './geometry/twoFaceClass.ts'
import { buildCandidate } from './observables/buildCandidate.ts'
import type { Candidate } from './observables/candidate.ts'
import type { CheckedRule } from './rules/checkedRule.ts'
import { evaluateRule } from './rules/evaluate.ts'
import { scoringHash } from './rules/hash.ts'
import type { Outcome } from './rules/outcome.ts'
import { engineVersion } from './version.ts'

export type { EvaluationInput, EvaluationPart }

/** What the numbers of an evaluation are measured in; part of every evaluation. */
export const evaluationUnits =
  "Volumes in Einstein frame, 2 pi sqrt(alpha') = 1, leading order; field-space metric in M_pl^2 with L = -G d tau d tau."

/**
 * Everything the engine says about one triangulation, as plain data. Indices refer to `points`, in the input's
 * coordinates. Values belong to the class: they are computed on its canonical representative and carried back to
 * the input's labels. Where the heights are not fine, `unused` lists the points left out and what is then not
 * defined is null. Parts that were not asked for are absent.
 */
export interface Evaluation {
  readonly schema: 'tessellary.evaluation/1'
  readonly engineVersion: string
  readonly units: string
  readonly caution: string
  readonly polytopeKey: string
  readonly points: readonly (readonly number[])[]
  readonly hodge: Hodge
  readonly favourable: boolean
  readonly fine: boolean
  readonly unused?: readonly number[]
  readonly classKey: string | null
  /** The heights that were used, one per point. */
  readonly heights: readonly number[]
  readonly triangles?: readonly (readonly number[])[]
  /** Non-zero [i, j, k, kappa_ijk] with i <= j <= k. */
  readonly intersections?: readonly (readonly number[])[] | null
  readonly c2?: readonly number[] | null
  readonly divisors?: readonly DivisorEntry[]
  /** Primitive curve classes, one row of [k, coefficient] per edge of the class. */
  readonly curves?: readonly (readonly (readonly number[])[])[] | null
  readonly reference?: ReferenceEntry | null
  readonly metric?: MetricEntry | null
  readonly score?: (ScoreEntry & { readonly scoringHash: string }) | null
}

export interface DivisorEntry {
  readonly chi: number
  readonly h1: number
  readonly h2: number
  readonly components: number
  readonly rigid: boolean
  readonly volume: number | null
}

/** The Kaehler class at which volumes and metric are taken: `scale` times the reference point. */
export interface ReferenceEntry {
  readonly heights: readonly number[]
  readonly volume: number
  readonly edgeCurvesSuffice: boolean
  readonly scale: number
}

export interface MetricEntry {
  readonly divisorSpectrum: readonly number[]
  readonly basisSpectrum: readonly number[]
  readonly basis: readonly number[]
}

/** What the rule says, at the scale that the rule itself names. Exactly one of value, infeasible, undefined. */
export interface ScoreEntry {
  readonly value?: number
  readonly infeasible?: {
    readonly stage: string
    readonly shortfall: number
    readonly failed: readonly { readonly label: string; readonly shortfall: number }[]
  }
  readonly undefined?: string
  /** Report columns; a cell without a value says why: { "undefined": reason }. */
  readonly report: Readonly<Record<string, number | boolean | { readonly undefined: string }>>
  /** Null when the rule has no `hit`, or it is undefined here. */
  readonly hit: boolean | null
}

/**
 * Evaluates one input of the headless contract.
 * @throws InputError with a stable code and the JSON path of the field at fault
 */
export function evaluateInput(raw: unknown): Evaluation {
  const input = parsedInput(evaluationInputSchema, raw)
  const rule = input.rule === undefined ? undefined : ruleOfInput(input.rule)
  const polytope = polytopeOfInput(input)
  const heights = heightsOfInput(polytope, input.heights)
  const show = new Set<EvaluationPart>(input.show ?? evaluationParts)
  const form = normalForm(polytope)
  const placed = classFromHeights(polytope, heights)
  const head = {
    schema: 'tessellary.evaluation/1',
    engineVersion,
    units: evaluationUnits,
    caution,
    polytopeKey: form.key,
    points: pointRows(polytope),
    hodge: polytope.hodge,
    favourable: polytope.favourable,
  } as const
  if (!placed.fine) {
    return {
      ...head,
      fine: false,
      unused: [...placed.unused],
      classKey: null,
      heights: [...heights],
      ...(show.has('triangles') && { triangles: sortedTriangles(placed.triangles, null) }),
      ...(show.has('intersections') && { intersections: null }),
      ...(show.has('c2') && { c2: null }),
      ...(show.has('divisors') && { divisors: divisorsOf(polytope, null) }),
      ...(show.has('curves') && { curves: null }),
      ...(show.has('reference') && { reference: null }),
      ...(show.has('metric') && { metric: null }),
      ...(rule && { score: null }),
    }
  }
  const canonical = canonicalClass(form, toNormalForm(form, placed.class))
  const candidate = buildCandidate(form, canonical.class, canonical.key)
  const labels = relabellingOf(form, canonical)
  const scale = input.scale ?? 1
  return {
    ...head,
    fine: true,
    classKey: canonical.key,
    heights: [...heights],
    ...(show.has('triangles') && { triangles: sortedTriangles(placed.class.triangles, null) }),
    ...(show.has('intersections') && { intersections: intersectionList(candidate, labels) }),
    ...(show.has('c2') && { c2: perPoint(labels, candidate.numbers().secondChern) }),
    ...(show.has('divisors') && {
      divisors: divisorsOf(
        polytope,
        perPoint(labels, candidate.volumes().divisors).map((volume) => volume * scale ** 2),
      ),
    }),
    ...(show.has('curves') && { curves: curveList(candidate, labels) }),
    ...(show.has('reference') && { reference: referenceOf(candidate, labels, scale) }),
    ...(show.has('metric') && { metric: metricOf(candidate, labels, scale) }),
    ...(rule && {
      score: {
        scoringHash: scoringHash(rule, engineVersion),
        ...scoreEntry(evaluateRule(rule, candidate), rule),
      },
    }),
  }
}

function pointRows({ points, pointCount }: Polytope): number[][] {
  return Array.from({ length: pointCount }, (_, p) => [...points.subarray(4 * p, 4 * p + 4)])
}

function divisorsOf(polytope: Polytope, volumes: readonly number[] | null): DivisorEntry[] {
  const { chi, h1, h2, components, rigid } = divisorTopology(polytope)
  return Array.from(chi, (value, i) => ({
    chi: value,
    h1: h1[i],
    h2: h2[i],
    components: components[i],
    rigid: rigid[i] === 1,
    volume: volumes === null ? null : volumes[i],
  }))
}

function referenceOf(candidate: Candidate, labels: Relabelling, scale: number): ReferenceEntry {
  const { weights, edgeCurvesSuffice } = candidate.reference()
  return {
    heights: perPoint(labels, weights).map((weight) => weight * scale),
    volume: candidate.volumes().total * scale ** 3,
    edgeCurvesSuffice,
    scale,
  }
}

function metricOf(candidate: Candidate, { back }: Relabelling, scale: number): MetricEntry {
  const scaled = (values: Float64Array): number[] => Array.from(values, (value) => value / scale ** 4)
  const { basis, eigenvalues } = candidate.basisSpectrum()
  return {
    divisorSpectrum: scaled(candidate.divisorSpectrum()),
    basisSpectrum: scaled(eigenvalues),
    basis: Array.from(basis, (point) => back[point]).sort((i, j) => i - j),
  }
}

/** An outcome in the words of the headless contract. */
export function scoreEntry(outcome: Outcome, rule: Pick<CheckedRule, 'hit'>): ScoreEntry {
  const noHit = rule.hit === null ? null : false
  switch (outcome.kind) {
    case 'feasible': {
      const cells = Object.entries(outcome.report).map(
        ([name, cell]) => [name, cell.value === null ? { undefined: cell.reason } : cell.value] as const,
      )
      return { value: outcome.score, report: Object.fromEntries(cells), hit: outcome.hit }
    }
    case 'infeasible': {
      const { stage, shortfall, failed } = outcome
      return { infeasible: { stage, shortfall, failed }, report: {}, hit: noHit }
    }
    case 'undefined':
      return { undefined: outcome.reason, report: {}, hit: noHit }
  }
}
