import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'

/** A comment on a candidate in a campaign: plain text, in which `@Name` names a member. */
export const commentSchema = z.object({
  id: z.number().int(),
  authorId: z.string(),
  author: z.string(),
  /** Empty once removed. */
  text: z.string(),
  mentions: z.array(z.object({ accountId: z.string(), name: z.string() })),
  createdAt: z.string(),
  editedAt: z.string().nullable(),
  /** A removed comment leaves this line. */
  removed: z.object({ at: z.string(), by: z.string() }).nullable(),
})
export type CommentView = z.infer<typeof commentSchema>

export const commentLimit = 4_000

/**
 * POST /api/campaigns/:campaign/candidates/:key/comments and PATCH /api/campaigns/:campaign/comments/:comment. Members
 * of the campaign count as mentioned when they are in `mentions` and the text has their name after an @.
 */
export const writeCommentSchema = z.object({
  text: z.string().trim().min(1).max(commentLimit),
  mentions: z.array(z.string()).max(50).default([]),
})
export type WriteComment = z.infer<typeof writeCommentSchema>

/** GET /api/campaigns/:campaign/mentions: comments that name the reader, which they have not seen; newest first. */
export const mentionSchema = z.object({
  commentId: z.number().int(),
  candidateKey: candidateKeySchema,
  author: z.string(),
  text: z.string(),
  createdAt: z.string(),
})
export type MentionView = z.infer<typeof mentionSchema>
