import { z } from 'zod'

/** GET /api/campaigns/:campaign/shortlist-views?shortlist=ID: those of a list, and those for every list. */
export const viewsQuerySchema = z.object({ shortlist: z.string() })

/** The parts of an address that make a view: filters, order and columns, as the page writes them. */
const addressSchema = z.string().max(4000)

export const shortlistViewSchema = z.object({
  id: z.string(),
  name: z.string(),
  address: addressSchema,
  /** null: for every list of the campaign. */
  shortlistId: z.string().nullable(),
  authorId: z.string(),
  author: z.string(),
  createdAt: z.string(),
})
export type ShortlistViewRecord = z.infer<typeof shortlistViewSchema>

/** POST /api/campaigns/:campaign/shortlist-views */
export const saveViewSchema = z.object({
  name: z.string().trim().min(1).max(60),
  address: addressSchema,
  shortlistId: z.string().nullable(),
})
export type SaveView = z.input<typeof saveViewSchema>

/** PATCH /api/campaigns/:campaign/shortlist-views/:view, by its author or a lead. */
export const editViewSchema = saveViewSchema.pick({ name: true, address: true }).partial()
export type EditView = z.infer<typeof editViewSchema>
