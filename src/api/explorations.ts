import { queryOptions, type QueryClient } from '@tanstack/react-query'
import {
  explorationRowsSchema,
  explorationSchema,
  type Exploration,
  type ExplorationRequest,
  type ExplorationRow,
  type ExplorationRows,
} from '../../shared/explorations.ts'
import { apiUrl, request } from './request.ts'

/** Starts an exploration, or finds it computed already; further states come as events. */
export function startExploration(
  campaign: string,
  body: ExplorationRequest,
  signal?: AbortSignal,
): Promise<Exploration> {
  return request(`/campaigns/${campaign}/explorations`, {
    method: 'POST',
    body,
    schema: explorationSchema,
    signal,
  })
}

export const explorationKey = (id: string) => ['exploration', id] as const

/** The latest state of an exploration: as the event stream brings it, asked for after the stream was down. */
export const explorationQuery = (campaign: string, id: string | null) =>
  queryOptions({
    queryKey: explorationKey(id ?? ''),
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/explorations/${id}`, { schema: explorationSchema, signal }),
    enabled: id !== null,
    staleTime: Infinity,
    retry: false,
    // Events that came before the stream was open were not heard.
    refetchInterval: ({ state }) => (state.data?.state === 'running' ? 4_000 : false),
  })

/** States of one exploration only grow; an older state that arrives late is dropped. */
export function newerExploration(known: Exploration | undefined, next: Exploration): Exploration {
  if (!known || known.id !== next.id) return next
  return known.state !== 'running' || known.evaluated > next.evaluated ? known : next
}

type Polytope = ExplorationRows['polytopes'][number]

/** A row with the polytope it stands on. */
export interface ExploredRow extends Omit<ExplorationRow, 'polytope'> {
  readonly polytope: Polytope
}

export const explorationRowsKey = (id: string) => ['exploration-rows', id] as const

/** All complete rows known so far; asked again, only those that are missing travel. */
export const explorationRowsQuery = (client: QueryClient, campaign: string, id: string | null) =>
  queryOptions<readonly ExploredRow[]>({
    queryKey: explorationRowsKey(id ?? ''),
    queryFn: async ({ signal }) => {
      const known = client.getQueryData<readonly ExploredRow[]>(explorationRowsKey(id ?? '')) ?? []
      const { from, polytopes, rows } = await request(`/campaigns/${campaign}/explorations/${id}/rows`, {
        query: { from: known.length },
        schema: explorationRowsSchema,
        signal,
      })
      return [...known.slice(0, from), ...rows.map((row) => ({ ...row, polytope: polytopes[row.polytope]! }))]
    },
    enabled: id !== null,
    staleTime: Infinity,
    retry: false,
  })

/** Ends an exploration; what was computed stays. */
export function stopExploration(campaign: string, id: string): Promise<void> {
  return request(`/campaigns/${campaign}/explorations/${id}`, { method: 'DELETE' })
}

/** After this the pages and pictures of the candidates can be asked for. */
export const openedCandidatesQuery = (campaign: string, id: string, keys: readonly string[]) =>
  queryOptions({
    queryKey: ['exploration-opened', id, [...keys].sort().join(',')] as const,
    queryFn: async ({ signal }) => {
      await request(`/campaigns/${campaign}/explorations/${id}/candidates`, {
        method: 'POST',
        body: { keys },
        signal,
      })
      return true
    },
    enabled: keys.length > 0,
    staleTime: Infinity,
    retry: false,
  })

export const explorationTableUrl = (campaign: string, id: string, format: 'csv' | 'json') =>
  apiUrl(`/campaigns/${campaign}/explorations/${id}/export.${format}`)
