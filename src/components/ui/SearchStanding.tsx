import { type SearchStanding as Standing } from '../../../shared/searches.ts'
import { counted } from '../../lib/numbers.ts'

/** Why a search that is under way moves as it does: threads at work, its place in line, or what holds it up. */
export function SearchStanding({ standing }: { standing: Standing | null | undefined }) {
  if (!standing) return null
  switch (standing.kind) {
    case 'working':
      return <span className="text-soft">{counted(standing.threads, 'thread')} at work</span>
    case 'waiting':
      return (
        <span className="text-soft">
          {standing.place === 1 ? 'next' : `number ${standing.place}`} in line for{' '}
          {standing.threads === 1 ? 'the worker thread' : `one of ${standing.threads} worker threads`}
        </span>
      )
    case 'held':
      return <span className="text-rejected">held up: {standing.message}</span>
  }
}
