import { STAGES } from '../../observables/observable.ts'
import type { SearchProblem } from '../problem.ts'

/**
 * Whether a run keeps a surrogate: it is asked for, and the rule needs at least a reference point. An evaluation
 * that ends with the topology costs no more than the features do.
 */
export function helpsWith({ settings, rule }: Pick<SearchProblem, 'settings' | 'rule'>): boolean {
  return settings.surrogate && STAGES.indexOf(rule.stage) >= STAGES.indexOf('cone')
}
