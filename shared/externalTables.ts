import { z } from 'zod'

/** Limits of a table of external columns. */
export const externalLimits = {
  bytes: 5_000_000,
  rows: 20_000,
  columns: 40,
  nameLength: 60,
  textLength: 500,
} as const

export const externalTypes = ['number', 'text'] as const
export const externalValueSchema = z.union([z.number(), z.string()])
export type ExternalValue = z.infer<typeof externalValueSchema>

/**
 * POST /api/campaigns/:campaign/external-tables: comma-separated values keyed by candidate. The first line names the
 * columns, the first of them `candidate`; a column is a number where every cell that is not empty is one, else text.
 * `#` begins a line of remarks.
 */
export const uploadExternalSchema = z.object({
  /** What the table is called, its file's name as a rule. */
  name: z.string().trim().min(1).max(120),
  /** Shown in this list only; absent: in every list of the campaign. */
  shortlistId: z.string().optional(),
  /** A table that the new one takes the place of. */
  replaces: z.string().optional(),
  /** Columns that are to be text although they look like numbers. */
  asText: z.array(z.string()).max(externalLimits.columns).default([]),
  text: z.string().max(externalLimits.bytes),
})
export type UploadExternal = z.input<typeof uploadExternalSchema>

const columnSchema = z.object({ name: z.string(), type: z.enum(externalTypes) })

export const externalTableSchema = z.object({
  id: z.string(),
  name: z.string(),
  /** null: every list of the campaign shows it. */
  shortlistId: z.string().nullable(),
  columns: z.array(columnSchema),
  rows: z.number().int(),
  author: z.string(),
  createdAt: z.string(),
})
export type ExternalTable = z.infer<typeof externalTableSchema>

/** A column as a list shows it: brought along by a person, marked as such everywhere. */
export const externalColumnSchema = columnSchema.extend({
  tableId: z.string(),
  tableName: z.string(),
  author: z.string(),
  createdAt: z.string(),
})
export type ExternalColumn = z.infer<typeof externalColumnSchema>

export const externalTablesQuerySchema = z.object({
  /** Those that this list shows; absent: all of the campaign. */
  shortlist: z.string().optional(),
})
