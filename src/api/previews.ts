import { queryOptions, skipToken } from '@tanstack/react-query'
import { type z } from 'zod'
import { previewSchema, type Preview, type previewRequestSchema } from '../../shared/targets.ts'
import { request } from './request.ts'

export type PreviewRequest = z.infer<typeof previewRequestSchema>

/** Starts a preview; it replaces a running one of the same account. Further states come as events. */
export function startPreview(campaign: string, body: PreviewRequest, signal?: AbortSignal): Promise<Preview> {
  return request(`/campaigns/${campaign}/previews`, { method: 'POST', body, schema: previewSchema, signal })
}

/** Where the state of a preview stands in the cache; written by the event stream. */
export const previewKey = (id: string) => ['preview', id] as const

/** The latest known state of a preview; the event stream brings it, nothing is fetched. */
export const previewQuery = (id: string | null) =>
  queryOptions<Preview>({ queryKey: previewKey(id ?? ''), queryFn: skipToken, staleTime: Infinity })

/** Stops the account's running preview. */
export function stopPreview(campaign: string): Promise<void> {
  return request(`/campaigns/${campaign}/previews`, { method: 'DELETE' })
}
