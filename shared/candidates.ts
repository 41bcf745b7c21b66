import { z } from 'zod'
import { certificateMarkSchema } from './certificates.ts'
import { candidateKeySchema } from './keys.ts'
import { polytopeDetailSchema, twoFaceSchema } from './polytopes.ts'
import { outcomeSchema } from './outcomes.ts'
import { verdictSchema } from './verdicts.ts'

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
  /**
   * On polytopes that are not favourable: the components of all divisors, which span all of H^{1,1}; indices run over
   * them. The components of one divisor follow one another.
   */
  components: z
    .object({
      /** Point and number (from 0) among its components. */
      pointOf: z.array(z.number().int()),
      sheetOf: z.array(z.number().int()),
      cubes: z.array(z.number()),
      secondChern: z.array(z.number()),
      volumes: z.array(z.number()),
      /** Non-zero kappa_abc, a <= b <= c. */
      intersections: z.array(z.tuple([z.number().int(), z.number().int(), z.number().int(), z.number()])),
    })
    .nullable(),
  /** Toric fibrations; `section` counts the sections of the polytope's page, planar and solid ones apart. */
  fibrations: z.object({
    planarSections: z.number().int(),
    solidSections: z.number().int(),
    k3: z.array(
      z.object({
        section: z.number().int(),
        latticePoints: z.number().int(),
        /** The fibre's class as [point, coefficient]. */
        fibre: z.array(z.tuple([z.number().int(), z.number().int()])),
      }),
    ),
    genusOne: z.array(
      z.object({
        section: z.number().int(),
        type: z.number().int(),
        /** Lattice points around the fibre polygon. */
        outline: z.array(z.tuple([z.number().int(), z.number().int()])),
        /** Primitive rays of the base's fan, counterclockwise. */
        baseRays: z.array(z.tuple([z.number().int(), z.number().int()])),
        /** Least number of points in which a toric divisor or a component of one meets the fibre; 1: a section. */
        degree: z.number().int(),
      }),
    ),
    /** Pairs [index in k3, index in genusOne] of fibres one inside the other. */
    nested: z.array(z.tuple([z.number().int(), z.number().int()])),
  }),
  curves: z.array(z.object({ row: z.array(z.tuple([z.number().int(), z.number()])), volume: z.number() })),
  reference: z.object({
    weights: z.array(z.number()),
    volume: z.number(),
    norm: z.number(),
    edgeCurvesSuffice: z.boolean(),
  }),
  /** Largest eigenvalue of the divisor spectrum. */
  topEigenvalue: z.number(),
})
export type CandidateGeometry = z.infer<typeof candidateGeometrySchema>

/**
 * GET /api/candidates/:key/spectra: the whole spectra of the field-space metric at the reference point, ascending.
 * Apart from the rest, because a full decomposition takes seconds at the largest h11.
 */
export const candidateSpectraSchema = z.object({
  key: candidateKeySchema,
  divisorSpectrum: z.array(z.number()),
  basisSpectrum: z.array(z.number()),
  basis: z.array(z.number().int()),
})
export type CandidateSpectra = z.infer<typeof candidateSpectraSchema>

/** The largest 2-faces of a candidate with their triangles: as much as a small picture shows. */
export const classPictureSchema = z.object({
  key: candidateKeySchema,
  faces: z.array(
    twoFaceSchema.extend({
      /** Of the 2-face in its polytope. */
      index: z.number().int(),
      triangles: z.array(z.tuple([z.number().int(), z.number().int(), z.number().int()])),
    }),
  ),
  /** The distinct dual lengths of all 2-faces, ascending: they set the colours. */
  dualLengths: z.array(z.number().int()),
})
export type ClassPicture = z.infer<typeof classPictureSchema>

export const classPicturesLimit = 60

/** GET /api/candidates/pictures?keys=KEY,KEY,...; candidates the reader may not see are left out. */
export const classPicturesQuerySchema = z.object({
  keys: z
    .string()
    .transform((text) => text.split(','))
    .pipe(z.array(candidateKeySchema).min(1).max(classPicturesLimit)),
})

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
      certificate: certificateMarkSchema,
      /** Null for a candidate that was imported into the list. */
      search: z.object({ id: z.string(), name: z.string(), seed: z.number().int() }).nullable(),
      /** Neighbours in the list, for stepping through it. */
      previousKey: z.string().nullable(),
      nextKey: z.string().nullable(),
    }),
  ),
  /** Newest first. */
  verdicts: z.array(verdictSchema),
  /** How it came into the campaign when somebody imported it. */
  imported: z
    .object({
      name: z.string(),
      source: z.string(),
      line: z.number().int(),
      author: z.string(),
      createdAt: z.string(),
    })
    .nullable(),
})
export type CandidateRecord = z.infer<typeof candidateRecordSchema>

/**
 * GET /api/campaigns/:campaign/candidates/:key/score?version=ID: what a target version says of the candidate, be it in
 * a shortlist or not.
 */
export const candidateScoreSchema = candidateRecordSchema.shape.appearances.element.pick({
  targetId: true,
  targetName: true,
  targetVersion: true,
  targetVersionId: true,
  scoringHash: true,
  engineVersion: true,
  outcome: true,
  certificate: true,
})
export type CandidateScore = z.infer<typeof candidateScoreSchema>

export const candidateScoreQuerySchema = z.object({ version: z.string() })
