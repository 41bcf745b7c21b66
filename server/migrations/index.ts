import { FirstSchema1796100000000 } from './1796100000000-firstSchema.ts'

/** In order. A migration that has been released is never edited. */
export const migrations = [FirstSchema1796100000000]
