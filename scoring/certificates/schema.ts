import { z } from 'zod'
import { catalogue } from '../certify/catalogue.ts'

const int = z.number().int()
const index = int.nonnegative()
const finite = z.number()
const point = z.tuple([int, int, int, int])
const key = z.string().regex(/^[0-9a-f]{32}$/, 'expected 32 hexadecimal digits')
/** A reflexive polytope in four dimensions has at most 36 vertices and 680 lattice points (Kreuzer, Skarke). */
const vertexLimit = 36
const pointLimit = 680
/** More than any of its triangulations has triangles, cones or intersection numbers. */
const rowLimit = 20_000
const perPoint = <T extends z.ZodType>(entry: T) => z.array(entry).max(pointLimit)
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
  carriers: perPoint(index),
  components: perPoint(index),
  dualInterior: perPoint(index),
  /** Triangles of the 2-face class, ascending, lexicographic order. */
  triangles: z.array(z.tuple([index, index, index])).max(rowLimit),
  /** Maximal cones of the fan that the heights give; null when they give none. */
  simplices: z
    .array(z.tuple([index, index, index, index]))
    .max(rowLimit)
    .nullable(),
  /** Non-zero [i, j, k, kappa_ijk], i <= j <= k. */
  intersections: z.array(z.tuple([index, index, index, int])).max(rowLimit),
  c2: perPoint(int),
  /** Reference point at scale 1: J = sum of weights[k] D_k. */
  reference: z.strictObject({ weights: perPoint(finite), edgeCurvesSuffice: z.boolean() }),
  volumes: z.strictObject({ total: finite, divisors: perPoint(finite) }),
  metric: z.strictObject({
    /** Largest eigenvalue as the fast road ranks by it. */
    top: finite,
    divisorSpectrum: perPoint(finite),
    basis: perPoint(index),
    basisSpectrum: perPoint(finite),
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
  vertices: z.array(point).max(vertexLimit),
  points: perPoint(point),
  heights: perPoint(int),
  /** True when the heights handed in tied somewhere and others in general position inside the class were taken. */
  heightsReplaced: z.boolean(),
  caution: z.string(),
  units: z.string(),
  passed: z.boolean(),
  checks: z.array(check).max(rowLimit),
  notCertified: z.array(z.strictObject({ what: z.string(), why: z.string() })),
  numbers,
})

export type Certificate = z.infer<typeof certificateSchema>
export type CertificateNumbers = z.infer<typeof numbers>
