import { useQuery } from '@tanstack/react-query'
import { type SearchCostRequest } from '../../../../shared/searchRunning.ts'
import { searchCostQuery } from '../../../api/searches.ts'
import { explain } from '../../../api/request.ts'
import { counted, formatDuration, formatNumber } from '../../../lib/numbers.ts'
import { useDelayed } from '../../../lib/useDelayed.ts'

/** What a search will cost, from a few candidates of its scope that the server times. */
export function CostLine({
  campaign,
  asked,
  budget,
  islands,
}: {
  campaign: string
  /** Null while the composer is not complete. */
  asked: SearchCostRequest | null
  budget: number
  islands: number
}) {
  const settled = useDelayed(JSON.stringify(asked), 500)
  const request = JSON.parse(settled) as SearchCostRequest | null
  const cost = useQuery({ ...searchCostQuery(campaign, request), enabled: request !== null })
  if (request === null || !(budget > 0) || !(islands > 0)) {
    return <p className="text-soft">What it will cost is shown when scope and budget are chosen.</p>
  }
  if (cost.isError) {
    return (
      <p role="alert" className="prose-line text-rejected">
        {explain(cost.error)}
      </p>
    )
  }
  if (!cost.data) {
    return (
      <p role="status" className="text-soft">
        Timing a few candidates of this scope…
      </p>
    )
  }
  const { millisecondsEach, timed, threads, running, nullLeft } = cost.data
  const used = Math.min(threads, islands)
  const seconds = (count: number, on: number) => (count * millisecondsEach) / 1000 / on
  return (
    <div role="status" className="prose-line">
      <p>
        <strong className="font-medium">
          About {formatDuration(seconds(budget, used))} on {counted(used, 'thread')}
        </strong>
        {running > 0 &&
          `, longer while ${running === 1 ? 'another search shares' : `${formatNumber(running)} other searches share`} them`}
        .
      </p>
      <p className="text-xs text-soft">
        {formatNumber(budget)} evaluations at {formatNumber(millisecondsEach, 3)} ms, the mean of{' '}
        {counted(timed, 'candidate')} timed on this server, as busy as it is now.
        {nullLeft > 0 &&
          ` The null sample it is compared with takes another ${formatDuration(seconds(nullLeft, threads))} in between: ${formatNumber(nullLeft)} candidates, once for this scope and rule.`}
      </p>
    </div>
  )
}
