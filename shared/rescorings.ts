import { z } from 'zod'
import { assemblySchema } from './assemblies.ts'

/**
 * POST /api/campaigns/:campaign/rescorings: scores the candidates of a list, or the finds of searches, by a target
 * version and makes a new list of them. Of a list every candidate is kept unless a smaller size is asked for.
 */
export const requestRescoringSchema = z.object({
  name: z.string().trim().min(1).max(80),
  targetVersionId: z.string(),
  from: z.union([
    z.object({ shortlistId: z.string() }),
    z.object({ searchIds: z.array(z.string()).min(1).max(20) }),
  ]),
  /** Absent: all candidates, by score. */
  assembly: assemblySchema.optional(),
})
export type RequestRescoring = z.input<typeof requestRescoringSchema>

export const rescoringStates = ['queued', 'running', 'finished', 'cancelled', 'failed'] as const
export type RescoringState = (typeof rescoringStates)[number]

export const rescoringSchema = z.object({
  id: z.string(),
  name: z.string(),
  state: z.enum(rescoringStates),
  /** The list that is scored anew; null: finds of searches are. */
  fromId: z.string().nullable(),
  targetVersionId: z.string(),
  targetName: z.string(),
  targetVersion: z.number().int(),
  total: z.number().int(),
  /** Candidates that have a score. */
  scored: z.number().int(),
  /** Candidates whose score could not be computed; they will be left out. */
  broken: z.number().int(),
  /** The list that came of it. */
  shortlistId: z.string().nullable(),
  failure: z.string().nullable(),
  author: z.string(),
  createdAt: z.string(),
  finishedAt: z.string().nullable(),
})
export type Rescoring = z.infer<typeof rescoringSchema>
