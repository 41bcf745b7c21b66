import { z } from 'zod'
import { searchSpec, type SearchSpec } from '../cli/searchSpec.ts'
import { InputError } from '../errors.ts'
import { scoreEntry, type ScoreEntry } from '../evaluation.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { facetGenericHeights } from '../geometry/fans/facetGenericHeights.ts'
import { transportHeights } from '../geometry/transport.ts'
import { classFromHeights } from '../geometry/twoFaceClass.ts'
import { buildCandidate } from '../observables/buildCandidate.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { evaluateRule } from '../rules/evaluate.ts'
import { scoringHash } from '../rules/hash.ts'
import type { Outcome } from '../rules/outcome.ts'
import type { PolytopeSource } from '../search/polytopeSource.ts'
import { engineVersion } from '../version.ts'

const key = z.string().regex(/^[0-9a-f]{32}$/)
const count = z.number().int().min(0)

const startLine = z.looseObject({
  kind: z.literal('start'),
  schema: z.literal('tessellary.search/1'),
  engineVersion: z.string(),
  scoringHash: z.string(),
  spec: z.unknown(),
})

const listed = z.looseObject({
  polytopeKey: key,
  classKey: key,
  score: z.looseObject({}),
  heights: z.array(z.number().int()),
})

const progress = z.object({
  budget: count,
  given: count.default(0),
  evaluations: count,
  proposals: count,
  accepted: count,
  restarts: count,
  feasible: count,
  infeasible: count,
  undefined: count,
  best: z.number().nullable(),
  bestKey: key.nullable(),
  curve: z.array(z.tuple([count, z.number()])).max(400),
  islands: z
    .array(
      z.object({
        evaluations: count,
        given: count.default(0),
        hits: count.optional(),
        best: z.number().nullable(),
        ended: z.string().nullable(),
      }),
    )
    .min(1),
  exhausted: z.boolean(),
})

const finalLine = z.looseObject({
  kind: z.literal('final'),
  schema: z.literal('tessellary.search/1'),
  scoringHash: z.string(),
  progress,
  top: z.array(listed).max(500),
  null: z.looseObject({}).nullable(),
})

/** A candidate as the last line of a result lists it. */
export interface ListedFind {
  readonly polytopeKey: string
  readonly classKey: string
  readonly score: unknown
  readonly heights: readonly number[]
}

/** What the lines of a headless search say, before any candidate has been checked. */
export interface SearchResult {
  readonly spec: SearchSpec
  /** Line numbers, from 1. */
  readonly lines: { readonly start: number; readonly final: number }
  readonly progress: z.infer<typeof progress>
  readonly top: readonly ListedFind[]
  /** As the file reports it. */
  readonly null: unknown
}

/**
 * The `start` and `final` lines of a headless search; others are passed over.
 * @throws InputError result.* with the line as its path, and those of the specification
 */
export function readSearchResult(text: string): SearchResult {
  let start: { readonly line: number; readonly value: z.infer<typeof startLine> } | undefined
  let final: { readonly line: number; readonly value: z.infer<typeof finalLine> } | undefined
  for (const [n, row] of text.split(/\r?\n/).entries()) {
    if (row.trim() === '') continue
    const line = n + 1
    const value = jsonOf(row, line)
    const kind = typeof value === 'object' && value !== null && 'kind' in value ? value.kind : undefined
    if (kind === 'start') start = { line, value: shaped(startLine, value, line) }
    if (kind === 'final') final = { line, value: shaped(finalLine, value, line) }
  }
  if (start === undefined || final === undefined) {
    throw new InputError(
      'result.incomplete',
      `The text holds no line of kind "${start === undefined ? 'start' : 'final'}": give the lines that the headless search printed, at least its first and its last.`,
      'text',
    )
  }
  const at = `line ${start.line}`
  if (start.value.engineVersion !== engineVersion) {
    throw new InputError(
      'result.other-engine',
      `Line ${start.line}: the search ran with engine ${start.value.engineVersion}; this is ${engineVersion}, under which its scores may differ. Run it again.`,
      at,
      start.value.engineVersion,
    )
  }
  if (start.value.spec === undefined) {
    throw new InputError('result.no-specification', `Line ${start.line} holds no specification ("spec").`, at)
  }
  const spec = searchSpec(start.value.spec)
  const hash = scoringHash(ruleOfInput(spec.ruleText), engineVersion)
  for (const { line, value } of [start, final]) {
    if (value.scoringHash === hash) continue
    throw new InputError(
      'result.other-rule',
      `Line ${line}: the scoring hash is ${value.scoringHash}; the rule of the specification has ${hash}.`,
      `line ${line}`,
      value.scoringHash,
    )
  }
  const { progress: reported, top } = final.value
  requireConsistent(spec, reported, top.length, final.line)
  return {
    spec,
    lines: { start: start.line, final: final.line },
    progress: reported,
    top,
    null: final.value.null,
  }
}

/** What can be said of the counts without running the search again. */
function requireConsistent(
  spec: SearchSpec,
  { evaluations, feasible, infeasible, undefined: without, budget, islands }: z.infer<typeof progress>,
  listedCount: number,
  line: number,
): void {
  const allowed = spec.extensions.reduce((sum, more) => sum + more, spec.settings.budget)
  const onIslands = islands.reduce((sum, island) => sum + island.evaluations, 0)
  const faults: [boolean, string, number, number][] = [
    [evaluations > allowed || budget > allowed, 'evaluations beyond the budget', evaluations, allowed],
    [
      feasible + infeasible + without !== evaluations,
      'outcomes counted',
      feasible + infeasible + without,
      evaluations,
    ],
    [islands.length !== spec.settings.islands, 'islands', islands.length, spec.settings.islands],
    [onIslands !== evaluations, 'evaluations of the islands together', onIslands, evaluations],
    [listedCount > spec.settings.keep, 'candidates listed', listedCount, spec.settings.keep],
  ]
  for (const [isWrong, what, found, expected] of faults) {
    if (!isWrong) continue
    throw new InputError(
      'result.counts',
      `Line ${line}: ${what}: found ${found}, expected ${expected}.`,
      `line ${line}`,
      found,
    )
  }
}

/** A listed candidate whose geometry and score have been found again. */
export interface CheckedFind {
  readonly polytopeKey: string
  readonly classKey: string
  readonly outcome: Outcome
  readonly heights: readonly number[]
}

/**
 * Places one listed candidate and scores it anew.
 * @throws InputError result.* naming the line, what was found and what was expected
 */
export function checkedFind(
  { polytopeKey, classKey, score, heights }: ListedFind,
  place: { readonly line: number; readonly rank: number },
  { source, rule }: { readonly source: PolytopeSource; readonly rule: CheckedRule },
): CheckedFind {
  const refuse = (code: string, message: string, found: unknown): InputError =>
    new InputError(
      code,
      `Line ${place.line}, candidate ${place.rank} of "top": ${message}`,
      `line ${place.line}: top[${place.rank - 1}]`,
      found,
    )
  const index = source.keys.indexOf(polytopeKey)
  if (index < 0) {
    throw refuse(
      'result.other-polytope',
      `its polytope ${polytopeKey} is not in the scope of the specification.`,
      polytopeKey,
    )
  }
  const form = source.at(index)
  const { polytope } = form
  if (heights.length !== polytope.pointCount) {
    throw refuse(
      'result.heights',
      `found ${heights.length} heights, expected ${polytope.pointCount}, one per point of its polytope.`,
      heights.length,
    )
  }
  const given = classFromHeights(polytope, heights)
  if (!given.fine) {
    throw refuse('result.heights', `its heights are not fine: ${given.unused.length} points go unused.`, [
      ...given.unused,
    ])
  }
  const canonical = canonicalClass(form, given.class)
  if (canonical.key !== classKey) {
    throw refuse(
      'result.other-key',
      `found the key ${classKey}, expected ${canonical.key} from its heights.`,
      classKey,
    )
  }
  const outcome = evaluateRule(rule, buildCandidate(form, canonical.class, classKey))
  const expected = JSON.stringify(sorted(scoreEntry(outcome, rule)))
  const found = JSON.stringify(sorted(score as ScoreEntry))
  if (found !== expected) {
    throw refuse('result.other-score', `found the score ${found}, expected ${expected}.`, score)
  }
  const carried = transportHeights(Float64Array.from(heights), canonical.relabelling)
  return { polytopeKey, classKey, outcome, heights: [...facetGenericHeights(polytope, carried)] }
}

/** With the names of every object in order, so that texts can be compared. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted)
  if (typeof value !== 'object' || value === null) return value
  return Object.fromEntries(
    Object.entries(value)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, inner]) => [name, sorted(inner)]),
  )
}

function jsonOf(row: string, line: number): unknown {
  try {
    return JSON.parse(row.replace(/^\uFEFF/, '')) as unknown
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    throw new InputError('result.not-json', `Line ${line} is no JSON: ${reason}`, `line ${line}`)
  }
}

function shaped<T>(schema: z.ZodType<T>, value: unknown, line: number): T {
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  const [issue] = parsed.error.issues
  const path = issue.path.map(String).join('.')
  throw new InputError(
    'result.shape',
    `Line ${line}, ${path || 'the whole'}: ${issue.message}`,
    `line ${line}: ${path}`,
  )
}
