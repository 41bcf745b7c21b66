import { ArrowDown, ArrowUp, Equal } from 'lucide-react'
import { type ShortlistRow } from '../../../shared/shortlists.ts'

/** How a candidate moved when its list was scored or issued anew: arrow and word. */
export function RankChange({
  row,
  entered,
}: {
  row: Pick<ShortlistRow, 'rank' | 'previous'>
  /** Of a newer issue: what was not in the one before is new. */
  entered: boolean
}) {
  if (row.previous === null) {
    return entered ? <span className="font-medium">new</span> : <span className="text-soft">–</span>
  }
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
