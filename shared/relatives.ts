import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'
import { polytopeKeySchema } from './polytopes.ts'
import { verdictSchema } from './verdicts.ts'

/** A verdict with the campaign it was given in; only campaigns the reader belongs to. */
export const campaignVerdictSchema = verdictSchema.extend({
  campaignId: z.string(),
  campaignName: z.string(),
})

const relativeSchema = z.object({
  key: candidateKeySchema,
  polytopeKey: polytopeKeySchema,
  polytopeName: z.string(),
  /** The latest per campaign and target, newest first. */
  verdicts: z.array(campaignVerdictSchema),
})

/** Basis-independent integers of the threefold; what each means is said in `invariantWords`. */
export const wallInvariantsSchema = z.object({
  /** Hash of the rest: equal for diffeomorphic threefolds; equal keys do not prove it. */
  key: z.string().regex(/^[0-9a-f]{32}$/),
  version: z.number().int(),
  h11: z.number().int(),
  h21: z.number().int(),
  fundamentalGroup: z.number().int(),
  triple: z.number().int(),
  square: z.number().int(),
  cube: z.number().int(),
  chern: z.number().int(),
  chi: z.number().int(),
  /** Elementary divisors greater than 1, as decimal texts. */
  products: z.array(z.string()),
  parity: z.object({
    rank: z.number().int(),
    alternating: z.boolean(),
    radicalProducts: z.number().int(),
    radicalSquares: z.number().int(),
  }),
})

/** Names of the integers of `wallInvariantsSchema`, in the order they are shown. */
export const invariantWords = {
  fundamentalGroup: 'order of the fundamental group',
  triple: 'gcd of κ(x, y, z)',
  square: 'gcd of κ(x, x, y)',
  cube: 'gcd of x³',
  chern: 'gcd of c₂·x',
  chi: 'gcd of the holomorphic Euler characteristics',
  products: 'elementary divisors of Sym² H² → H⁴ above 1',
} as const

/** GET /api/candidates/:key/relatives?campaign=: candidates that may be the same geometry, or nearly the same. */
export const candidateRelativesSchema = z.object({
  key: candidateKeySchema,
  invariants: wallInvariantsSchema,
  /**
   * Known candidates with the same key of invariants: they may be diffeomorphic. Never merged. Those on other
   * polytopes first.
   */
  equivalents: z.array(relativeSchema.extend({ samePolytope: z.boolean() })),
  /** How many there are; the list is cut. */
  equivalentsTotal: z.number().int(),
  /**
   * Known candidates with these Hodge numbers that were compared, and those whose invariants are still to come: they
   * are computed in the background from now on, so that asking again finds more.
   */
  compared: z.number().int(),
  waiting: z.number().int(),
  /** Known candidates on the same polytope that differ in few triangles, nearest first. */
  nearDuplicates: z.array(
    relativeSchema.extend({
      /** Triangles the one has and the other has not, the least over the polytope's symmetries. */
      triangles: z.number().int(),
      /** At least so many flips apart: half of `triangles`. */
      flips: z.number().int(),
    }),
  ),
  /** Known candidates on the same polytope that were compared, and how many there are. */
  nearCompared: z.number().int(),
  nearTotal: z.number().int(),
})
export type CandidateRelatives = z.infer<typeof candidateRelativesSchema>
export type CampaignVerdict = z.infer<typeof campaignVerdictSchema>
export type WallInvariantsView = z.infer<typeof wallInvariantsSchema>

export const relativesQuerySchema = z.object({ campaign: z.string().optional() })
