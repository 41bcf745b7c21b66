import { queryOptions, useQuery } from '@tanstack/react-query'
import { comparisonSchema, type Comparison } from '../../shared/comparisons.ts'
import { type StreamEvent } from '../../shared/events.ts'
import { request } from './request.ts'

/** While a search runs, what the lists have in common is asked for again after so many milliseconds. */
const whileRunning = 5_000

export const comparisonQuery = (campaign: string, ids: readonly string[]) =>
  queryOptions({
    queryKey: ['comparison', campaign, ids.join(',')] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/comparisons?with=${ids.map(encodeURIComponent).join(',')}`, {
        schema: comparisonSchema,
        signal,
      }),
    refetchInterval: ({ state }) =>
      state.data?.searches.some((search) => search.state === 'running') ? whileRunning : false,
  })

export const useComparison = (campaign: string, ids: readonly string[]) =>
  useQuery(comparisonQuery(campaign, ids))

/** The comparison after a report of one of its searches, or of a null sample. */
export function withReport(
  comparison: Comparison,
  event: StreamEvent & { kind: 'search' | 'null' },
): Comparison {
  const id = event.kind === 'search' ? event.id : event.searchId
  if (!comparison.searches.some((search) => search.id === id)) return comparison
  const searches = comparison.searches.map((search) => {
    if (search.id !== id) return search
    if (event.kind === 'null') return { ...search, null: event.summary }
    const { state, progress } = event
    return { ...search, state, progress, evaluations: progress.evaluations, best: progress.best }
  })
  return { ...comparison, searches }
}
