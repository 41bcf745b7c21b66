import { z } from 'zod'
import { polytopeKeySchema } from './polytopes.ts'

const index = z.number().int().min(0)

/** GET /api/polytopes/:key/structure: what a polytope's page shows beside its faces. Indices refer to its points. */
export const polytopeStructureSchema = z.object({
  /** Topology of every prime toric divisor, in the order of the points. */
  divisors: z.array(
    z.object({
      chi: z.number().int(),
      h1: z.number().int(),
      h2: z.number().int(),
      components: z.number().int(),
      rigid: z.boolean(),
    }),
  ),
  /** Two-dimensional reflexive sections through the origin. */
  planar: z.array(
    z.object({
      /** Its number among the 16 reflexive polygons, F1 to F16. */
      type: z.number().int().min(1).max(16),
      /** Its lattice points in a basis of its plane, counterclockwise, the origin left out. */
      outline: z.array(z.tuple([z.number().int(), z.number().int()])),
      /** Those of its points that are prime toric divisors; points interior to facets are none. */
      points: z.array(index),
    }),
  ),
  /** Three-dimensional reflexive sections through the origin. */
  solid: z.array(
    z.object({
      vertices: z.array(index),
      latticePoints: z.number().int(),
      /** The two-dimensional sections inside it, as indices of `planar`. */
      nested: z.array(index),
    }),
  ),
})
export type PolytopeStructure = z.infer<typeof polytopeStructureSchema>

/** A candidate on the polytope that the reader's campaigns have met, and where. */
export const knownCandidateSchema = z.object({
  key: z.string(),
  searches: z.number().int(),
  shortlists: z.number().int(),
  imports: z.number().int(),
  verdicts: z.number().int(),
})

/** GET /api/polytopes/:key/classes */
export const polytopeClassesSchema = z.object({
  /** Distinct candidates, up to symmetry, that the reader's campaigns have met. */
  total: z.number().int(),
  known: z.array(knownCandidateSchema),
  /** Exact numbers of classes, before and modulo symmetry; null when they have not been counted. */
  classes: z.number().nullable(),
  classOrbits: z.number().nullable(),
  /** The first of them in full: it may exceed what a number holds. */
  classDigits: z.string().nullable(),
  /** A count that was given up after so many classes. */
  classesSeen: z.number().int().nullable(),
  /** log10 of an upper bound on the number of classes. */
  classBound: z.number().nullable(),
  /** A count under way, and how many classes it has seen. */
  counting: z.object({ seen: z.number().int() }).nullable(),
})
export type PolytopeClasses = z.infer<typeof polytopeClassesSchema>

/** How many known candidates are listed at most. */
export const knownLimit = 200

/** A count is given up after so many classes. */
export const classCountLimit = 20_000

/** POST /api/polytopes/find: polytopes given by points or weights, compared by normal form. */
export const findPolytopesSchema = z.object({ text: z.string().min(1).max(100_000) })
export const findPolytopesLimit = 20

export const foundPolytopesSchema = z.object({
  found: z.array(
    z.object({
      line: z.number().int().nullable(),
      /** For weights: which of the two polytopes it is. */
      side: z.enum(['fan', 'newton']).nullable(),
      key: polytopeKeySchema,
      h11: z.number().int(),
      h21: z.number().int(),
      /** Its name in the library; null when the reader's library does not hold it. */
      name: z.string().nullable(),
    }),
  ),
  problems: z.array(z.object({ line: z.number().int().nullable(), code: z.string(), message: z.string() })),
})
export type FoundPolytopes = z.infer<typeof foundPolytopesSchema>
