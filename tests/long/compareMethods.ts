/**
 * Compares search methods with random candidates: on one polytope, (h11, h21) = (50, 7), and on a scope of many.
 * Prints, per method, the medians over seeds of the distinct evaluations until the null's 99.9 % quantile is passed
 * and until the best of the null sample is reached, and the median best score at equal evaluations. By hand:
 *
 *     nice node --import tsx tests/long/compareMethods.ts [--seeds N] [--budget N] [--null N] [--task NAME]
 *
 * Outcomes are shared among the runs of a task, which spares time and alters no result.
 */
import { parseArgs } from 'node:util'
import { advance, startState } from '../../scoring/search/advance.ts'
import { OutcomeMemo } from '../../scoring/search/memo.ts'
import { compareMerits, feasibleKind, meritOf, type Merit } from '../../scoring/search/merit.ts'
import type { MethodName } from '../../scoring/search/methods.ts'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'
import { problemOf } from '../scoring/search/problems.ts'

const { values } = parseArgs({
  options: {
    seeds: { type: 'string', default: '5' },
    budget: { type: 'string', default: '400' },
    null: { type: 'string', default: '3000' },
    task: { type: 'string' },
  },
})
const [seeds, budget, nullSize] = [values.seeds, values.budget, values.null].map(Number)

interface Task {
  readonly ids: readonly string[]
  readonly rule: string
  readonly methods: readonly MethodName[]
}

/** 40 polytopes with h11 = 5 and the bundled ones with h11 from 12 to 20. */
const many = [
  ...bundledPolytopes('h11-5')
    .filter((_, n) => n % 120 === 0)
    .map(({ id }) => id),
  ...bundledPolytopes('large')
    .filter(({ h11 }) => h11 >= 12 && h11 <= 20)
    .map(({ id }) => id),
]

const guided: readonly MethodName[] = ['auto', 'annealing', 'tempering', 'genetic', 'random']
const tasks: Record<string, Task> = {
  one: { ids: ['w50-7-newton-2-2-3-3-7'], rule: 'score log10(metric.divisor.top)', methods: guided },
  many: {
    ids: many,
    rule: 'at volume 100 require h11 >= 5 score log10(metric.divisor.top)',
    methods: guided,
  },
}

const print = (line: string): boolean => process.stdout.write(`${line}\n`)
const median = (list: readonly number[]): number => [...list].sort((a, b) => a - b)[list.length >> 1]
const shown = (n: number): string => (n === Infinity ? `> ${budget}` : String(n))

for (const [name, { ids, rule, methods }] of Object.entries(tasks)) {
  if (values.task !== undefined && values.task !== name) continue
  const memo = new OutcomeMemo(100_000)
  const merits: Merit[] = []
  const sample = problemOf(ids, rule, 'random', { budget: nullSize, sample: 0 })
  advance(sample, startState(sample, 2 ** 20), Infinity, {
    memo,
    observe: ({ outcome }) => merits.push(meritOf(outcome)),
  })
  merits.sort(compareMerits)
  const high = merits[Math.floor(merits.length / 1000)]
  print(
    `${name}: ${ids.length} polytopes, ${rule}; null of ${merits.length}: best ${merits[0].value.toFixed(4)}, ` +
      `99.9 % ${high.value.toFixed(4)}; ${seeds} seeds, budget ${budget}`,
  )
  for (const method of methods) {
    const begun = process.cpuUsage().user
    const [toHigh, toBest, atHundred, atEnd]: number[][] = [[], [], [], []]
    for (let seed = 1; seed <= seeds; seed++) {
      const problem = problemOf(ids, rule, method, { budget })
      let [count, passed, reached, best] = [0, Infinity, Infinity, -Infinity]
      let early = -Infinity
      advance(problem, startState(problem, seed), Infinity, {
        memo,
        observe: ({ outcome }) => {
          count++
          const merit = meritOf(outcome)
          if (passed === Infinity && compareMerits(merit, high) < 0) passed = count
          if (reached === Infinity && compareMerits(merit, merits[0]) <= 0) reached = count
          if (merit.kind === feasibleKind) best = Math.max(best, merit.value)
          if (count === 100) early = best
        },
      })
      toHigh.push(passed)
      toBest.push(reached)
      atHundred.push(early)
      atEnd.push(best)
    }
    const seconds = (process.cpuUsage().user - begun) / 1e6
    print(
      `  ${method.padEnd(10)} past 99.9 %: ${shown(median(toHigh)).padStart(6)}   best of null: ` +
        `${shown(median(toBest)).padStart(6)}   at 100: ${median(atHundred).toFixed(4)}   at ${budget}: ` +
        `${median(atEnd).toFixed(4)}   ${seconds.toFixed(1)} s`,
    )
  }
}
