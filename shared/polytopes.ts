import { z } from 'zod'
import {
  polytopeNumberNames,
  polytopeNumbers,
  type PolytopeNumberName,
  type RangeName,
} from './polytopeNumbers.ts'

export const polytopeKeySchema = z.string().regex(/^[0-9a-f]{32}$/)

/** A number that is computed after the polytope is stored; null until then. */
const later = z.number().nullable()

export const polytopeRowSchema = z.object({
  key: polytopeKeySchema,
  name: z.string(),
  /** Bundled with the application, or imported into a campaign. */
  origin: z.enum(['bundled', 'imported']),
  h11: z.number().int(),
  h21: z.number().int(),
  euler: z.number().int(),
  points: z.number().int(),
  vertices: z.number().int(),
  facets: z.number().int(),
  latticePoints: z.number().int(),
  dualLatticePoints: z.number().int(),
  favourable: z.boolean(),
  symmetryOrder: z.number().int(),
  edges: later,
  faces: later,
  edgePoints: later,
  facePoints: later,
  facetPoints: later,
  normalisedVolume: later,
  dualNormalisedVolume: later,
  planarSections: later,
  solidSections: later,
  nestedSections: later,
  rigidDivisors: later,
  splitDivisors: later,
  rigidComponents: later,
  rigidRank: later,
  /** Exact numbers of classes, before and modulo symmetry; null where they have not been counted. */
  classes: later,
  classOrbits: later,
  /** log10 of an upper bound on the number of classes. */
  classBound: later,
  weights: z.array(z.number().int()).nullable(),
  side: z.enum(['fan', 'newton']).nullable(),
})
export type PolytopeRow = z.infer<typeof polytopeRowSchema>

const boundOf = (name: PolytopeNumberName) => {
  const { signed, decimal } = polytopeNumbers[name]
  const number = decimal ? z.coerce.number() : z.coerce.number().int()
  return (signed ? number : number.min(0)).optional()
}

/** A range per number of the library, as `h11Min` and `h11Max`. */
const ranges = Object.fromEntries(
  polytopeNumberNames.flatMap((name) => [
    [`${name}Min`, boundOf(name)],
    [`${name}Max`, boundOf(name)],
  ]),
) as Record<RangeName, ReturnType<typeof boundOf>>

const yesOrNo = z.enum(['yes', 'no']).optional()

/** Query of GET /api/polytopes and /api/polytopes/hodge; also the filter form of a scope. */
export const polytopeFilterSchema = z.object({
  ...ranges,
  favourable: yesOrNo,
  /** Rigid divisors, components included, span all of H^{1,1}. */
  rigidBasis: yesOrNo,
  /** Some two-dimensional reflexive section is this one of the 16 polygons, F1 to F16. */
  fibre: z.coerce.number().int().min(1).max(16).optional(),
  /** Made from a weight system. */
  weighted: yesOrNo,
  origin: z.enum(['bundled', 'imported']).optional(),
  /** Part of a name, the beginning of a key, or five weights. */
  text: z.string().max(80).optional(),
  /** A collection of the campaign, or a published one. */
  collection: z.string().max(40).optional(),
})
export type PolytopeFilter = z.infer<typeof polytopeFilterSchema>
export const filterNames = Object.keys(polytopeFilterSchema.shape) as (keyof PolytopeFilter)[]

export const polytopeQuerySchema = polytopeFilterSchema.extend({
  /** Campaign whose imports are shown beside the bundled polytopes. */
  campaign: z.string().optional(),
  sort: z.enum(['name', ...polytopeNumberNames]).default('h11'),
  order: z.enum(['asc', 'desc']).default('asc'),
  offset: z.coerce.number().int().min(0).default(0),
  limit: z.coerce.number().int().min(1).max(500).default(100),
})

export const polytopePageSchema = z.object({ total: z.number().int(), rows: z.array(polytopeRowSchema) })

/** GET /api/polytopes/hodge: how many polytopes stand at each pair of Hodge numbers. */
export const hodgeCountsSchema = z.object({
  total: z.number().int(),
  counts: z.array(z.object({ h11: z.number().int(), h21: z.number().int(), count: z.number().int() })),
  /** The bundled library is loaded in the background at first start. */
  loading: z.object({ loaded: z.number().int(), total: z.number().int() }).nullable(),
  /** Polytopes stored before some number of the library was known: it is computed in the background. */
  undescribed: z.number().int(),
})

export const twoFaceSchema = z.object({
  dualLength: z.number().int(),
  /** Indices into `points`. */
  points: z.array(z.number().int()),
  /** Plane lattice coordinates of those points. */
  plane: z.array(z.tuple([z.number().int(), z.number().int()])),
  corners: z.array(z.number().int()),
  area: z.number().int(),
})

/** GET /api/polytopes/:key. Coordinates are those of the normal form. */
export const polytopeDetailSchema = polytopeRowSchema.extend({
  pointCoordinates: z.array(z.array(z.number().int()).length(4)),
  carrierDimension: z.array(z.number().int()),
  components: z.array(z.number().int()),
  facetNormals: z.array(z.array(z.number().int()).length(4)),
  twoFaces: z.array(twoFaceSchema),
  /** Key of the dual polytope when it is in the library. */
  mirrorKey: polytopeKeySchema.nullable(),
})
export type PolytopeDetail = z.infer<typeof polytopeDetailSchema>

export const pastedLimitBytes = 2_000_000
export const uploadLimitBytes = 20_000_000

/** POST /api/campaigns/:campaign/polytopes */
export const importTextSchema = z.object({
  text: z.string().max(pastedLimitBytes),
  name: z.string().max(80).optional(),
})

/** POST /api/campaigns/:campaign/polytopes/weights */
export const importWeightsSchema = z.object({
  weights: z.array(z.number().int()).length(5),
  side: z.enum(['fan', 'newton']),
  name: z.string().max(80).optional(),
})

/** POST /api/campaigns/:campaign/polytopes/weight-lines: five weights a line. */
export const importWeightLinesSchema = z.object({
  text: z.string().max(pastedLimitBytes),
  side: z.enum(['fan', 'newton']),
})

export const importReportSchema = z.object({
  imported: z.array(
    z.object({
      line: z.number().int().nullable(),
      key: polytopeKeySchema,
      name: z.string(),
      h11: z.number().int(),
      h21: z.number().int(),
      /** Already in the library (bundled, or imported by this campaign). */
      known: z.boolean(),
    }),
  ),
  problems: z.array(
    z.object({
      line: z.number().int().nullable(),
      code: z.string(),
      message: z.string(),
      path: z.string().optional(),
    }),
  ),
})
export type ImportReport = z.infer<typeof importReportSchema>

/** What a search, preview or null sample draws its candidates from. */
export const scopeSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('polytopes'), keys: z.array(polytopeKeySchema).min(1).max(500) }),
  z.object({ kind: z.literal('filter'), filter: polytopeFilterSchema }),
  z.object({
    kind: z.literal('collection'),
    collection: z.string().min(1).max(40),
    /** For people; the server writes the collection's name here when a search is made. */
    name: z.string().max(80).optional(),
  }),
])
export type Scope = z.infer<typeof scopeSchema>

/** POST /api/campaigns/:campaign/scope: how many polytopes a scope holds, and how large they are. */
export const scopeSummarySchema = z.object({
  count: z.number().int(),
  h11Min: z.number().int().nullable(),
  h11Max: z.number().int().nullable(),
  pointsMax: z.number().int().nullable(),
})
export const maximumScope = 10_000
