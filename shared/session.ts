import { z } from 'zod'

export const accountSchema = z.object({ id: z.string(), name: z.string(), email: z.string() })
export type Account = z.infer<typeof accountSchema>

/** GET, POST and DELETE /api/session. */
export const sessionSchema = z.object({ account: accountSchema.nullable(), version: z.string() })
export type Session = z.infer<typeof sessionSchema>

export const signInSchema = z.object({ email: z.email().max(200), password: z.string().min(1).max(200) })

/** POST /api/setup: the one-time link of a new account. */
export const setUpAccountSchema = z.object({
  token: z.string().min(20).max(200),
  name: z.string().trim().min(1).max(80),
  password: z.string().min(12, 'at least 12 characters').max(200),
})
