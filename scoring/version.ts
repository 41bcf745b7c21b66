/**
 * Version of the engine: part of every scoring hash. Raised whenever a value of some candidate changes, even in
 * its last bit; values under another version are never re-used.
 */
export const engineVersion = '3'
