// Evaluations per second of annealing in this process alone, no server: what twoCores.ts compares with.
//     node --import tsx tests/long/bareEvaluations.ts RULE SECONDS SEED
import { JobSession, segmentJob } from '../../scoring/search/jobs.ts'
import type { SearchState } from '../../scoring/search/state.ts'
import { bundledEntry } from '../scoring/search/problems.ts'

const [ruleText, seconds, seed] = process.argv.slice(2)
const session = new JobSession()
const polytopes = [bundledEntry('w50-7-newton-2-2-3-3-7')]
const settings = { budget: 1_000_000, islands: 1 }
let state: SearchState | null = null
const run = (milliseconds: number): { evaluations: number; took: number } => {
  const begun = performance.now()
  const job = { polytopes, ruleText, method: 'annealing' as const, settings, seed: Number(seed), island: 0 }
  const output = segmentJob(
    { ...job, evaluations: 1_000_000, state },
    session,
    () => performance.now() - begun > milliseconds,
  )
  if ('error' in output) throw new Error(output.error.message)
  state = output.state
  return { evaluations: output.progress.evaluations, took: performance.now() - begun }
}
const warm = run(3_000)
const whole = run(1000 * Number(seconds))
process.stdout.write(String(((whole.evaluations - warm.evaluations) / whole.took) * 1000))
