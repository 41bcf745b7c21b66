import { z } from 'zod'
import { recall, remember } from '../../lib/remembered.ts'

const draftSchema = z.object({
  /** The visit of a page that wrote it: two tabs never overwrite each other's. */
  visit: z.string(),
  text: z.string(),
  /** Number of the version it began from; null on a target not yet saved. */
  base: z.number().nullable(),
  at: z.string(),
})
export type Draft = z.infer<typeof draftSchema>

/** Unsaved texts of one target that this browser keeps, at most this many. */
const kept = 6
const keyOf = (place: string) => `drafts.${place}`

/** Newest first. */
export function draftsAt(place: string): Draft[] {
  try {
    return z.array(draftSchema).parse(JSON.parse(recall(keyOf(place)) ?? '[]'))
  } catch {
    return []
  }
}

/** Keeps a text as a visit's draft, in place of the one it had. */
export function keepDraft(place: string, draft: Draft): void {
  const others = draftsAt(place).filter(({ visit, text }) => visit !== draft.visit && text !== draft.text)
  remember(keyOf(place), JSON.stringify([draft, ...others].slice(0, kept)))
}

export function dropDraft(place: string, visit: string): void {
  const others = draftsAt(place).filter((draft) => draft.visit !== visit)
  remember(keyOf(place), others.length > 0 ? JSON.stringify(others) : null)
}
