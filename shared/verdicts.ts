import { z } from 'zod'
import { shortlistLimit } from './assemblies.ts'
import { candidateKeySchema } from './keys.ts'

export const verdictValues = ['verified', 'rejected', 'undecided'] as const
export type VerdictValue = (typeof verdictValues)[number]

/** A person whose "verified" a verdict rests on. */
export const readerSchema = z.object({ id: z.string(), name: z.string() })
export type Reader = z.infer<typeof readerSchema>

/** A person's word on a candidate for a target in a campaign. History is kept; the latest counts. */
export const verdictSchema = z.object({
  id: z.string(),
  value: z.enum(verdictValues),
  reason: z.string(),
  /** Verified without a passing certificate for this scoring: shown as "verified by override". */
  override: z.boolean(),
  /** The passing certificate that "verified" rests on. */
  certificateId: z.string().nullable(),
  /** Whose word it is. */
  author: z.string(),
  /**
   * Whose "verified" it rests on, first to last, where the campaign asked for two people: with one it does not count as
   * verified yet. null: two people were not asked for, or it is no "verified".
   */
  readers: z.array(readerSchema).nullable(),
  /** Who took a later verdict back, so that this one stands again; null for one that was given. */
  undoneBy: z.string().nullable(),
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

/** What counts: "verified" by the first of two readers is not decided yet. */
export function standingOf(verdict: Pick<Verdict, 'value' | 'readers'> | null): VerdictValue {
  if (!verdict) return 'undecided'
  return byOneReader(verdict) ? 'undecided' : verdict.value
}

/** Verified by the first of two readers. */
export const byOneReader = (verdict: Pick<Verdict, 'value' | 'readers'> | null): boolean =>
  verdict?.value === 'verified' && verdict.readers?.length === 1

/** How a verdict reads: one without a certificate says so, and so does one that waits for a second reader. */
export function verdictWord(verdict: Pick<Verdict, 'value' | 'override' | 'readers'> | null): string {
  if (!verdict) return 'undecided'
  if (verdict.value !== 'verified') return verdict.value
  return [
    'verified',
    ...(byOneReader(verdict) ? ['by one reader'] : []),
    ...(verdict.override ? ['by override'] : []),
  ].join(' ')
}

/** POST /api/campaigns/:campaign/verdicts: one word on many candidates, each decided by itself. */
export const giveVerdictsSchema = giveVerdictSchema.extend({
  candidateKeys: z.array(candidateKeySchema).min(1).max(shortlistLimit),
})
export type GiveVerdicts = z.input<typeof giveVerdictsSchema>

/** POST /api/campaigns/:campaign/verdicts/undo: takes own verdicts back, as long as they stand. */
export const undoVerdictsSchema = z.object({ ids: z.array(z.string()).min(1).max(shortlistLimit) })

/** What was done, and which candidates were refused and why. */
export const verdictsGivenSchema = z.object({
  given: z.array(z.object({ candidateKey: candidateKeySchema, verdict: verdictSchema })),
  refused: z.array(z.object({ candidateKey: z.string(), code: z.string(), message: z.string() })),
})
export type VerdictsGiven = z.infer<typeof verdictsGivenSchema>
