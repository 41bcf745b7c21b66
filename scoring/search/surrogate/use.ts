import { STAGES } from '../../observables/observable.ts'
import type { Method } from '../method.ts'
import { methods } from '../methods.ts'
import type { SearchProblem } from '../problem.ts'

/**
 * Whether a run keeps a surrogate: it is asked for; the method is guided, neither a sample nor exhaustive; and the
 * rule needs at least a reference point. An evaluation that ends with the topology costs no more than the features do.
 */
export function helpsWith({ settings, rule, method }: SearchProblem): boolean {
  const { law, repeats }: Method = methods[method]
  const isGuided = law === undefined && repeats !== false
  return settings.surrogate && isGuided && STAGES.indexOf(rule.stage) >= STAGES.indexOf('cone')
}
