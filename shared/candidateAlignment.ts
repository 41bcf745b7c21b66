import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'

/** GET /api/candidates/:key/alignment/:other: how the points of two candidates are laid on each other. */
export const candidateAlignmentSchema = z.object({
  key: candidateKeySchema,
  other: candidateKeySchema,
  /** null on different polytopes: their points have nothing to do with each other. */
  points: z
    .object({
      /** Point of the first for each point of the other: the symmetry of the polytope that leaves the least difference. */
      image: z.array(z.number().int()),
      /** Triangles the one has and the other has not. */
      triangles: z.number().int(),
    })
    .nullable(),
})
export type CandidateAlignment = z.infer<typeof candidateAlignmentSchema>
