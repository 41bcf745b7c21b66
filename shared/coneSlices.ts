import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'

/** `ray`, `wall-0` (the nearest) to `wall-11`, or `divisor-N`. */
const directionSchema = z
  .string()
  .regex(/^(ray|wall-\d{1,2}|divisor-\d{1,3})$/, 'is not ray, wall-N or divisor-N')

/** GET /api/candidates/:key/slice?first=&second= */
export const coneSliceQuerySchema = z.object({ first: directionSchema, second: directionSchema })
export type ConeSliceQuery = z.infer<typeof coneSliceQuerySchema>

const nearWallSchema = z.object({
  /** The class as [point, coefficient]. */
  row: z.array(z.tuple([z.number().int(), z.number()])),
  /** Edges whose curve it is; none for a circuit. */
  edges: z.array(z.tuple([z.number().int(), z.number().int()])),
  /** C·w at the reference point. */
  value: z.number(),
  /** From the reference point, over all directions. */
  distance: z.number(),
})

const polygonSchema = z.array(
  z.object({
    x: z.number(),
    y: z.number(),
    /** Wall on which the edge to the next corner lies; -1: where the picture ends. */
    line: z.number().int(),
  }),
)

/** A plane through the reference point, w = w0 + x e1 + y e2, with e1 and e2 orthonormal. */
export const coneSliceSchema = z.object({
  key: candidateKeySchema,
  /** C·w = value + slope · (x, y). */
  walls: z.array(nearWallSchema.extend({ slope: z.tuple([z.number(), z.number()]) })),
  cone: polygonSchema,
  /** Where every class has volume at least 1; empty when the plane meets it in the reference point only. */
  stretched: polygonSchema,
  reach: z.number(),
  directions: z.array(z.tuple([z.number(), z.number()])),
  nearest: z.array(nearWallSchema),
  rounds: z.number().int(),
})
export type ConeSliceView = z.infer<typeof coneSliceSchema>
