import type { SearchDetail } from '../../../shared/searches.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'

/** What a search's surrogate is worth, in a sentence or two. */
export function SurrogateFacts({ search }: { search: Pick<SearchDetail, 'surrogate' | 'progress'> }) {
  const { surrogate } = search.progress
  if (!search.surrogate) return <p className="prose-line">None: proposals are evaluated as they come.</p>
  if (!surrogate) {
    return (
      <p className="prose-line">
        {search.progress.evaluations === 0
          ? 'Begins to learn with the first evaluations.'
          : 'Has no say here: the method leaves nothing to choose, or the rule needs no reference point.'}
      </p>
    )
  }
  const { skill, predictions, aside, offered, chosen } = surrogate
  return (
    <p className="prose-line">
      {skill === null
        ? 'Too few predictions to state its skill.'
        : `Skill ${formatNumber(skill, 2)}, the rank correlation of the last ${counted(predictions, 'prediction', 'predictions')} with what the rule then said.`}{' '}
      {chosen === 0
        ? 'It has chosen nothing yet.'
        : `Chose ${formatNumber(chosen)} of ${formatNumber(offered)} proposals.`}{' '}
      {aside && 'It steps aside until its skill is 0.2.'}
    </p>
  )
}
