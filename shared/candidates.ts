import { z } from 'zod'
import { polytopeDetailSchema } from './polytopes.ts'
import { outcomeSchema } from './outcomes.ts'
import { verdictSchema } from './verdicts.ts'

export const candidateKeySchema = z.string().regex(/^[0-9a-f]{32}$/)

/**
 * GET /api/candidates/:key: geometry only, the same for every reader who may see the polytope. Indices refer to
 * polytope.pointCoordinates; labels are those of the canonical representative.
 */
export const candidateGeometrySchema = z.object({
  key: candidateKeySchema,
  polytope: polytopeDetailSchema,
  /** Integer heights that witness the class (canonical labels). */
  heights: z.array(z.number().int()),
  triangles: z.array(z.tuple([z.number().int(), z.number().int(), z.number().int()])),
  /** 2-face of each triangle. */
  faceOf: z.array(z.number().int()),
  /** Non-zero kappa_ijk, i <= j <= k. */
  intersections: z.array(z.tuple([z.number().int(), z.number().int(), z.number().int(), z.number()])),
  secondChern: z.array(z.number()),
  divisors: z.array(
    z.object({
      chi: z.number().int(),
      h1: z.number().int(),
      h2: z.number().int(),
      components: z.number().int(),
      rigid: z.boolean(),
      cube: z.number(),
      volume: z.number(),
    }),
  ),
  curves: z.array(z.object({ row: z.array(z.tuple([z.number().int(), z.number()])), volume: z.number() })),
  reference: z.object({
    weights: z.array(z.number()),
    volume: z.number(),
    norm: z.number(),
    edgeCurvesSuffice: z.boolean(),
  }),
  metric: z.object({
    divisorSpectrum: z.array(z.number()),
    basisSpectrum: z.array(z.number()),
    basis: z.array(z.number().int()),
  }),
})
export type CandidateGeometry = z.infer<typeof candidateGeometrySchema>

/** GET /api/campaigns/:campaign/candidates/:key: what this campaign knows of the candidate. */
export const candidateRecordSchema = z.object({
  key: candidateKeySchema,
  appearances: z.array(
    z.object({
      shortlistId: z.string(),
      shortlistName: z.string(),
      rank: z.number().int(),
      size: z.number().int(),
      targetId: z.string(),
      targetName: z.string(),
      targetVersion: z.number().int(),
      targetVersionId: z.string(),
      rule: z.string(),
      scoringHash: z.string(),
      engineVersion: z.string(),
      outcome: outcomeSchema,
      searchId: z.string(),
      searchName: z.string(),
      searchSeed: z.number().int(),
      /** Neighbours in the list, for stepping through it. */
      previousKey: z.string().nullable(),
      nextKey: z.string().nullable(),
    }),
  ),
  /** Newest first. */
  verdicts: z.array(verdictSchema),
})
export type CandidateRecord = z.infer<typeof candidateRecordSchema>
