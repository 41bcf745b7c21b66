import { z } from 'zod'
import { polytopeKeySchema } from './polytopes.ts'

/**
 * GET /api/polytopes/:key/null-spectra: divisor spectra of candidates of the polytope that nobody selected. Computed
 * when first asked for.
 */
export const nullSpectraSchema = z.object({
  key: polytopeKeySchema,
  /** The law by which they were drawn; with the seed they are the first of the null samples of searches of this polytope. */
  law: z.string(),
  seed: z.number().int(),
  /** Distinct candidates; fewer than asked for where no more turn up. */
  size: z.number().int(),
  /** Number (from 1) of the eigenvalue that the first entry is about: 1, or the last where only the largest are known. */
  from: z.number().int(),
  /** Per eigenvalue of equal rank: quantiles at 5, 25, 50, 75 and 95 %. */
  quantiles: z.array(z.array(z.number()).length(5)),
})
export type NullSpectra = z.infer<typeof nullSpectraSchema>
