import { z } from 'zod'

/** A located message about a rule; offsets count UTF-16 units, `line` and `column` count from 1. */
export const ruleIssueSchema = z.object({
  code: z.string(),
  message: z.string(),
  severity: z.enum(['error', 'warning']),
  from: z.number().int(),
  to: z.number().int(),
  line: z.number().int(),
  column: z.number().int(),
  expected: z.string().optional(),
  found: z.string().optional(),
  suggestion: z
    .object({ label: z.string(), from: z.number().int(), to: z.number().int(), insert: z.string() })
    .optional(),
})

/** A mistake in a table, with its place: line, and number of the cell in it, from 1. */
export const placedProblemSchema = z.object({
  line: z.number().int(),
  column: z.number().int(),
  code: z.string(),
  message: z.string(),
})
export type PlacedProblem = z.infer<typeof placedProblemSchema>

/** Body of every error answer (application/problem+json, RFC 9457, with a stable `code`). */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  detail: z.string(),
  path: z.string().optional(),
  found: z.unknown().optional(),
  issues: z.array(ruleIssueSchema).optional(),
  places: z.array(placedProblemSchema).optional(),
})
export type Problem = z.infer<typeof problemSchema>
