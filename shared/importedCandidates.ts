import { z } from 'zod'
import { candidateKeySchema } from './keys.ts'
import { pastedLimitBytes, polytopeKeySchema } from './polytopes.ts'
import { verdictSchema } from './verdicts.ts'

export const orientations = ['rows', 'columns'] as const

/** What goes with a text; in an upload the fields beside the file. */
export const importOptionsSchema = z.object({
  /** Name for candidates that have none in the text; several get it with a number. */
  name: z.string().trim().max(80).optional(),
  /** How square matrices are to be read, when an earlier answer asked. */
  orientation: z.enum(orientations).optional(),
})

/** POST /api/campaigns/:campaign/imported-candidates */
export const importCandidatesSchema = importOptionsSchema.extend({
  text: z.string().max(pastedLimitBytes),
  /** What the person calls the text. */
  source: z.string().trim().max(120).optional(),
})

/** The latest word of the campaign on a candidate, per target. */
export const earlierVerdictSchema = verdictSchema.pick({
  value: true,
  override: true,
  readers: true,
  targetId: true,
  targetName: true,
  targetVersion: true,
})
export type EarlierVerdict = z.infer<typeof earlierVerdictSchema>

export const candidateImportReportSchema = z.object({
  /** The format that was recognised, in words. */
  format: z.string(),
  /** Nothing was imported yet: these matrices can be read by rows and by columns. Ask, and send the text again. */
  question: z
    .object({
      kind: z.literal('orientation'),
      matrices: z.array(z.object({ line: z.number().int(), what: z.string() })).min(1),
    })
    .nullable(),
  imported: z.array(
    z.object({
      line: z.number().int(),
      entry: z.string(),
      key: candidateKeySchema,
      name: z.string(),
      polytopeKey: polytopeKeySchema,
      polytopeName: z.string(),
      h11: z.number().int(),
      h21: z.number().int(),
      /** The polytope was in the library (bundled, or imported by this campaign) before. */
      polytopeKnown: z.boolean(),
      /** Imported before, or found by a search of this campaign; null: new to the campaign. */
      known: z.enum(['imported', 'found']).nullable(),
      verdicts: z.array(earlierVerdictSchema),
    }),
  ),
  problems: z.array(
    z.object({ line: z.number().int(), entry: z.string(), code: z.string(), message: z.string() }),
  ),
  /** Lines that are no data. */
  skipped: z.array(z.object({ line: z.number().int(), text: z.string() })),
})
export type CandidateImportReport = z.infer<typeof candidateImportReportSchema>

/** Query of GET /api/campaigns/:campaign/imported-candidates: newest first. */
export const importedCandidatesQuerySchema = z.object({
  /** In the name, the source, the polytope's name, or at the beginning of the key. */
  text: z.string().max(80).optional(),
  offset: z.coerce.number().int().min(0).default(0),
  limit: z.coerce.number().int().min(1).max(500).default(100),
})

export const importedCandidateSchema = z.object({
  key: candidateKeySchema,
  name: z.string(),
  source: z.string(),
  line: z.number().int(),
  author: z.string(),
  createdAt: z.string(),
  polytopeKey: polytopeKeySchema,
  polytopeName: z.string(),
  h11: z.number().int(),
  h21: z.number().int(),
  favourable: z.boolean(),
  verdicts: z.array(earlierVerdictSchema),
})
export type ImportedCandidate = z.infer<typeof importedCandidateSchema>

export const importedCandidatePageSchema = z.object({
  total: z.number().int(),
  rows: z.array(importedCandidateSchema),
})

/** POST /api/campaigns/:campaign/imported-candidates/shortlists: the best of them under a target version. */
export const shortlistImportedSchema = z.object({
  name: z.string().trim().min(1).max(80),
  targetVersionId: z.string(),
  /** Absent: all that the campaign imported. */
  candidateKeys: z.array(candidateKeySchema).min(1).max(5_000).optional(),
  size: z.number().int().min(1).max(500).default(500),
})
