import { afterEach, beforeEach, expect } from 'vitest'

/** Whatever a test prints through the console fails it: noise hides real trouble. */
const noise: string[] = []
const methods = ['log', 'info', 'warn', 'error', 'debug'] as const

beforeEach(() => {
  noise.length = 0
  for (const method of methods) {
    console[method] = (...args: unknown[]) => {
      noise.push(`console.${method}: ${args.map(String).join(' ')}`)
    }
  }
})

afterEach(() => {
  expect(noise, 'console noise').toEqual([])
})
