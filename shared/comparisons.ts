import { z } from 'zod'
import { outcomeSchema } from './outcomes.ts'
import { searchDetailSchema } from './searches.ts'

/** Searches laid side by side at once. */
export const fewestCompared = 2
export const mostCompared = 4

/** Places of the lists of the best for which shared candidates are counted. */
export const overlapSizes = [10, 50, 100] as const

/** GET /api/campaigns/:campaign/comparisons?with=ID,ID,... */
export const comparisonQuerySchema = z.object({
  with: z
    .string()
    .transform((text) => [...new Set(text.split(',').filter((id) => id !== ''))])
    .pipe(z.array(z.string()).min(fewestCompared).max(mostCompared)),
})

export const comparedSearchSchema = searchDetailSchema.omit({ top: true, shortlists: true, events: true })
export type ComparedSearch = z.infer<typeof comparedSearchSchema>

/** A candidate that at least two of the searches keep. */
export const sharedCandidateSchema = z.object({
  candidateKey: z.string(),
  polytopeKey: z.string(),
  h11: z.number().int(),
  h21: z.number().int(),
  /** Its rank in each search, in their order; null where it is not kept. */
  ranks: z.array(z.number().int().nullable()),
  /** Null where the searches do not score alike. */
  outcome: outcomeSchema.nullable(),
})
export type SharedCandidate = z.infer<typeof sharedCandidateSchema>

export const comparisonSchema = z.object({
  /** In the order asked for. */
  searches: z.array(comparedSearchSchema),
  /** One scoring (rule, observables, engine): scores may be compared. */
  sameScoring: z.boolean(),
  /** One scoring over one list of polytopes, hence one null sample. */
  sameNull: z.boolean(),
  /** How many of the best candidates each two searches share; on the diagonal, how many each one has. */
  overlaps: z.array(z.object({ best: z.number().int(), shared: z.array(z.array(z.number().int())) })),
  /** The shared candidates, by their best rank; at most 100. */
  shared: z.array(sharedCandidateSchema),
  sharedTotal: z.number().int(),
})
export type Comparison = z.infer<typeof comparisonSchema>
