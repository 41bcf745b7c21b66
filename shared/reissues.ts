import { z } from 'zod'
import { shortlistLimit } from './assemblies.ts'
import { candidateKeySchema } from './keys.ts'
import { rescoringSchema } from './rescorings.ts'

/**
 * POST /api/campaigns/:campaign/shortlists/:shortlist/reissues: a newer issue of a list, by the same version of its
 * target. The list itself stays as it was.
 */
export const reissueSchema = z.object({
  name: z.string().trim().min(1).max(80),
  how: z.discriminatedUnion('kind', [
    /** Drawn again by the same choices from its searches as they are now, and from others. */
    z.object({ kind: z.literal('drawn'), moreSearchIds: z.array(z.string()).max(19).default([]) }),
    /** Its rows without some of them. */
    z.object({ kind: z.literal('rows'), without: z.array(candidateKeySchema).min(1).max(shortlistLimit) }),
  ]),
})
export type Reissue = z.input<typeof reissueSchema>

/** Either the new list, or the request that scores what has no score yet and then makes it. */
export const reissuedSchema = z.object({
  shortlistId: z.string().nullable(),
  rescoring: rescoringSchema.nullable(),
})
export type Reissued = z.infer<typeof reissuedSchema>

/** The list before in a chain of issues, and what of it is not in this one. */
export const earlierIssueSchema = z.object({
  id: z.string(),
  name: z.string(),
  issue: z.number().int(),
  size: z.number().int(),
  left: z.array(
    z.object({
      rank: z.number().int(),
      candidateKey: z.string(),
      polytopeName: z.string(),
      score: z.number().nullable(),
    }),
  ),
})
export type EarlierIssue = z.infer<typeof earlierIssueSchema>

export const laterIssueSchema = z.object({ id: z.string(), name: z.string(), issue: z.number().int() })
