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
  /** The same at 99.9 %; this and what else is optional is absent in samples drawn by earlier versions. */
  quantile999: z.number().nullable().optional(),
  histogram: histogramSchema.nullable(),
  hit: rateSchema.nullable(),
  /** Expected best of n null candidates, [n, score], n up to the sample's size. */
  expectedBest: z.array(z.tuple([z.number(), z.number()])),
  /** 90 % range of the best of n null candidates, [n, low, high]; high is null where the sample is too small for it. */
  bestRange: z.array(z.tuple([z.number(), z.number(), z.number().nullable()])).optional(),
  /** [score, candidates that are better, candidates at least as good], best first; of many scores not all. */
  ranked: z.array(z.tuple([z.number(), z.number(), z.number()])).optional(),
})
export type NullSummary = z.infer<typeof nullSummarySchema>
