/**
 * Searches a bundled polytope with several seeds and compares each with the best of as many null candidates, then
 * repeats the first search to see that it ends in the same bits. By hand, on two free cores:
 *
 *     node --import tsx tests/long/annealingAgainstNull.ts [--polytope ID] [--rule TEXT] [--budget N] [--seeds N]
 *
 * Ends with status 1 when fewer than nine tenths of the searches win, a search takes longer than 20 s, or the
 * repetition differs.
 */
import { availableParallelism } from 'node:os'
import { parseArgs } from 'node:util'
import { searchSpec } from '../../scoring/cli/searchSpec.ts'
import { runSearch, type SearchLine } from '../../scoring/cli/searchCommand.ts'
import { workerThreads } from '../../scoring/cli/threads.ts'
import { bundledEntry } from '../scoring/search/problems.ts'

const { values } = parseArgs({
  options: {
    polytope: { type: 'string', default: 'w50-7-newton-2-2-3-3-7' },
    rule: { type: 'string', default: 'score log10(metric.divisor.top)' },
    budget: { type: 'string', default: '2000' },
    seeds: { type: 'string', default: '10' },
  },
})
const budget = Number(values.budget)
const seeds = Number(values.seeds)
const threads = workerThreads(2)
const print = (line: string): boolean => process.stdout.write(`${line}\n`)

interface Final extends SearchLine {
  readonly progress: {
    readonly best: number
    readonly evaluations: number
    readonly curve: [number, number][]
  }
}

async function finalOf(method: string, seed: number): Promise<{ final: Final; seconds: number }> {
  const spec = searchSpec({
    schema: 'tessellary.search/1',
    scope: { polytopes: values.polytope.split('+').map((id) => ({ vertices: bundledEntry(id).vertices })) },
    rule: values.rule,
    method,
    budget,
    seed,
    islands: 2,
    keep: 20,
  })
  const lines: SearchLine[] = []
  const begun = performance.now()
  await runSearch(spec, { threads, print: (line) => lines.push(line) })
  return { final: lines[lines.length - 1] as Final, seconds: (performance.now() - begun) / 1000 }
}

const shown = (score: number | null): string => (score === null ? '-' : score.toFixed(3))

/** Best score after so many evaluations of both islands together. */
function after(curve: readonly [number, number][], evaluations: number): string {
  const reached = curve.filter(([at]) => at <= evaluations).at(-1)
  return shown(reached?.[1] ?? null)
}

print(`${availableParallelism()} cores; ${values.polytope}; ${values.rule}; ${budget} evaluations`)
// The threads compile once.
await finalOf('random', 999)
let won = 0
let slow = 0
let repeats = true
for (let seed = 1; seed <= seeds; seed++) {
  const search = await finalOf('annealing', seed)
  const random = await finalOf('random', seed)
  const { best, evaluations, curve } = search.final.progress
  if ((best ?? -Infinity) > (random.final.progress.best ?? -Infinity)) won++
  if (search.seconds > 20) slow++
  if (seed === 1) {
    repeats = JSON.stringify((await finalOf('annealing', seed)).final) === JSON.stringify(search.final)
  }
  print(
    `seed ${seed}: best ${shown(best)} of ${evaluations} in ${search.seconds.toFixed(1)} s ` +
      `(after 90: ${after(curve, 90)}, 300: ${after(curve, 300)}, 1000: ${after(curve, 1000)}); ` +
      `null ${shown(random.final.progress.best)} in ${random.seconds.toFixed(1)} s`,
  )
}
await threads.close()
print(`won ${won} of ${seeds}; slower than 20 s: ${slow}; repeats to the bit: ${repeats}`)
process.exitCode = won >= 0.9 * seeds && slow === 0 && repeats ? 0 : 1
