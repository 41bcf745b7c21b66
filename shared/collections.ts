import { z } from 'zod'
import { scopeSchema } from './polytopes.ts'

export const collectionSchema = z.object({
  id: z.string(),
  name: z.string(),
  description: z.string(),
  /** Belongs to the campaign in which it is read; others are read-only. */
  own: z.boolean(),
  campaignId: z.string(),
  campaignName: z.string(),
  /** When a lead made it readable for everybody; null: for the campaign alone. */
  publishedAt: z.string().nullable(),
  polytopes: z.number().int(),
  createdAt: z.string(),
  authorName: z.string(),
})
export type CollectionView = z.infer<typeof collectionSchema>

/** GET /api/collections */
export const collectionQuerySchema = z.object({ campaign: z.string().optional() })

/** What is put into a collection, or taken out of it. */
export const membersSchema = z.object({ scope: scopeSchema })

const nameSchema = z.string().trim().min(1).max(80)
const descriptionSchema = z.string().trim().max(500)

/** POST /api/campaigns/:campaign/collections: with what it holds at first, if anything. */
export const createCollectionSchema = z.object({
  name: nameSchema,
  description: descriptionSchema.default(''),
  scope: scopeSchema.optional(),
})

/** PATCH /api/campaigns/:campaign/collections/:collection */
export const editCollectionSchema = z.object({
  name: nameSchema.optional(),
  description: descriptionSchema.optional(),
})

/** Answer to putting in and taking out. */
export const membersChangedSchema = z.object({
  collection: collectionSchema,
  /** How many polytopes were put in or taken out; the others were there, or were not. */
  changed: z.number().int(),
})

/** Polytopes in one collection. */
export const collectionLimit = 10_000
