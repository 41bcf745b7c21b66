import { STAGES } from '../../observables/observable.ts'
import type { MethodName } from '../methods.ts'
import type { SearchProblem } from '../problem.ts'

/** Methods that draw through `promisingStart` and `promisingStep`. */
const choosing: readonly MethodName[] = ['auto', 'annealing', 'tempering', 'genetic']

/**
 * Whether a run keeps a surrogate: it is asked for; the method leaves it something to choose; and the rule needs at
 * least a reference point. An evaluation that ends with the topology costs no more than the features do.
 */
export function helpsWith({ settings, rule, method }: SearchProblem): boolean {
  return (
    settings.surrogate && choosing.includes(method) && STAGES.indexOf(rule.stage) >= STAGES.indexOf('cone')
  )
}
