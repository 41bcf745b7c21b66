import { z } from 'zod'
import { roleSchema } from './roles.ts'
import { searchSummarySchema } from './searches.ts'
import { shortlistSummarySchema } from './shortlists.ts'
import { targetSummarySchema } from './targets.ts'

export const campaignSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  description: z.string(),
  role: roleSchema,
  /** Whether "verified" needs two people. */
  secondReader: z.boolean(),
  targets: z.number().int(),
  searches: z.number().int(),
  runningSearches: z.number().int(),
  shortlists: z.number().int(),
  undecided: z.number().int(),
})
export type CampaignSummary = z.infer<typeof campaignSummarySchema>

export const campaignMemberSchema = z.object({
  accountId: z.string(),
  name: z.string(),
  email: z.string(),
  role: roleSchema,
})

/** GET /api/campaigns/:campaign */
export const campaignDetailSchema = campaignSummarySchema.extend({
  members: z.array(campaignMemberSchema),
  targetList: z.array(targetSummarySchema),
  searchList: z.array(searchSummarySchema),
  shortlistList: z.array(shortlistSummarySchema),
})
export type CampaignDetail = z.infer<typeof campaignDetailSchema>

export const createCampaignSchema = z.object({
  name: z.string().trim().min(1).max(80),
  description: z.string().trim().max(1000).default(''),
})
export const editCampaignSchema = createCampaignSchema
  .partial()
  .extend({ secondReader: z.boolean().optional() })
/** POST /api/campaigns/:campaign/members: an existing account, by e-mail address. */
export const addMemberSchema = z.object({ email: z.email().max(200), role: roleSchema })
export const editMemberSchema = z.object({ role: roleSchema })
