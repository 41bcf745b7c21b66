/**
 * Memory of a run of a million evaluations: a rule on topology, on a polytope with far more than ten million classes.
 * Prints heap (after a collection), size of the state, and speed at 1e5, 3e5 and 1e6 evaluations of one headless island,
 * handed from segment to segment as JSON text, as the server does. By hand:
 *
 *     node --expose-gc --import tsx tests/long/millionEvaluations.ts [--evaluations N] [--polytope ID] [--method NAME]
 *
 * Ends with status 1 when heap or state grow by more than a tenth between the last two.
 */
import { parseArgs } from 'node:util'
import { isMethodName } from '../../scoring/search/methods.ts'
import { JobSession, segmentJob } from '../../scoring/search/jobs.ts'
import type { SearchState } from '../../scoring/search/state.ts'
import { bundledEntry } from '../scoring/search/problems.ts'

const { values } = parseArgs({
  options: {
    evaluations: { type: 'string', default: '1000000' },
    polytope: { type: 'string', default: 'w50-7-newton-2-2-3-3-7' },
    method: { type: 'string', default: 'annealing' },
  },
})
const most = Number(values.evaluations)
const { method } = values
if (!isMethodName(method)) throw new Error(`There is no method ${method}.`)
const collect = globalThis.gc
if (!collect) throw new Error('Start with --expose-gc.')

const polytopes = [bundledEntry(values.polytope)]
const session = new JobSession()
const marks = [most / 10, (3 * most) / 10, most]
const rows: { evaluations: number; heapMegabytes: number; stateKilobytes: number }[] = []

let text: string | null = null
const begun = performance.now()
for (let done = 0, ended = false; !ended && rows.length < marks.length;) {
  const from = performance.now()
  const output = segmentJob(
    {
      polytopes,
      ruleText: 'score count(t in triples : t.number >= 2) + 0.01 * count(d in divisors : d.rigid)',
      method,
      settings: { budget: most, islands: 1, keep: 100 },
      seed: 1,
      island: 0,
      evaluations: marks[rows.length] - done,
      state: text === null ? null : (JSON.parse(text) as SearchState),
    },
    session,
    () => performance.now() - from > 1_000,
  )
  if ('error' in output) throw new Error(output.error.message)
  text = JSON.stringify(output.state)
  done = output.progress.evaluations
  ended = output.progress.done && done < most
  if (ended) process.stdout.write(`ended after ${done}: ${output.progress.ended}\n`)
  if (done < marks[rows.length] && !ended) continue
  collect()
  const row = {
    evaluations: done,
    heapMegabytes: process.memoryUsage().heapUsed / 1e6,
    stateKilobytes: text.length / 1e3,
  }
  rows.push(row)
  const rate = (done / (performance.now() - begun)) * 1000
  process.stdout.write(
    `${done} evaluations: heap ${row.heapMegabytes.toFixed(1)} MB, state ${row.stateKilobytes.toFixed(0)} kB, ` +
      `${rate.toFixed(0)} a second\n`,
  )
}
const [, before, last] = rows
const grew = (a: number, b: number) => b > 1.1 * a
process.exit(
  !last || grew(before.heapMegabytes, last.heapMegabytes) || grew(before.stateKilobytes, last.stateKilobytes)
    ? 1
    : 0,
)
