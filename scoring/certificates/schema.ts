import { z } from 'zod'
import { catalogue } from '../certify/catalogue.ts'

const int = z.number().int()
const index = int.nonnegative()
const finite = z.number()
const point = z.tuple([int, int, int, int])
const key = z.string().regex(/^[0-9a-f]{32}$/, 'expected 32 hexadecimal digits')
const hash = z.string().regex(/^[0-9a-f]{64}$/, 'expected 64 hexadecimal digits')

const score = z.strictObject({
  value: finite.optional(),
  infeasible: z
    .strictObject({
      stage: z.string(),
      shortfall: finite,
      failed: z.array(z.strictObject({ label: z.string(), shortfall: finite })),
    })
    .optional(),
  undefined: z.string().optional(),
  report: z.record(z.string(), z.union([finite, z.boolean(), z.strictObject({ undefined: z.string() })])),
  hit: z.boolean().nullable(),
})

const numbers = z.strictObject({
  facets: index,
  faces: z.strictObject({ edges: index, twoFaces: index }),
  normalisedVolumes: z.strictObject({ own: index, dual: index }),
  latticePoints: index,
  dualLatticePoints: index,
  hodge: z.strictObject({ h11: index, h21: index, euler: int }),
  favourable: z.boolean(),
  /** Per point: dimension of the carrier, components of the divisor, interior points of the dual face. */
  carriers: z.array(index),
  components: z.array(index),
  dualInterior: z.array(index),
  /** Triangles of the 2-face class, ascending, lexicographic order. */
  triangles: z.array(z.tuple([index, index, index])),
  /** Maximal cones of the fan that the heights give; null when they give none. */
  simplices: z.array(z.tuple([index, index, index, index])).nullable(),
  /** Non-zero [i, j, k, kappa_ijk], i <= j <= k. */
  intersections: z.array(z.tuple([index, index, index, int])),
  c2: z.array(int),
  /** Reference point at scale 1: J = sum of weights[k] D_k. */
  reference: z.strictObject({ weights: z.array(finite), edgeCurvesSuffice: z.boolean() }),
  volumes: z.strictObject({ total: finite, divisors: z.array(finite) }),
  metric: z.strictObject({
    /** Largest eigenvalue as the fast road ranks by it. */
    top: finite,
    divisorSpectrum: z.array(finite),
    basis: z.array(index),
    basisSpectrum: z.array(finite),
  }),
  /** What the rule says; null without a rule. */
  score: score.nullable(),
})

/** One comparison of the two roads. */
const check = z.strictObject({
  id: z.enum(Object.keys(catalogue) as (keyof typeof catalogue)[]),
  group: z.enum(['polytope', 'triangulation', 'intersections', 'cone', 'metric', 'score']),
  title: z.string(),
  result: z.enum(['pass', 'fail', 'not-done']),
  fast: z.union([z.string(), finite]).nullable(),
  independent: z.union([z.string(), finite]).nullable(),
  tolerance: finite.nullable(),
  note: z.string(),
  milliseconds: finite,
})

/**
 * A certificate: self-contained JSON. `vertices` are in normal form, and all indices refer to `points` on the
 * canonical representative of the class, to which `heights` have been carried.
 */
export const certificateSchema = z.strictObject({
  schema: z.literal('tessellary.certificate/1'),
  engineVersion: z.string(),
  certifierVersion: z.string(),
  polytopeKey: key,
  candidateKey: key,
  scoringHash: hash.nullable(),
  rule: z.string().nullable(),
  vertices: z.array(point),
  points: z.array(point),
  heights: z.array(int),
  /** True when the heights handed in tied somewhere and others in general position inside the class were taken. */
  heightsReplaced: z.boolean(),
  caution: z.string(),
  units: z.string(),
  passed: z.boolean(),
  checks: z.array(check),
  notCertified: z.array(z.strictObject({ what: z.string(), why: z.string() })),
  numbers,
})

export type Certificate = z.infer<typeof certificateSchema>
export type CertificateNumbers = z.infer<typeof numbers>
