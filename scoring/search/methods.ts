import { annealing } from './annealing.ts'
import { exhaustive } from './exhaustive.ts'
import type { Method } from './method.ts'
import { randomSampling } from './randomSampling.ts'

/** Every search method. A new one is a file of its own and a line here. */
export const methods = { annealing, exhaustive, random: randomSampling } as const satisfies Record<
  string,
  Method
>

export type MethodName = keyof typeof methods

export const methodNames = Object.keys(methods) as MethodName[]

export const isMethodName = (name: string): name is MethodName => Object.hasOwn(methods, name)
