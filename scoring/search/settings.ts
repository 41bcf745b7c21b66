import { z } from 'zod'
import { heightCodeBytes } from './heightsCode.ts'
import { nullLawNames } from './nullLaws.ts'
import { seenSlotBytes } from './seenTable.ts'
import { surrogateStateBytes } from './surrogate/surrogate.ts'

/**
 * Settings of a run. They are part of what a result depends on, together with scope, rule, method, seed and
 * engine version; how a run is cut into segments or spread over threads is not.
 */
export const searchSettingsSchema = z.strictObject({
  /** Distinct evaluations over all islands. */
  budget: z.number().int().min(1).max(10_000_000),
  /** Independent chains; each has its share of the budget. */
  islands: z.number().int().min(1).max(64).default(1),
  /** How many of the best distinct candidates an island keeps. */
  keep: z.number().int().min(1).max(500).default(100),
  /** Proposals in a row without a new class after which a polytope counts as exhausted. */
  patience: z.number().int().min(10).max(1_000_000).default(2000),
  /** Annealing: fresh starts among which an island's budget is divided. */
  descents: z.number().int().min(1).max(1000).default(1),
  /** Rows of the uniform sample of all evaluations that an island keeps. */
  sample: z.number().int().min(0).max(10_000).default(256),
  /** A surrogate chooses among proposals of the guided methods, where the rule needs a reference point. */
  surrogate: z.boolean().default(false),
  /** Random sampling: the law of its draws; absent: the usual one. */
  law: z.enum(nullLawNames).optional(),
})
export type SearchSettings = z.infer<typeof searchSettingsSchema>

/** The part of the budget that belongs to one island: shares differ by one at most. */
export function islandBudget(
  { budget, islands }: Pick<SearchSettings, 'budget' | 'islands'>,
  island: number,
): number {
  return Math.floor(budget / islands) + (island < budget % islands ? 1 : 0)
}

/** What a state may weigh as JSON, per island. */
export const stateLimitBytes = 2_000_000

const mostSlots = 2 ** 16
const fewestSlots = 2 ** 8

/**
 * Slots of the table of classes seen: a power of two at least as large as wanted (twice the island's budget, so
 * that nothing is forgotten), within 2^16 and within what the kept candidates leave of `stateLimitBytes`.
 */
export function seenCapacity(wanted: number, settings: SearchSettings, pointCount: number): number {
  const keptBytes =
    settings.keep * (pointCount * heightCodeBytes + 600) +
    settings.sample * 120 +
    (settings.surrogate ? surrogateStateBytes : 0) +
    60_000
  let slots = fewestSlots
  while (slots < mostSlots && slots < wanted) slots *= 2
  while (slots > fewestSlots && slots * seenSlotBytes + keptBytes > stateLimitBytes) slots /= 2
  return slots
}
