import { z } from 'zod'
import { shortlistLimit } from './assemblies.ts'
import { candidateKeySchema } from './keys.ts'

/** POST /api/campaigns/:campaign/assignments: hands candidates to somebody who gives verdicts, or to nobody. */
export const assignSchema = z.object({
  targetId: z.string(),
  candidateKeys: z.array(candidateKeySchema).min(1).max(shortlistLimit),
  /** A member whose role gives verdicts; null: nobody in particular. */
  accountId: z.string().nullable(),
})
export type Assign = z.infer<typeof assignSchema>

/** Who is to give a verdict on a candidate for a target. */
export const assigneeSchema = z.object({ id: z.string(), name: z.string() })
export type Assignee = z.infer<typeof assigneeSchema>

export const assignedSchema = z.object({
  targetId: z.string(),
  candidateKeys: z.array(candidateKeySchema),
  assignee: assigneeSchema.nullable(),
})
export type Assigned = z.infer<typeof assignedSchema>
