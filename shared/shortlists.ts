import { z } from 'zod'
import { certificateMarkSchema } from './certificates.ts'
import { scoredRowSchema } from './outcomes.ts'
import { verdictSchema } from './verdicts.ts'

/** POST /api/campaigns/:campaign/shortlists: the best distinct candidates of searches of one target version. */
export const createShortlistSchema = z.object({
  name: z.string().trim().min(1).max(80),
  searchIds: z.array(z.string()).min(1).max(20),
  size: z.number().int().min(1).max(500).default(50),
})

export const shortlistSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  targetId: z.string(),
  targetName: z.string(),
  targetVersion: z.number().int(),
  targetVersionId: z.string(),
  size: z.number().int(),
  undecided: z.number().int(),
  verified: z.number().int(),
  rejected: z.number().int(),
  createdAt: z.string(),
  author: z.string(),
})
export type ShortlistSummary = z.infer<typeof shortlistSummarySchema>

export const shortlistRowSchema = scoredRowSchema.extend({
  rank: z.number().int(),
  /** Null for an imported candidate. */
  searchId: z.string().nullable(),
  polytopeName: z.string(),
  verdict: verdictSchema.nullable(),
  /** For the scoring of the target version under the present engine. */
  certificate: certificateMarkSchema,
})
export type ShortlistRow = z.infer<typeof shortlistRowSchema>

export const shortlistDetailSchema = shortlistSummarySchema.extend({
  rule: z.string(),
  scoringHash: z.string(),
  engineVersion: z.string(),
  /** Report columns in the rule's order. */
  columns: z.array(z.string()),
  searches: z.array(z.object({ id: z.string(), name: z.string(), seed: z.number().int() })),
  rows: z.array(shortlistRowSchema),
})
export type ShortlistDetail = z.infer<typeof shortlistDetailSchema>
