import { Check, Clock, Pause, Play, Slash, TriangleAlert } from 'lucide-react'
import { type SearchState } from '../../../shared/searches.ts'

const looks = {
  queued: { Shape: Clock, colour: 'text-soft' },
  running: { Shape: Play, colour: 'text-action' },
  paused: { Shape: Pause, colour: 'text-soft' },
  finished: { Shape: Check, colour: 'text-ink' },
  cancelled: { Shape: Slash, colour: 'text-soft' },
  failed: { Shape: TriangleAlert, colour: 'text-rejected' },
} as const

export function SearchStateMark({ state }: { state: SearchState }) {
  const { Shape, colour } = looks[state]
  return (
    <span className={`inline-flex items-center gap-1 ${colour}`}>
      <Shape size={14} aria-hidden />
      {state}
    </span>
  )
}
