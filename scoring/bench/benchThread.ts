import { searchSettingsSchema } from '../search/settings.ts'
import { advance, startState } from '../search/advance.ts'
import type { Evaluated } from '../search/island.ts'
import { OutcomeMemo } from '../search/memo.ts'
import { meritOf, type Merit } from '../search/merit.ts'
import type { MethodName } from '../search/methods.ts'
import type { NullLawName } from '../search/nullLaws.ts'
import type { SearchProblem } from '../search/problem.ts'
import type { RunEnd } from '../search/state.ts'
import { searchTasks, taskScope } from './searchTasks.ts'

/** A run of one method with one seed. */
export interface BenchJob {
  readonly task: string
  readonly method: MethodName
  readonly seed: number
  readonly budget: number
  /** Evaluations after which to stop; absent: the whole budget. */
  readonly evaluations?: number
  /** Random sampling: the law of its draws. */
  readonly law?: NullLawName
}

/** What a run evaluated, in order. */
export interface BenchRun {
  readonly merits: readonly Merit[]
  readonly classKeys: readonly string[]
  /** Null: the budget was not used up. */
  readonly ended: RunEnd | null
}

const opened = new Map<string, Pick<SearchProblem, 'polytopes' | 'rule'> & { memo: OutcomeMemo }>()

/** Runs a job. Scopes and outcomes are kept for the next one, which alters no result. */
export default function benchRun({
  task: name,
  method,
  seed,
  budget,
  evaluations = budget,
  law,
}: BenchJob): BenchRun {
  let scope = opened.get(name)
  if (scope === undefined) {
    const task = searchTasks.find((one) => one.name === name)
    if (task === undefined) throw new Error(`There is no task ${name}.`)
    scope = { ...taskScope(task), memo: new OutcomeMemo(50_000) }
    opened.set(name, scope)
  }
  const problem: SearchProblem = {
    polytopes: scope.polytopes,
    rule: scope.rule,
    method,
    settings: searchSettingsSchema.parse({ budget, keep: 1, sample: 0, law }),
  }
  const merits: Merit[] = []
  const classKeys: string[] = []
  const observe = ({ outcome, classKey }: Evaluated): void => {
    merits.push(meritOf(outcome))
    classKeys.push(classKey)
  }
  const { state } = advance(problem, startState(problem, seed), evaluations, { memo: scope.memo, observe })
  return { merits, classKeys, ended: state.ended }
}
