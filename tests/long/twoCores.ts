/**
 * How much a second worker thread brings: evaluations per second of a real server with WORKERS=1 and 2, in alternation,
 * on the bundled polytope with (h11, h21) = (50, 7), for a rule on the metric and for one on topology alone. Two minutes
 * on a quiet machine. By hand:
 *
 *     node --import tsx tests/long/twoCores.ts [--seconds N] [--rounds N]
 *
 * Prints the medians, their ratio (wanted: 1.7), and what part of its time the main thread was busy; before that what the
 * machine gives at best: the same work in one and in two processes that have nothing in common. Ends with status 1 when
 * a ratio is below 1.7.
 */
import { mkdtempSync, rmSync } from 'node:fs'
import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { availableParallelism, loadavg, tmpdir } from 'node:os'
import { join } from 'node:path'
import { performance } from 'node:perf_hooks'
import { parseArgs } from 'node:util'
import { readConfig } from '../../server/config.ts'
import { createCampaign } from '../../server/services/campaigns.ts'
import { createSearch, pauseSearch } from '../../server/services/searches.ts'
import { createTarget } from '../../server/services/targets.ts'
import { openServer } from '../../server/start.ts'
import { createSearchSchema } from '../../shared/searches.ts'
import { bundledEntries, loadEntries } from '../server/support/bundledSample.ts'
import { addAccount } from '../server/support/testServer.ts'

const { values } = parseArgs({
  options: { seconds: { type: 'string', default: '10' }, rounds: { type: 'string', default: '2' } },
})
const [seconds, rounds] = [values.seconds, values.rounds].map(Number)

const rules = {
  metric: 'score log10(metric.divisor.top)',
  topology: 'score count(t in triples : t.number >= 2) + 0.01 * count(d in divisors : d.rigid)',
}

interface Measured {
  readonly perSecond: number
  readonly mainThread: number
}

async function measure(rule: string, workers: number): Promise<Measured> {
  const folder = mkdtempSync(join(tmpdir(), 'tessellary-two-cores-'))
  const environment = { DATA_DIR: folder, WORKERS: String(workers), LOG_LEVEL: 'silent', NODE_ENV: 'test' }
  const server = await openServer(readConfig(environment), { jobs: { nullSize: () => 10 } })
  try {
    const { context } = server
    const evaluations: { readonly at: number; readonly count: number }[] = []
    const waiting: (() => void)[] = []
    const send = context.streams.toCampaign.bind(context.streams)
    context.streams.toCampaign = (campaignId, event) => {
      if (event.kind === 'search') {
        evaluations.push({ at: performance.now(), count: event.progress.evaluations })
        waiting.splice(0).forEach((resolve) => resolve())
      }
      send(campaignId, event)
    }
    await loadEntries(
      server,
      bundledEntries('large', (id) => id === 'w50-7-newton-2-2-3-3-7'),
    )
    const author = await addAccount(server, 'author')
    const { id } = await createCampaign(context, author, { name: 'Hunt', description: '' })
    const target = await createTarget(context, id, author, { name: 'Target', text: rule })
    const search = await createSearch(
      context,
      id,
      author,
      createSearchSchema.parse({
        targetVersionId: target.versions[0].version.id,
        scope: { kind: 'filter', filter: {} },
        budget: 1_000_000,
        seed: 1,
        islands: 4,
      }),
    )
    const last = () => evaluations[evaluations.length - 1]
    // Every island has begun on warm threads, and the short null sample is drawn.
    while (evaluations.length < 12) await new Promise<void>((resolve) => waiting.push(resolve))
    const first = last()
    const before = performance.eventLoopUtilization()
    while (last().at - first.at < seconds * 1000) await new Promise<void>((resolve) => waiting.push(resolve))
    const mainThread = performance.eventLoopUtilization(before).utilization
    const perSecond = ((last().count - first.count) / (last().at - first.at)) * 1000
    await pauseSearch(context, id, search.id, author)
    return { perSecond, mainThread }
  } finally {
    await server.close()
    rmSync(folder, { recursive: true, force: true })
  }
}

/** Evaluations per second of so many processes together, each on its own. */
async function bare(rule: string, processes: number): Promise<number> {
  const each = Array.from({ length: processes }, async (_, n) => {
    const words = ['--import', 'tsx', 'tests/long/bareEvaluations.ts', rule, String(seconds), String(n + 1)]
    const child = spawn(process.execPath, words, { stdio: ['ignore', 'pipe', 'inherit'] })
    let said = ''
    child.stdout.on('data', (chunk: Buffer) => (said += chunk.toString()))
    await once(child, 'close')
    return Number(said)
  })
  return (await Promise.all(each)).reduce((sum, rate) => sum + rate, 0)
}

const median = (list: readonly number[]) => [...list].sort((a, b) => a - b)[list.length >> 1]

process.stdout.write(`${availableParallelism()} cores, load ${loadavg()[0].toFixed(1)} before the start\n`)
let poor = false
for (const [name, rule] of Object.entries(rules)) {
  const alone: Record<1 | 2, number[]> = { 1: [], 2: [] }
  const found: Record<1 | 2, Measured[]> = { 1: [], 2: [] }
  for (let round = 0; round < rounds; round += 1) {
    for (const count of [1, 2] as const) {
      alone[count].push(await bare(rule, count))
      found[count].push(await measure(rule, count))
    }
  }
  const best = median(alone[2]) / median(alone[1])
  const [one, two] = ([1, 2] as const).map((workers) =>
    median(found[workers].map(({ perSecond }) => perSecond)),
  )
  const busy = median(found[2].map(({ mainThread }) => mainThread))
  const ratio = two / one
  if (ratio < 1.7) poor = true
  process.stdout.write(
    `${name}: ${one.toFixed(0)} a second on one thread, ${two.toFixed(0)} on two: ratio ${ratio.toFixed(2)} ` +
      `(two bare processes: ${best.toFixed(2)}); the main thread was busy ${(100 * busy).toFixed(1)} % of the time\n`,
  )
}
process.exit(poor ? 1 : 0)
