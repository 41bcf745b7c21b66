import { useConnectionLost } from '../../api/connection.ts'
import { type StreamState } from '../../api/eventStream.ts'
import { useDelayed } from '../../lib/useDelayed.ts'

/** A connection that is back within this time is not worth a word. */
const quietMilliseconds = 600

/** Says that the server is out of reach, for as long as it is. It lies over the page, so that nothing moves. */
export function ConnectionLine({ stream }: { stream: StreamState | null }) {
  const lost = useConnectionLost()
  const lostForLong = useDelayed(lost, quietMilliseconds)
  const words =
    lost && lostForLong
      ? 'No connection to the server; retrying. What you have typed is kept.'
      : stream === 'closed'
        ? 'Live updates have ended; reload the page to see what is new.'
        : null
  return (
    <div role="status" className="pointer-events-none fixed inset-x-0 bottom-0 z-40 flex justify-center">
      {words && (
        <p className="flex items-center gap-2 rounded-t border border-b-0 border-edge bg-sheet px-3 py-1.5 text-ink shadow-lifted">
          <span aria-hidden className="size-2 animate-pulse rounded-full bg-rejected" />
          {words}
        </p>
      )}
    </div>
  )
}
