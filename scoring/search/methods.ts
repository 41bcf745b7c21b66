import { annealing } from './annealing.ts'
import { auto } from './auto.ts'
import { exhaustive } from './exhaustive.ts'
import { genetic } from './genetic.ts'
import { lineSearch } from './lines/lineSearch.ts'
import type { Method } from './method.ts'
import { lawOfState, lawText } from './nullLaws.ts'
import { randomSampling } from './randomSampling.ts'
import type { Json } from './state.ts'
import { tempering } from './tempering.ts'
import { uniformWalk } from './uniformWalk.ts'

/** Every search method. A new one is a file of its own and a line here. */
export const methods = {
  auto,
  annealing,
  tempering,
  genetic,
  lines: lineSearch,
  exhaustive,
  uniform: uniformWalk,
  random: randomSampling,
} as const satisfies Record<string, Method>

export type MethodName = keyof typeof methods

export const methodNames = Object.keys(methods) as MethodName[]

export const isMethodName = (name: string): name is MethodName => Object.hasOwn(methods, name)

/** False for a method that makes nothing of the candidates it is given to begin from. */
export function usesStarts(name: string): boolean {
  return isMethodName(name) && (methods[name] as Method).ignoresStarts !== true
}

/**
 * The law by which a method draws its candidates, in words; null for a guided search, which is no sample.
 *
 * @param chain the state of the method's chain
 */
export function lawOf(name: MethodName, chain: Json): string | null {
  if (name === 'random') return lawText(lawOfState(chain))
  const { law }: Method = methods[name]
  return law === undefined ? null : `${law.name}: ${law.description}`
}
