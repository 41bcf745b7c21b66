import { useEffect, useRef } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type Rescoring } from '../../../shared/rescorings.ts'
import { explain } from '../../api/request.ts'
import { rescoringsQuery, useCancelRescoring } from '../../api/rescorings.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { useBarred } from '../shell/currentCampaign.tsx'
import { Button } from '../ui/Button.tsx'
import { Progress } from '../ui/Progress.tsx'

const isOpen = ({ state }: Rescoring) => state === 'queued' || state === 'running'

/** Re-scorings that are under way, and the last of those that failed. */
export function RescoringProgress({
  campaign,
  fits = () => true,
  onFinished,
}: {
  campaign: string
  fits?: (rescoring: Rescoring) => boolean
  /** Told of a list that came of one which was open when this was first drawn. */
  onFinished?: (shortlistId: string) => void
}) {
  const query = useQuery(rescoringsQuery(campaign))
  const own = (query.data ?? []).filter(fits)
  const open = own.filter(isOpen)
  const [last] = own
  const watched = useRef(new Set<string>())
  const told = useRef(onFinished)
  useEffect(() => {
    told.current = onFinished
    for (const one of own) {
      if (isOpen(one)) watched.current.add(one.id)
      else if (watched.current.delete(one.id) && one.shortlistId !== null) told.current?.(one.shortlistId)
    }
  })
  return (
    <div aria-live="polite" className="empty:hidden">
      {open.map((one) => (
        <OpenRescoring key={one.id} campaign={campaign} rescoring={one} />
      ))}
      {open.length === 0 && last?.state === 'failed' && (
        <p role="alert" className="mb-3 border-l-2 border-rejected py-1 pl-3">
          “{last.name}” was not made: {last.failure}
        </p>
      )}
      {open.length === 0 && last?.state === 'finished' && last.broken > 0 && last.shortlistId !== null && (
        <p role="alert" className="mb-3 border-l-2 border-rejected py-1 pl-3">
          {counted(last.broken, 'candidate')} could not be scored and {last.broken === 1 ? 'is' : 'are'} not
          in{' '}
          <Link
            to={`/campaigns/${campaign}/shortlists/${last.shortlistId}`}
            className="text-action hover:underline"
          >
            {last.name}
          </Link>
          .
        </p>
      )}
    </div>
  )
}

function OpenRescoring({ campaign, rescoring }: { campaign: string; rescoring: Rescoring }) {
  const barred = useBarred('shortlists.edit')
  const cancel = useCancelRescoring(campaign)
  const { id, name, state, total, scored, broken, targetName, targetVersion } = rescoring
  return (
    <div className="mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 border-l-2 border-action py-1 pl-3">
      <span>
        Scoring “{name}” by {targetName}, version {targetVersion}
        {state === 'queued'
          ? ': waiting for its turn'
          : `: ${formatNumber(scored)} of ${counted(total, 'candidate')}`}
        {broken > 0 && <span className="text-rejected">, {broken} could not be scored</span>}
      </span>
      <span className="max-w-64 min-w-24 flex-1">
        <Progress value={scored + broken} most={total} label={`Candidates of ${name} scored`} />
      </span>
      <Button
        unavailable={barred}
        busy={cancel.isPending}
        onClick={() => cancel.mutate(id, { onError: (error) => void toast.error(explain(error)) })}
      >
        Cancel
      </Button>
    </div>
  )
}
