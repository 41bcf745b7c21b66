import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'
import { cellSchema } from './outcomes.ts'
import { polytopeKeySchema, scopeSchema } from './polytopes.ts'

/** Most candidates of one null sample that is explored, and most columns. */
export const explorationSizeLimit = 2_000
export const explorationColumnLimit = 8
export const columnTextLimit = 2_000

/** What an exploration may compute for before it stops, in minutes; what it has computed stays. */
export const explorationMinutes = 5

/** Where on the ray through the reference point the columns are taken; as `at` in a rule. */
export const placeOnRaySchema = z.object({
  kind: z.enum(['scale', 'volume', 'smallest divisor']),
  value: z.number().min(1e-6).max(1e12),
})
export type Place = z.infer<typeof placeOnRaySchema>

export const explorationSourceSchema = z.discriminatedUnion('kind', [
  /** Candidates nobody selected, drawn by the null's law. */
  z.object({
    kind: z.literal('null'),
    scope: scopeSchema,
    seed: z
      .number()
      .int()
      .min(0)
      .max(2 ** 31)
      .default(1),
    size: z.number().int().min(10).max(explorationSizeLimit).default(500),
  }),
  /** The uniform sample of all its evaluations that a search keeps, as it stands now. */
  z.object({ kind: z.literal('search'), search: z.string().max(40) }),
])
export type ExplorationSource = z.infer<typeof explorationSourceSchema>

/** POST /api/campaigns/:campaign/explorations */
export const explorationRequestSchema = z.object({
  source: explorationSourceSchema,
  at: placeOnRaySchema.default({ kind: 'scale', value: 1 }),
  /** Expressions of the scoring language, with a name before them (`rigid = ...`) or not. */
  columns: z.array(z.string().max(columnTextLimit)).min(1).max(explorationColumnLimit),
})
export type ExplorationRequest = z.infer<typeof explorationRequestSchema>

export const explorationStates = ['running', 'done', 'stopped', 'failed'] as const

/** Answer of the POST and of GET .../explorations/:exploration; also the data of each `exploration` event. */
export const explorationSchema = z.object({
  id: z.string(),
  state: z.enum(explorationStates),
  /** Why it stopped or failed. */
  message: z.string().nullable(),
  /** Rows there are going to be, as far as known, and rows whose columns are all there. */
  size: z.number().int(),
  evaluated: z.number().int(),
  /** How the candidates were chosen, in words. */
  law: z.string(),
  engineVersion: z.string(),
  polytopes: z.number().int(),
  /** The sample of a search: what it is of, and how many evaluations each island made. */
  search: z
    .object({
      id: z.string(),
      name: z.string(),
      islands: z.array(z.object({ evaluations: z.number().int(), rows: z.number().int() })),
    })
    .nullable(),
  at: placeOnRaySchema,
  columns: z.array(
    z.object({
      name: z.string(),
      expression: z.string(),
      type: z.enum(['integer', 'number', 'truth']),
      unit: z.string().nullable(),
      stage: z.string(),
      cost: z.string(),
    }),
  ),
})
export type Exploration = z.infer<typeof explorationSchema>

export const explorationRowSchema = z.object({
  candidateKey: candidateKeySchema,
  /** Place in `polytopes` of the same answer. */
  polytope: z.number().int(),
  /** In the sample of a search: its island, and the score under the search's rule (null without one). */
  island: z.number().int().optional(),
  score: z.number().nullable().optional(),
  cells: z.array(cellSchema),
})
export type ExplorationRow = z.infer<typeof explorationRowSchema>

/** GET .../explorations/:exploration/rows?from=N: the rows from N on that are complete. */
export const explorationRowsSchema = z.object({
  from: z.number().int(),
  polytopes: z.array(
    z.object({ key: polytopeKeySchema, name: z.string(), h11: z.number().int(), h21: z.number().int() }),
  ),
  rows: z.array(explorationRowSchema),
})
export type ExplorationRows = z.infer<typeof explorationRowsSchema>

export const explorationRowsQuerySchema = z.object({ from: z.coerce.number().int().min(0).default(0) })

/** POST .../explorations/:exploration/candidates: the pages of these candidates are to open. */
export const openedCandidatesSchema = z.object({ keys: z.array(candidateKeySchema).min(1).max(100) })
