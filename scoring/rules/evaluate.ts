import { normalisedVolumes } from '../geometry/normalisedVolume.ts'
import { reflexiveSections } from '../geometry/sections.ts'
import type { Candidate } from '../observables/candidate.ts'
import { type PolytopeView, type Stage, STAGES } from '../observables/observable.ts'
import type { CheckedRule } from './checkedRule.ts'
import { Frame, reasonText, StepLimitReached } from './frame.ts'
import { RULE_LIMITS } from './limits.ts'
import type { Cell, Infeasible, Outcome, Undefined } from './outcome.ts'
import type { CompiledRequire, CompiledValue, Program } from './program.ts'

export interface EvaluationOptions {
  /** Fill the report (default). A search that only ranks can leave it out. */
  readonly report?: boolean
  /** Steps allowed; the language's limit when left out. */
  readonly stepLimit?: number
}

const NO_REASON = 'the value is undefined'

/** Runs part of an evaluation; passing the step limit makes it undefined, with the reason. */
function guarded<T>(frame: Frame, run: () => T, onLimit: (reason: string) => T): T {
  try {
    return run()
  } catch (error) {
    if (!(error instanceof StepLimitReached)) throw error
    frame.reason = error.reason
    return onLimit(reasonText(error.reason))
  }
}

function whyUndefined(frame: Frame): string {
  return frame.reason ? reasonText(frame.reason) : NO_REASON
}

/** The verdict of one stage's requirements: null when all hold. */
function judgeStage(
  frame: Frame,
  stage: Stage,
  requires: readonly CompiledRequire[],
): Infeasible | Undefined | null {
  return guarded<Infeasible | Undefined | null>(
    frame,
    () => {
      const failing: CompiledRequire[] = []
      let reason: string | undefined
      for (const require of requires) {
        const holds = require.holds(frame)
        if (holds !== holds) reason ??= whyUndefined(frame)
        else if (holds === 0) failing.push(require)
      }
      if (reason !== undefined) return { kind: 'undefined', reason, stage }
      if (failing.length === 0) return null
      const failed = failing.map((require) => ({ label: require.label, shortfall: require.shortfall(frame) }))
      const shortfall = failed.reduce((total, entry) => total + entry.shortfall, 0)
      return { kind: 'infeasible', stage, shortfall, failed }
    },
    (reason) => ({ kind: 'undefined', reason, stage }),
  )
}

/** The requirements of each stage, in the order of stages; stages without any are left out. */
const byStage = new WeakMap<
  Program,
  readonly { readonly stage: Stage; readonly requires: readonly CompiledRequire[] }[]
>()

function stagesOf(program: Program) {
  let stages = byStage.get(program)
  if (!stages) {
    stages = STAGES.map((stage) => ({
      stage,
      requires: program.requires.filter((require) => require.stage === stage),
    })).filter(({ requires }) => requires.length > 0)
    byStage.set(program, stages)
  }
  return stages
}

function cellOf(frame: Frame, { type, value }: CompiledValue): Cell {
  return guarded<Cell>(
    frame,
    () => {
      const result = value(frame)
      if (result !== result) return { value: null, reason: whyUndefined(frame) }
      return { value: type === 'truth' ? result === 1 : result + 0 }
    },
    (reason) => ({ value: null, reason }),
  )
}

/**
 * What a rule says about a candidate. Stage by stage: at the first stage with a failing requirement all
 * requirements of that stage give their shortfalls and the evaluation stops; an undefined requirement makes
 * the candidate undefined. Then the score, the hit and the report. Only the stages that are reached and
 * mentioned are computed. Deterministic, and free of side effects but for what the candidate keeps.
 */
export function evaluateRule(
  rule: CheckedRule,
  candidate: Candidate,
  options: EvaluationOptions = {},
): Outcome {
  const { program } = rule
  const frame = new Frame(candidate, program.layout, options.stepLimit ?? RULE_LIMITS.steps)
  return runProgram(program, frame, options)
}

/** The same in a frame that is ready. */
export function runProgram(
  program: Program,
  frame: Frame,
  options: Pick<EvaluationOptions, 'report'> = {},
): Outcome {
  for (const { stage, requires } of stagesOf(program)) {
    const verdict = judgeStage(frame, stage, requires)
    if (verdict) return verdict
  }
  const score = cellOf(frame, program.score)
  if (score.value === null) return { kind: 'undefined', reason: score.reason, stage: program.score.stage }
  const hit = program.hit && cellOf(frame, program.hit)
  const report: Record<string, Cell> = Object.create(null) as Record<string, Cell>
  if (options.report !== false)
    for (const column of program.columns) report[column.name] = cellOf(frame, column)
  return {
    kind: 'feasible',
    score: Number(score.value),
    hit: hit?.value === null || hit === null ? null : hit.value === true,
    ...(hit?.value === null ? { hitUndefined: hit.reason } : {}),
    report,
  }
}

/** What one requirement says about a candidate, for pass rates. `holds` is null when it is undefined. */
export interface RequireResult {
  readonly label: string
  readonly stage: Stage
  readonly holds: boolean | null
  readonly reason?: string
}

/** Looks at every requirement, whatever the others say. Computes all stages that requirements mention. */
export function evaluateRequires(
  rule: CheckedRule,
  candidate: Candidate,
  options: Pick<EvaluationOptions, 'stepLimit'> = {},
): RequireResult[] {
  const frame = new Frame(candidate, rule.program.layout, options.stepLimit ?? RULE_LIMITS.steps)
  return rule.program.requires.map(({ label, stage, holds }) => {
    const cell = cellOf(frame, { type: 'truth', stage, value: holds })
    return cell.value === null
      ? { label, stage, holds: null, reason: cell.reason }
      : { label, stage, holds: cell.value === true }
  })
}

const unreachable = (): never => {
  throw new Error('an observable of the polytope stage asked for a later stage')
}

/**
 * The requirements that the polytope alone decides, so that a search can turn a polytope away before it
 * triangulates anything. Null when they all hold; else what `evaluateRule` would say of every candidate of
 * this polytope.
 */
export function evaluatePolytopeStage(
  rule: CheckedRule,
  view: PolytopeView,
  options: Pick<EvaluationOptions, 'stepLimit'> = {},
): Infeasible | Undefined | null {
  const [first] = stagesOf(rule.program)
  if (first?.stage !== 'polytope') return null
  const candidate: Candidate = {
    polytope: view.polytope,
    symmetryOrder: view.symmetryOrder,
    get class() {
      return unreachable()
    },
    classKey: '',
    sections: () => reflexiveSections(view.polytope),
    normalisedVolumes: () => normalisedVolumes(view.polytope),
    numbers: unreachable,
    divisorTopology: unreachable,
    curves: unreachable,
    fibrations: unreachable,
    reference: unreachable,
    volumes: unreachable,
    topEigenvalue: unreachable,
    divisorSpectrum: unreachable,
    basisSpectrum: unreachable,
    axions: unreachable,
  }
  const frame = new Frame(candidate, rule.program.layout, options.stepLimit ?? RULE_LIMITS.steps)
  return judgeStage(frame, 'polytope', first.requires)
}
