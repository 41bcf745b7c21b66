import { z } from 'zod'

/** Permanent address of a candidate. */
export const candidateKeySchema = z.string().regex(/^[0-9a-f]{32}$/)
