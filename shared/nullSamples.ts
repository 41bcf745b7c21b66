import { z } from 'zod'
import { histogramSchema, rateSchema } from './outcomes.ts'

/** The same rule on candidates nobody selected, with how they were drawn. */
export const nullSummarySchema = z.object({
  /** Name and description of the sampling law. */
  law: z.string(),
  seed: z.number().int(),
  /** Candidates asked for and evaluated so far (distinct classes; equivalents counted once). */
  size: z.number().int(),
  evaluated: z.number().int(),
  complete: z.boolean(),
  feasible: z.number().int(),
  infeasible: z.number().int(),
  undefined: z.number().int(),
  median: z.number().nullable(),
  best: z.number().nullable(),
  /** 99 % quantile of the score: the hit line of a rule without `hit`. */
  quantile99: z.number().nullable(),
  histogram: histogramSchema.nullable(),
  hit: rateSchema.nullable(),
  /** Expected best of n null candidates, [n, score], n up to the sample's size. */
  expectedBest: z.array(z.tuple([z.number(), z.number()])),
})
export type NullSummary = z.infer<typeof nullSummarySchema>
