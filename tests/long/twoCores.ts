/**
 * How much a second worker thread brings: evaluations per second of a real server with WORKERS=1 and 2, in alternation,
 * on the bundled polytope with (h11, h21) = (50, 7), for a rule on the metric and for one on topology alone. Two minutes
 * on a quiet machine. By hand:
 *
 *     node --import tsx tests/long/twoCores.ts [--seconds N] [--rounds N]
 *
 * Prints the medians, their ratio (wanted: 1.7), and what part of its time the main thread was busy. Ends with status 1
 * when a ratio is below 1.7.
 */
import { mkdtempSync, rmSync } from 'node:fs'
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

const median = (list: readonly number[]) => [...list].sort((a, b) => a - b)[list.length >> 1]

process.stdout.write(`${availableParallelism()} cores, load ${loadavg()[0].toFixed(1)} before the start\n`)
let poor = false
for (const [name, rule] of Object.entries(rules)) {
  const found: Record<1 | 2, Measured[]> = { 1: [], 2: [] }
  for (let round = 0; round < rounds; round += 1) {
    for (const workers of [1, 2] as const) found[workers].push(await measure(rule, workers))
  }
  const [one, two] = ([1, 2] as const).map((workers) =>
    median(found[workers].map(({ perSecond }) => perSecond)),
  )
  const busy = median(found[2].map(({ mainThread }) => mainThread))
  const ratio = two / one
  if (ratio < 1.7) poor = true
  process.stdout.write(
    `${name}: ${one.toFixed(0)} a second on one thread, ${two.toFixed(0)} on two: ratio ${ratio.toFixed(2)}; ` +
      `the main thread was busy ${(100 * busy).toFixed(1)} % of the time\n`,
  )
}
process.exit(poor ? 1 : 0)
