import { z } from 'zod'
import { assignedSchema } from './assignments.ts'
import { certificateMarkSchema, certificationSchema } from './certificates.ts'
import { explorationSchema } from './explorations.ts'
import { candidateKeySchema } from './keys.ts'
import { rescoringSchema } from './rescorings.ts'
import { previewSchema } from './targets.ts'
import { searchProgressSchema, searchStates } from './searches.ts'
import { verdictSchema } from './verdicts.ts'
import { nullSummarySchema } from './nullSamples.ts'

/**
 * GET /api/events?campaign=ID: server-sent events, one stream per tab. The event's name is its `kind`. The stream
 * ends (with a `closed` event first) on sign-out or when the role in the campaign is lost.
 */
export const streamEventSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('search'),
    id: z.string(),
    state: z.enum(searchStates),
    progress: searchProgressSchema,
  }),
  z.object({ kind: z.literal('null'), searchId: z.string(), summary: nullSummarySchema }),
  z.object({ kind: z.literal('preview'), preview: previewSchema }),
  z.object({ kind: z.literal('exploration'), exploration: explorationSchema }),
  z.object({
    kind: z.literal('certification'),
    certification: certificationSchema,
    /** The certificate that was just made; null when only the request moved. */
    made: certificateMarkSchema.extend({ candidateKey: candidateKeySchema }).nullable(),
  }),
  z.object({ kind: z.literal('verdict'), candidateKey: candidateKeySchema, verdict: verdictSchema }),
  /** Many at once. */
  z.object({
    kind: z.literal('verdicts'),
    verdicts: z.array(z.object({ candidateKey: candidateKeySchema, verdict: verdictSchema })),
  }),
  z.object({ kind: z.literal('assigned'), ...assignedSchema.shape }),
  /** Somebody wrote, changed or removed a comment. */
  z.object({ kind: z.literal('comment'), candidateKey: candidateKeySchema }),
  z.object({ kind: z.literal('rescoring'), rescoring: rescoringSchema }),
  z.object({ kind: z.literal('library'), loaded: z.number().int(), total: z.number().int() }),
  /** Stored polytopes whose numbers are still being computed. */
  z.object({ kind: z.literal('undescribed'), left: z.number().int() }),
  /** A count of all classes of a polytope that the campaign asked for. */
  z.object({ kind: z.literal('class-count'), key: z.string(), seen: z.number().int(), ended: z.boolean() }),
  z.object({
    kind: z.literal('changed'),
    what: z.enum([
      'targets',
      'searches',
      'shortlists',
      'members',
      'imports',
      'collections',
      'external-tables',
      'shortlist-views',
    ]),
  }),
  z.object({ kind: z.literal('closed'), reason: z.enum(['signed-out', 'role-lost', 'shutting-down']) }),
])
export type StreamEvent = z.infer<typeof streamEventSchema>
