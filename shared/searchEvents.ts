import { z } from 'zod'

/** What can happen to a search, with how the page words it. */
export const searchEventKinds = {
  queued: 'Queued',
  started: 'Started',
  'taken-over': 'Taken over: the process that ran it had ended',
  paused: 'Paused',
  resumed: 'Resumed',
  extended: 'Extended',
  retried: 'Segment run again after its worker was lost',
  cancelled: 'Cancelled',
  failed: 'Failed',
  finished: 'Finished',
  imported: 'Imported result',
} as const
export type SearchEventKind = keyof typeof searchEventKinds

const kinds = Object.keys(searchEventKinds) as [SearchEventKind, ...SearchEventKind[]]

export const searchEventSchema = z.object({
  kind: z.enum(kinds),
  at: z.string(),
  /** Null: the server by itself. */
  by: z.string().nullable(),
  /** Distinct evaluations committed by then; null where that was not written down. */
  evaluations: z.number().int().nullable(),
  note: z.string().nullable(),
})
export type SearchEventView = z.infer<typeof searchEventSchema>
