import { z } from 'zod'
import { ruleIssueSchema } from './problems.ts'
import { scopeSchema } from './polytopes.ts'
import { searchStates } from './searches.ts'
import { histogramSchema, rateSchema, scoredRowSchema } from './outcomes.ts'

export const targetVersionSchema = z.object({
  id: z.string(),
  number: z.number().int(),
  text: z.string(),
  scoringHash: z.string(),
  author: z.string(),
  createdAt: z.string(),
  searches: z.number().int(),
})
export const targetSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  latest: targetVersionSchema,
  versions: z.number().int(),
})
export type TargetSummary = z.infer<typeof targetSummarySchema>

/** GET /api/campaigns/:campaign/targets/:target; versions newest first. */
export const targetDetailSchema = z.object({
  id: z.string(),
  name: z.string(),
  versions: z.array(targetVersionSchema),
  /** Scope of the latest search with any version; null before the first one. */
  latestScope: scopeSchema.nullable(),
})
export type TargetDetail = z.infer<typeof targetDetailSchema>

/** GET /api/campaigns/:campaign/targets/:target/uses; versions that nothing used are left out. */
export const targetUsesSchema = z.array(
  z.object({
    versionId: z.string(),
    /** Newest first. */
    searches: z.array(
      z.object({ id: z.string(), name: z.string(), state: z.enum(searchStates), createdAt: z.string() }),
    ),
    shortlists: z.array(z.object({ id: z.string(), name: z.string(), createdAt: z.string() })),
  }),
)
export type TargetUses = z.infer<typeof targetUsesSchema>

export const ruleTextLimit = 20_000
export const createTargetSchema = z.object({
  name: z.string().trim().min(1).max(80),
  text: z.string().max(ruleTextLimit),
})
export const createTargetVersionSchema = z.object({ text: z.string().max(ruleTextLimit) })

/** POST /api/campaigns/:campaign/rules/check */
export const checkRuleRequestSchema = z.object({ text: z.string().max(ruleTextLimit) })
export const checkRuleResponseSchema = z.object({
  ok: z.boolean(),
  issues: z.array(ruleIssueSchema),
  scoringHash: z.string().nullable(),
})

/** POST /api/campaigns/:campaign/previews; a new preview replaces the same account's running one. */
export const previewRequestSchema = z.object({
  text: z.string().max(ruleTextLimit),
  scope: scopeSchema,
  size: z.number().int().min(10).max(2000).default(200),
  seed: z
    .number()
    .int()
    .min(0)
    .max(2 ** 31)
    .default(1),
})

/** Answer of the POST (first state) and data of each `preview` event. */
export const previewSchema = z.object({
  id: z.string(),
  state: z.enum(['running', 'done', 'failed', 'replaced']),
  message: z.string().nullable(),
  size: z.number().int(),
  evaluated: z.number().int(),
  law: z.string(),
  feasible: z.number().int(),
  infeasible: z.number().int(),
  undefined: z.number().int(),
  undefinedReasons: z.array(z.object({ reason: z.string(), count: z.number().int() })),
  requires: z.array(
    z.object({
      label: z.string(),
      stage: z.string(),
      reached: z.number().int(),
      passed: z.number().int(),
    }),
  ),
  histogram: histogramSchema.nullable(),
  hit: rateSchema.nullable(),
  /** Milliseconds per candidate: median, and mean share of each stage. */
  cost: z.object({
    median: z.number().nullable(),
    stages: z.array(z.object({ stage: z.string(), mean: z.number() })),
  }),
  best: z.array(scoredRowSchema),
  typical: z.array(scoredRowSchema),
  worst: z.array(scoredRowSchema),
})
export type Preview = z.infer<typeof previewSchema>
