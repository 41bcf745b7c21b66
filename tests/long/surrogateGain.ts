/**
 * What the surrogate gains: guided searches with and without it, on the same seeds. Prints, per task and method, the
 * medians over seeds of the evaluations to pass the null's 99.9 % quantile and to reach its best, the best scores at
 * equal evaluations, with how many seeds it was ahead, the skill, and processor seconds. By hand:
 *
 *     nice node --import tsx tests/long/surrogateGain.ts [--task NAME] [--method NAME] [--seeds N] [--budget N] [--null N]
 */
import { parseArgs } from 'node:util'
import { advance, startState } from '../../scoring/search/advance.ts'
import { OutcomeMemo } from '../../scoring/search/memo.ts'
import { compareMerits, feasibleKind, meritOf, type Merit } from '../../scoring/search/merit.ts'
import type { MethodName } from '../../scoring/search/methods.ts'
import type { PolytopeSource } from '../../scoring/search/polytopeSource.ts'
import { Surrogate } from '../../scoring/search/surrogate/surrogate.ts'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'
import { problemOf } from '../scoring/search/problems.ts'

const { values } = parseArgs({
  options: {
    task: { type: 'string' },
    method: { type: 'string', default: 'annealing' },
    seeds: { type: 'string', default: '10' },
    budget: { type: 'string', default: '400' },
    null: { type: 'string', default: '3000' },
  },
})
const [seeds, budget, nullSize] = [values.seeds, values.budget, values.null].map(Number)
const method = values.method as MethodName

const fourth = bundledPolytopes('small').filter(({ h11 }) => h11 === 4)
const tasks: Record<string, readonly string[]> = {
  '50-7': ['w50-7-newton-2-2-3-3-7'],
  '100-10': ['w100-10-newton-1-2-5-5-13'],
  'h11-4': fourth.map(({ id }) => id),
}
const rule = 'score log10(metric.divisor.top)'

const print = (line: string): boolean => process.stdout.write(`${line}\n`)
const median = (list: readonly number[]): number => [...list].sort((a, b) => a - b)[list.length >> 1]
const shown = (n: number): string => (n === Infinity ? `> ${budget}` : String(n))

/** Best scores after so many evaluations. */
const marks = [...new Set([50, 100, 200, budget])].filter((mark) => mark <= budget)

interface Outing {
  readonly toHigh: number
  readonly toBest: number
  readonly bests: readonly number[]
  readonly skill: number
  readonly chosen: number
  readonly proposals: number
}

for (const [name, ids] of Object.entries(tasks)) {
  if (values.task !== undefined && values.task !== name) continue
  const memo = new OutcomeMemo(100_000)
  const merits: Merit[] = []
  const sample = problemOf(ids, rule, 'random', { budget: nullSize, sample: 0 })
  // All runs share the polytopes in normal form.
  const polytopes: PolytopeSource = sample.polytopes
  advance(sample, startState(sample, 2 ** 20), Infinity, {
    memo,
    observe: ({ outcome }) => merits.push(meritOf(outcome)),
  })
  merits.sort(compareMerits)
  const high = merits[Math.floor(merits.length / 1000)]
  print(
    `${name}: ${rule}; null of ${merits.length}: best ${merits[0].value.toFixed(4)}, 99.9 % ` +
      `${high.value.toFixed(4)}; ${method}, ${seeds} seeds, budget ${budget}`,
  )
  const outings: Outing[][] = []
  for (const surrogate of [false, true]) {
    const begun = process.cpuUsage().user
    outings.push(
      Array.from({ length: seeds }, (_, n) => {
        const problem = { ...problemOf([ids[0]], rule, method, { budget, surrogate }), polytopes }
        let [count, toHigh, toBest, best] = [0, Infinity, Infinity, -Infinity]
        const bests: number[] = []
        const { state } = advance(problem, startState(problem, n + 1), Infinity, {
          memo,
          observe: ({ outcome }) => {
            count++
            const merit = meritOf(outcome)
            if (toHigh === Infinity && compareMerits(merit, high) < 0) toHigh = count
            if (toBest === Infinity && compareMerits(merit, merits[0]) <= 0) toBest = count
            if (merit.kind === feasibleKind) best = Math.max(best, merit.value)
            if (marks.includes(count)) bests.push(best)
          },
        })
        const skill = state.surrogate === null ? 0 : (new Surrogate(state.surrogate).skill ?? 0)
        return {
          toHigh,
          toBest,
          bests,
          skill,
          chosen: state.surrogate?.chosen ?? 0,
          proposals: state.proposals,
        }
      }),
    )
    const of = outings[outings.length - 1]
    const seconds = (process.cpuUsage().user - begun) / 1e6
    const bestsAt = marks.map(
      (mark, m) => `at ${mark}: ${median(of.map(({ bests }) => bests[m])).toFixed(4)}`,
    )
    print(
      `  ${surrogate ? 'with   ' : 'without'} past 99.9 %: ${shown(median(of.map(({ toHigh }) => toHigh))).padStart(5)}  ` +
        `best of null: ${shown(median(of.map(({ toBest }) => toBest))).padStart(5)}  ${bestsAt.join('  ')}  ` +
        `skill ${median(of.map(({ skill }) => skill)).toFixed(2)}  chosen ${median(of.map(({ chosen }) => chosen))} ` +
        `of ${median(of.map(({ proposals }) => proposals))} proposals  ${seconds.toFixed(1)} s`,
    )
  }
  const [without, with_] = outings
  const ahead = marks.map((_, m) => with_.filter(({ bests }, n) => bests[m] > without[n].bests[m]).length)
  const behind = marks.map((_, m) => with_.filter(({ bests }, n) => bests[m] < without[n].bests[m]).length)
  print(
    `  ahead in ${ahead.join(', ')} seeds, behind in ${behind.join(', ')}, at ${marks.join(', ')} evaluations`,
  )
}
