import { evaluateInput, type Evaluation } from '../evaluation.ts'
import { failureOf, type Failure } from './failure.ts'

/** What stands in the place of an input that could not be evaluated. */
export interface EvaluationFailure {
  readonly error: Pick<Failure, 'code' | 'message' | 'path'>
}

/** What the command prints, and how it ends. */
export interface EvaluateReport {
  /** Of the shape of the input: one evaluation, or a list. Absent when a single input failed. */
  readonly output?: Evaluation | (Evaluation | EvaluationFailure)[]
  readonly failures: readonly Failure[]
  readonly status: 0 | 1 | 2
}

/** Evaluates one input or a list of them; a bad element of a list does not spoil the others. */
export function evaluateAll(input: unknown): EvaluateReport {
  const failures: Failure[] = []
  const evaluated = (element: unknown, path: string): Evaluation | EvaluationFailure => {
    try {
      return evaluateInput(element)
    } catch (error) {
      const failure = failureOf(error, path)
      failures.push(failure)
      return { error: { code: failure.code, message: failure.message, path: failure.path } }
    }
  }
  if (Array.isArray(input)) {
    const output = input.map((element, n) => evaluated(element, `[${n}]`))
    return { output, failures, status: statusOf(failures) }
  }
  const output = evaluated(input, '')
  return { ...('error' in output ? {} : { output }), failures, status: statusOf(failures) }
}

function statusOf(failures: readonly Failure[]): 0 | 1 | 2 {
  if (failures.length === 0) return 0
  return failures.some(({ status }) => status === 1) ? 1 : 2
}
