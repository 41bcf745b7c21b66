import { z } from 'zod'
import { assemblyCountsSchema, assemblySchema } from './assemblies.ts'
import { assigneeSchema } from './assignments.ts'
import { certificateMarkSchema } from './certificates.ts'
import { externalColumnSchema, externalValueSchema } from './externalTables.ts'
import { scoredRowSchema } from './outcomes.ts'
import { earlierIssueSchema, laterIssueSchema } from './reissues.ts'
import { verdictSchema } from './verdicts.ts'

const sourcesSchema = z.object({
  searchIds: z.array(z.string()).min(1).max(20),
  /** By which the candidates are ranked; absent: the one version with which all the searches ran. */
  targetVersionId: z.string().optional(),
})

/**
 * POST /api/campaigns/:campaign/shortlists: a list drawn from the finds of searches. Under a version by which not all of them
 * have been scored it is refused with `needs-scoring`: ask for a re-scoring instead.
 */
export const createShortlistSchema = assemblySchema.extend({
  ...sourcesSchema.shape,
  name: z.string().trim().min(1).max(80),
})
export type CreateShortlist = z.input<typeof createShortlistSchema>

/** POST /api/campaigns/:campaign/shortlists/draft: what such a list would be. */
export const draftShortlistSchema = assemblySchema.extend(sourcesSchema.shape)
export type DraftShortlist = z.infer<typeof draftShortlistSchema>

export const shortlistDraftSchema = z.object({
  targetVersionId: z.string(),
  /** Report columns of the version, in its order. */
  columns: z.array(z.string()),
  /** Different candidates among the finds, and how many of them have a score under the version. */
  distinct: z.number().int(),
  scored: z.number().int(),
  /** null while not all are scored: then only a re-scoring can tell. */
  counts: assemblyCountsSchema.nullable(),
  size: z.number().int(),
  /** The first of the list. */
  best: z.array(scoredRowSchema.extend({ polytopeName: z.string(), front: z.number().int().nullable() })),
})
export type ShortlistDraft = z.infer<typeof shortlistDraftSchema>

export const shortlistSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  targetId: z.string(),
  targetName: z.string(),
  targetVersion: z.number().int(),
  targetVersionId: z.string(),
  size: z.number().int(),
  undecided: z.number().int(),
  verified: z.number().int(),
  rejected: z.number().int(),
  /** Of the undecided ones, those verified by the first of two readers. */
  oneReader: z.number().int(),
  /** To whom undecided candidates are assigned, and how many. */
  waiting: z.array(assigneeSchema.extend({ open: z.number().int() })),
  /** Counts along a chain of issues, from 1. */
  issue: z.number().int(),
  /** The list that it is a newer issue of. */
  reissueOfId: z.string().nullable(),
  createdAt: z.string(),
  author: z.string(),
})
export type ShortlistSummary = z.infer<typeof shortlistSummarySchema>

/** The null sample that a search was compared with, as it was then. */
const frozenNullSchema = z.object({
  law: z.string(),
  seed: z.number().int(),
  size: z.number().int(),
  evaluated: z.number().int(),
  best: z.number().nullable(),
})

/** What a list was made from, as it was then; never changed afterwards. */
export const shortlistProvenanceSchema = z.object({
  assembly: assemblySchema,
  counts: assemblyCountsSchema,
  searches: z.array(
    z.object({
      id: z.string(),
      name: z.string(),
      method: z.string(),
      seed: z.number().int(),
      islands: z.number().int(),
      state: z.string(),
      /** Distinct classes scored when the list was made, of the budget. */
      evaluations: z.number().int(),
      budget: z.number().int(),
      polytopes: z.number().int(),
      targetName: z.string(),
      targetVersion: z.number().int(),
      /** What it searched by, where that is not the list's own rule; else null. */
      rule: z.string().nullable(),
      scoringHash: z.string(),
      engineVersion: z.string(),
      null: frozenNullSchema.nullable(),
    }),
  ),
  /** Rows that were taken out by hand in this and earlier issues; absent for none. */
  takenOut: z.number().int().optional(),
  /** The list that was scored anew; null for one of searches or imports. */
  from: z
    .object({
      id: z.string(),
      name: z.string(),
      targetName: z.string(),
      targetVersion: z.number().int(),
      scoringHash: z.string(),
      engineVersion: z.string(),
      rule: z.string(),
      size: z.number().int(),
    })
    .nullable(),
})
export type ShortlistProvenance = z.infer<typeof shortlistProvenanceSchema>

export const shortlistRowSchema = scoredRowSchema.extend({
  rank: z.number().int(),
  /** Number of its Pareto front; null where the list is ranked by score. */
  front: z.number().int().nullable(),
  /** Its place in the list that was scored anew, or in the issue before; null where there is none. */
  previous: z
    .object({
      rank: z.number().int(),
      kind: z.enum(['feasible', 'infeasible', 'undefined']),
      score: z.number().nullable(),
    })
    .nullable(),
  /** Null for an imported candidate. */
  searchId: z.string().nullable(),
  polytopeName: z.string(),
  /** For the target; it may have been given for another version than the list's. */
  verdict: verdictSchema.nullable(),
  /** For the scoring of the target version under the present engine. */
  certificate: certificateMarkSchema,
  /** Who is to give a verdict. */
  assignee: assigneeSchema.nullable(),
  /** One per external column; null: the table has no value for the candidate. */
  external: z.array(externalValueSchema.nullable()),
})
export type ShortlistRow = z.infer<typeof shortlistRowSchema>

export const shortlistDetailSchema = shortlistSummarySchema.extend({
  rule: z.string(),
  scoringHash: z.string(),
  engineVersion: z.string(),
  /** Report columns in the rule's order. */
  columns: z.array(z.string()),
  searches: z.array(z.object({ id: z.string(), name: z.string(), seed: z.number().int() })),
  /** null for lists made before it was kept. */
  provenance: shortlistProvenanceSchema.nullable(),
  /** Lists made from this one by scoring it anew. */
  rescored: z.array(
    z.object({ id: z.string(), name: z.string(), targetName: z.string(), targetVersion: z.number().int() }),
  ),
  /** The issue before, and newer ones. */
  reissueOf: earlierIssueSchema.nullable(),
  reissues: z.array(laterIssueSchema),
  /** Columns that people brought along; no rule and no search can read them. */
  external: z.array(externalColumnSchema),
  rows: z.array(shortlistRowSchema),
})
export type ShortlistDetail = z.infer<typeof shortlistDetailSchema>
