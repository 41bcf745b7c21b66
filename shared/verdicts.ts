import { z } from 'zod'

export const verdictValues = ['verified', 'rejected', 'undecided'] as const
export type VerdictValue = (typeof verdictValues)[number]

/** A person's word on a candidate for a target in a campaign. History is kept; the latest counts. */
export const verdictSchema = z.object({
  id: z.string(),
  value: z.enum(verdictValues),
  reason: z.string(),
  /** Verified without a passing certificate for this scoring: shown as "verified by override". */
  override: z.boolean(),
  /** The passing certificate that "verified" rests on. */
  certificateId: z.string().nullable(),
  author: z.string(),
  createdAt: z.string(),
  targetId: z.string(),
  targetName: z.string(),
  targetVersion: z.number().int(),
})
export type Verdict = z.infer<typeof verdictSchema>

/**
 * POST /api/campaigns/:campaign/candidates/:key/verdicts. "verified" without a passing certificate of this scoring
 * needs a reason.
 */
export const giveVerdictSchema = z.object({
  targetVersionId: z.string(),
  value: z.enum(verdictValues),
  reason: z.string().trim().max(2000).default(''),
})
