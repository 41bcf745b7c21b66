import { ArrowDown, ArrowUp, Equal } from 'lucide-react'
import { type ShortlistRow } from '../../../shared/shortlists.ts'

/** How a candidate moved when its list was scored anew: arrow and word. */
export function RankChange({ row }: { row: Pick<ShortlistRow, 'rank' | 'previous'> }) {
  if (row.previous === null) return <span className="text-soft">–</span>
  const gained = row.previous.rank - row.rank
  const [Shape, word] =
    gained > 0 ? [ArrowUp, `up ${gained}`] : gained < 0 ? [ArrowDown, `down ${-gained}`] : [Equal, 'same']
  return (
    <span
      title={`Rank ${row.previous.rank} before`}
      data-raw={gained}
      className={`inline-flex items-center gap-1 whitespace-nowrap ${gained === 0 ? 'text-soft' : ''}`}
    >
      <Shape size={13} strokeWidth={2.2} aria-hidden className="text-soft" />
      {word}
    </span>
  )
}
