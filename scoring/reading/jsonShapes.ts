import { z } from 'zod'

const integers = z.array(z.number())
const matrix = z.array(z.array(z.number()).length(4))
const key = z.string().regex(/^[0-9a-f]{32}$/, 'a key of 32 hexadecimal digits')
const corner = z.union([z.number().int(), z.array(z.number()).length(4)])
const corners = z.array(z.array(corner))

/** A corner of a simplex or triangle: an index into the points, or the point itself. */
export type Corner = z.infer<typeof corner>

/** A candidate in our own form, and the input of a headless evaluation. */
export const candidateShape = z.strictObject({
  name: z.string().optional(),
  polytope: key.optional(),
  vertices: matrix.optional(),
  weights: integers.optional(),
  side: z.enum(['fan', 'newton']).optional(),
  points: matrix.optional(),
  heights: z
    .union([
      integers,
      z.strictObject({ points: matrix, values: integers }),
      z.strictObject({ seed: z.number().optional(), noise: z.number().optional() }),
    ])
    .optional(),
  simplices: corners.optional(),
  triangles: corners.optional(),
  /** What the first point is called: 0 by default. */
  indexFrom: z.union([z.literal(0), z.literal(1)]).optional(),
  candidate: key.optional(),
  // Of a headless evaluation; they do not concern the geometry.
  rule: z.unknown().optional(),
  scale: z.unknown().optional(),
  show: z.unknown().optional(),
})
export type CandidateShape = z.infer<typeof candidateShape>

export const candidateListShape = z.looseObject({ candidates: z.array(z.unknown()) })

/** The output of a headless evaluation. */
export const evaluationShape = z.looseObject({
  polytopeKey: key,
  classKey: key.nullable(),
  fine: z.boolean(),
  points: matrix,
  heights: integers,
})

/** A find of a search, alone on a line or in the list of the final one. */
export const findShape = z.looseObject({
  polytopeKey: key,
  classKey: key,
  heights: integers,
  vertices: matrix.optional(),
})

export const finalLineShape = z.looseObject({ kind: z.literal('final'), top: z.array(z.unknown()) })

/** An exported shortlist. Its candidates are complete in exports that carry them. */
export const shortlistShape = z.looseObject({
  shortlist: z.looseObject({
    name: z.string(),
    rows: z.array(z.looseObject({ candidateKey: key, polytopeKey: key, rank: z.number() })),
  }),
  candidates: z
    .array(
      z.looseObject({
        candidateKey: key,
        polytopeKey: key,
        vertices: matrix,
        heights: integers,
      }),
    )
    .optional(),
})

export const certificateShape = z.looseObject({
  polytopeKey: key,
  candidateKey: key,
  vertices: matrix,
  points: matrix,
  heights: integers,
})
