import { z } from 'zod'

/** A list, and the finds of a search or an import that go into one, at most. */
export const shortlistLimit = 5_000

/** Columns whose Pareto fronts may be taken: the score, and the report columns of the rule. */
export const scoreColumn = 'score'
export const reportColumn = (name: string): string => `report:${name}`

const paretoAxisSchema = z.object({
  /** `score`, or `report:NAME`. */
  column: z.string().min(1).max(200),
  direction: z.enum(['max', 'min']),
})
export type ParetoAxis = z.infer<typeof paretoAxisSchema>

/** How a list is drawn from what was found: see `assemble` of the engine for the exact meaning. */
export const assemblySchema = z.object({
  /** Candidates, at most. */
  size: z.number().int().min(1).max(shortlistLimit).default(50),
  /** Leaves out candidates that a requirement refuses or that have no value. */
  feasibleOnly: z.boolean().default(false),
  /** Rank by Pareto fronts of two or three columns; null: by score. */
  pareto: z
    .array(paretoAxisSchema)
    .min(2)
    .max(3)
    .refine((axes) => new Set(axes.map(({ column }) => column)).size === axes.length, 'a column occurs twice')
    .nullable()
    .default(null),
  /** Of one polytope, at most; null: no limit, as below. */
  perPolytope: z.number().int().min(1).max(shortlistLimit).nullable().default(null),
  /** Triangles by which two candidates on a polytope differ, at least; a flip exchanges two. */
  apart: z.number().int().min(1).max(200).nullable().default(null),
  /** Of one set of basis-independent integers, at most; candidates whose integers are not known are not limited. */
  perInvariants: z.number().int().min(1).max(shortlistLimit).nullable().default(null),
})
export type AssemblySettings = z.infer<typeof assemblySchema>

/** How many candidates each choice left: those of the list and those left out add up to `distinct`. */
export const assemblyCountsSchema = z.object({
  /** Finds of all searches, candidates that several of them found counted again. */
  finds: z.number().int(),
  distinct: z.number().int(),
  leftOut: z.object({
    infeasible: z.number().int(),
    /** A column of the fronts is undefined. */
    withoutValue: z.number().int(),
    polytope: z.number().int(),
    invariants: z.number().int(),
    near: z.number().int(),
    /** The list was full before. */
    beyond: z.number().int(),
    /** Their score could not be computed. */
    broken: z.number().int(),
  }),
  /** Among those looked at before the list was full, how many have no known basis-independent integers. */
  withoutInvariants: z.number().int(),
  /** Candidates on the first front; null where none was taken. */
  firstFront: z.number().int().nullable(),
})
export type AssemblyCounts = z.infer<typeof assemblyCountsSchema>
