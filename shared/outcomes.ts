import { z } from 'zod'

/** A cell of a report column: a number or truth value, or empty with its reason. */
export const cellSchema = z.union([z.number(), z.boolean(), z.object({ undefined: z.string() })])
export type Cell = z.infer<typeof cellSchema>

/** What a rule says of one candidate. */
export const outcomeSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('feasible'),
    score: z.number(),
    /** null: undefined, or the rule has no `hit` and no null quantile is known yet. */
    hit: z.boolean().nullable(),
    report: z.record(z.string(), cellSchema),
  }),
  z.object({
    kind: z.literal('infeasible'),
    stage: z.string(),
    shortfall: z.number(),
    failed: z.array(z.string()),
  }),
  z.object({ kind: z.literal('undefined'), reason: z.string(), stage: z.string() }),
])
export type OutcomeView = z.infer<typeof outcomeSchema>

/** A rate with its Wilson 95 % interval; with zero hits `high` is the 3/n bound and `low` is 0. */
export const rateSchema = z.object({
  hits: z.number().int(),
  size: z.number().int(),
  rate: z.number(),
  low: z.number(),
  high: z.number(),
})

export const histogramSchema = z.object({ edges: z.array(z.number()), counts: z.array(z.number().int()) })

export const scoredRowSchema = z.object({
  candidateKey: z.string(),
  polytopeKey: z.string(),
  h11: z.number().int(),
  h21: z.number().int(),
  outcome: outcomeSchema,
})
export type ScoredRow = z.infer<typeof scoredRowSchema>
