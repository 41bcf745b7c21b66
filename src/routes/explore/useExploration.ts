import { useCallback, useEffect } from 'react'
import { keepPreviousData, useQuery, useQueryClient } from '@tanstack/react-query'
import { type Exploration, type ExplorationRequest } from '../../../shared/explorations.ts'
import {
  explorationKey,
  explorationQuery,
  explorationRowsQuery,
  newerExploration,
  startExploration,
  stopExploration,
  type ExploredRow,
} from '../../api/explorations.ts'
import { useDelayed } from '../../lib/useDelayed.ts'

export interface ExplorationState {
  /** Latest state known, of this request or, while `outdated`, of the last one. */
  readonly exploration: Exploration | null
  readonly rows: readonly ExploredRow[]
  readonly outdated: boolean
  readonly error: unknown
  /** Asks once more: what was computed is found again, the rest goes on. */
  readonly again: () => void
  readonly stop: () => void
}

const pause = 400

/**
 * Asks for an exploration when its request has stood still for a moment, follows its states as the event stream
 * brings them, and fetches rows as they come in. One that nobody looks at any more is stopped.
 */
export function useExploration(
  campaign: string,
  request: ExplorationRequest,
  sound: boolean,
): ExplorationState {
  const client = useQueryClient()
  const wanted = JSON.stringify(request)
  const settled = useDelayed(wanted, pause)
  const ready = sound && settled === wanted

  const start = useQuery({
    queryKey: ['exploration-start', campaign, settled],
    queryFn: async ({ signal }) => {
      const first = await startExploration(campaign, JSON.parse(settled) as ExplorationRequest, signal)
      client.setQueryData<Exploration>(explorationKey(first.id), (known) => newerExploration(known, first))
      return first.id
    },
    enabled: ready,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
    gcTime: 0,
    retry: false,
  })
  const id = start.data ?? null
  const state = useQuery(explorationQuery(campaign, id))
  const rows = useQuery(explorationRowsQuery(client, campaign, id))

  const exploration = state.data ?? null
  const missing = exploration !== null && (rows.data?.length ?? 0) < exploration.evaluated
  const { refetch: fetchRows, isFetching, isError } = rows
  useEffect(() => {
    if (missing && !isFetching && !isError) void fetchRows()
  }, [missing, isFetching, isError, fetchRows])

  useEffect(() => {
    if (id === null) return
    return () => {
      const last = client.getQueryData<Exploration>(explorationKey(id))
      // Already gone is as good as stopped.
      if (last?.state === 'running') stopExploration(campaign, id).catch(() => undefined)
    }
  }, [client, campaign, id])

  const { refetch } = start
  const again = useCallback(() => void refetch(), [refetch])
  const stop = useCallback(() => {
    if (id !== null) void stopExploration(campaign, id).catch(() => undefined)
  }, [campaign, id])
  return {
    exploration,
    rows: rows.data ?? [],
    outdated: exploration !== null && (start.isPlaceholderData || settled !== wanted || !sound),
    error: ready ? (start.error ?? state.error ?? rows.error) : null,
    again,
    stop,
  }
}
