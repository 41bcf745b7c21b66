import { z } from 'zod'
import type { NullLawName } from '../scoring/index.ts'
import { candidateKeySchema } from './keys.ts'
import { pastedLimitBytes, polytopeKeySchema, scopeSchema } from './polytopes.ts'

const chosen = z.array(candidateKeySchema).min(1).max(500).optional()

/** What a search begins from. Of a list all are taken unless some are chosen. */
export const startsSourceSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('shortlist'), id: z.string().max(40), candidateKeys: chosen }),
  z.object({
    kind: z.literal('search'),
    id: z.string().max(40),
    size: z.number().int().min(1).max(500).default(50),
  }),
  z.object({ kind: z.literal('imported'), candidateKeys: chosen }),
  /** What an earlier search began from. */
  z.object({ kind: z.literal('same'), id: z.string().max(40) }),
])
export type StartsSource = z.infer<typeof startsSourceSchema>

const nullLawNames = ['quadratic', 'potentials'] as const satisfies readonly NullLawName[]

/** Settings of methods, beyond those of every search. */
export const methodSettingsSchema = z.object({
  /** Annealing: fresh starts among which an island's budget is divided. */
  descents: z.number().int().min(1).max(1000).optional(),
  /** Proposals in a row without a new class after which a polytope counts as exhausted. */
  patience: z.number().int().min(10).max(1_000_000).optional(),
  /** Rows of the uniform sample of evaluations that an island keeps. */
  sample: z.number().int().min(0).max(10_000).optional(),
  /** Random: the law of its draws, where it is not the usual one. */
  law: z.enum(nullLawNames).optional(),
})
export type MethodSettings = z.infer<typeof methodSettingsSchema>

/** POST /api/campaigns/:campaign/search-starts: what a search would begin from. */
export const startsSummarySchema = z.object({
  name: z.string(),
  count: z.number().int(),
  /** Their polytopes, each once. */
  polytopeKeys: z.array(polytopeKeySchema),
})
export type StartsSummary = z.infer<typeof startsSummarySchema>

/** POST /api/campaigns/:campaign/searches/:search/extend */
export const extendSearchSchema = z.object({ evaluations: z.number().int().min(1).max(1_000_000) })

/** POST /api/campaigns/:campaign/search-costs: what evaluations of a rule over a scope cost on this server. */
export const searchCostRequestSchema = z.object({
  targetVersionId: z.string(),
  scope: scopeSchema,
  method: z.string().max(40).default('annealing'),
})
export type SearchCostRequest = z.infer<typeof searchCostRequestSchema>

export const searchCostSchema = z.object({
  /** Mean over the candidates that were timed, on one thread. */
  millisecondsEach: z.number(),
  /** How many were timed. */
  timed: z.number().int(),
  /** Threads of this server that searches share. */
  threads: z.number().int(),
  /** Searches that share them now. */
  running: z.number().int(),
  /** Null candidates of this scope and rule that are still to be evaluated beside the search. */
  nullLeft: z.number().int(),
})
export type SearchCost = z.infer<typeof searchCostSchema>

/** What a search began from, as it is shown. */
export const startsFromSchema = z.object({
  kind: z.enum(['shortlist', 'search', 'imported', 'file']),
  /** Of the shortlist or search. */
  id: z.string().nullable(),
  name: z.string(),
  count: z.number().int(),
  /** False: the method makes nothing of them. */
  used: z.boolean(),
})
export type StartsFrom = z.infer<typeof startsFromSchema>

/** A result that was run elsewhere. */
export const importedResultSchema = z.object({
  /** Name of the file, or what the person called the text. */
  source: z.string(),
  /** The listed candidates were checked and scored anew; counts, curve and null are as the file reports them. */
  checked: z.number().int(),
})
export type ImportedResult = z.infer<typeof importedResultSchema>

export const startsRequestSchema = z.object({ starts: startsSourceSchema })

/** What goes with an uploaded result beside the file. */
export const resultOptionsSchema = z.object({ name: z.string().trim().max(80).optional() })

/** POST /api/campaigns/:campaign/search-results: the lines of a headless search. */
export const importResultSchema = resultOptionsSchema.extend({
  text: z.string().max(pastedLimitBytes),
  /** What the person calls the text. */
  source: z.string().trim().max(120).optional(),
})
