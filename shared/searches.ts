import { z } from 'zod'
import type { MethodName } from '../scoring/index.ts'
import { scopeSchema } from './polytopes.ts'
import {
  importedResultSchema,
  methodSettingsSchema,
  startsFromSchema,
  startsSourceSchema,
} from './searchRunning.ts'
import { nullSummarySchema } from './nullSamples.ts'
import { scoredRowSchema } from './outcomes.ts'
import { searchEventSchema } from './searchEvents.ts'

export const searchStates = ['queued', 'running', 'paused', 'finished', 'cancelled', 'failed'] as const
export type SearchState = (typeof searchStates)[number]

/** The methods of the engine, in the order in which they are offered, with a line on each. */
export const searchMethods = {
  auto: 'Auto: enumerates when feasible, else a portfolio that goes on with what does best',
  annealing: 'Annealing: flips and height jitters, cooling with restarts',
  tempering: 'Parallel tempering: four temperatures that exchange their places',
  genetic: 'Genetic: populations of distinct classes, blends and 2-face crossover',
  lines: 'Line searches: flip after flip along lines of heights; made for rules on the topology',
  exhaustive: 'Exhaustive: every class once; counts first, refuses more than the budget',
  uniform: 'Uniform walk: flips at random, uniform over classes before symmetry in the long run',
  random: 'Random heights: no guidance, for comparison',
} as const satisfies Record<MethodName, string>

/** Methods that make nothing of candidates to begin from. */
export const startless: readonly MethodName[] = ['exhaustive', 'random']

const methodNames = Object.keys(searchMethods) as [MethodName, ...MethodName[]]

/** POST /api/campaigns/:campaign/searches */
export const createSearchSchema = z.object({
  name: z.string().trim().max(80).optional(),
  targetVersionId: z.string(),
  scope: scopeSchema,
  method: z.enum(methodNames).default('annealing'),
  /** Distinct evaluations, over all islands. */
  budget: z.number().int().min(10).max(1_000_000),
  seed: z
    .number()
    .int()
    .min(0)
    .max(2 ** 31),
  islands: z.number().int().min(1).max(16).default(2),
  /** How many of the best distinct candidates to keep. */
  keep: z.number().int().min(1).max(500).default(100),
  /** A surrogate chooses among proposals where the rule needs a reference point; it never decides a rank. */
  surrogate: z.boolean().default(true),
  settings: methodSettingsSchema.optional(),
  /** Candidates to begin from. */
  starts: startsSourceSchema.optional(),
})
export type CreateSearch = z.infer<typeof createSearchSchema>

/** See the engine's `SurrogateReport`. */
export const surrogateReportSchema = z.object({
  /** Rank correlation of predictions, made before the evaluation, with the outcomes. */
  skill: z.number().nullable(),
  predictions: z.number().int(),
  aside: z.boolean(),
  offered: z.number().int(),
  chosen: z.number().int(),
})
export type SurrogateReport = z.infer<typeof surrogateReportSchema>

export const searchProgressSchema = z.object({
  /** Evaluations the search is going to make at most; less than allowed where an exhaustive one has counted less. */
  budget: z.number().int().optional(),
  /** Evaluations of candidates that the search was given: no finds of its own. */
  given: z.number().int().optional(),
  evaluations: z.number().int(),
  proposals: z.number().int(),
  accepted: z.number().int(),
  restarts: z.number().int(),
  feasible: z.number().int(),
  infeasible: z.number().int(),
  undefined: z.number().int(),
  best: z.number().nullable(),
  bestKey: z.string().nullable(),
  /** Best-so-far over evaluations (merged over islands), thinned to at most 400 steps. */
  curve: z.array(z.tuple([z.number(), z.number()])),
  /** Per island: [evaluations, best]. */
  islands: z.array(
    z.object({
      evaluations: z.number().int(),
      /**
       * Candidates, distinct within the island, that the rule's own hit line holds for, or that score above the
       * null's 99 % quantile. Absent while that is not known.
       */
      hits: z.number().int().optional(),
      /** Evaluations of candidates that the search was given; none of them is among the hits. */
      given: z.number().int().optional(),
      /** How many of them may lie on either side of the quantile; half of these are among `hits`. */
      unsure: z.number().int().optional(),
      best: z.number().nullable(),
      exhausted: z.boolean(),
    }),
  ),
  /** Null where the search has none, or its rule needs none; absent in progress of earlier versions. */
  surrogate: surrogateReportSchema.nullish(),
  exhausted: z.boolean(),
  evaluationsPerSecond: z.number().nullable(),
  secondsLeft: z.number().nullable(),
})
export type SearchProgress = z.infer<typeof searchProgressSchema>

/** How a search that runs or is queued stands just now. */
export const searchStandingSchema = z.discriminatedUnion('kind', [
  /** Threads that work on it now. */
  z.object({ kind: z.literal('working'), threads: z.number().int() }),
  /** Its place among all that wait for one of the server's threads; 1 is next. */
  z.object({ kind: z.literal('waiting'), place: z.number().int(), threads: z.number().int() }),
  /** What it has found cannot be saved for a passing reason; it goes on by itself. */
  z.object({ kind: z.literal('held'), code: z.string(), message: z.string() }),
])
export type SearchStanding = z.infer<typeof searchStandingSchema>

export const searchSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  state: z.enum(searchStates),
  method: z.string(),
  targetId: z.string(),
  targetName: z.string(),
  targetVersion: z.number().int(),
  polytopes: z.number().int(),
  budget: z.number().int(),
  seed: z.number().int(),
  evaluations: z.number().int(),
  best: z.number().nullable(),
  /** Null when it has ended or rests, or is about to be taken up; absent where lists do not tell it. */
  standing: searchStandingSchema.nullable().optional(),
  createdAt: z.string(),
  finishedAt: z.string().nullable(),
  author: z.string(),
  /** Run elsewhere, its result imported. */
  isImported: z.boolean().optional(),
})
export type SearchSummary = z.infer<typeof searchSummarySchema>

export const searchDetailSchema = searchSummarySchema.extend({
  targetVersionId: z.string(),
  rule: z.string(),
  scoringHash: z.string(),
  engineVersion: z.string(),
  scope: scopeSchema,
  islands: z.number().int(),
  keep: z.number().int(),
  surrogate: z.boolean(),
  settings: methodSettingsSchema,
  /** Budgets added since it was made. */
  extensions: z.array(z.number().int()),
  /** Null: it began by itself. */
  starts: startsFromSchema.nullable(),
  imported: importedResultSchema.nullable(),
  /** Of a search that is queued: searches that were queued before it, of any campaign. */
  ahead: z.number().int().nullable(),
  progress: searchProgressSchema,
  null: nullSummarySchema.nullable(),
  /** False: the rule leaves it open what a hit is, and one is a score above the null's 99 % quantile. */
  ownHitLine: z.boolean(),
  /** Best distinct candidates so far, at most 20. */
  top: z.array(scoredRowSchema),
  failure: z.object({ code: z.string(), message: z.string() }).nullable(),
  shortlists: z.array(z.object({ id: z.string(), name: z.string() })),
  /** What happened to it, oldest first; of many the latest 200. */
  events: z.array(searchEventSchema),
})
export type SearchDetail = z.infer<typeof searchDetailSchema>
