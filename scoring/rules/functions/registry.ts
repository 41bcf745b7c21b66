import { logarithms } from './logarithms.ts'
import { magnitudes } from './magnitudes.ts'
import type { RuleFunction } from './ruleFunction.ts'
import { wholeNumbers } from './whole.ts'

/** Every function of the language, in the order of the reference. */
export const FUNCTIONS: readonly RuleFunction[] = [...logarithms, ...magnitudes, ...wholeNumbers]

const byName = new Map(FUNCTIONS.map((entry) => [entry.name, entry]))

/** The function of a name, or undefined. */
export const findFunction = (name: string): RuleFunction | undefined => byName.get(name)
