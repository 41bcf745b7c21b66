/**
 * `npm run bench:search`: how many distinct evaluations each method takes to come by candidates that are rare among
 * random ones, by either law of null samples, on fixed tasks. Exit status 1 when a stated aim, which is against the usual
 * law, is missed.
 *
 *     npm run bench:search -- [--task NAME,...] [--seeds N] [--from SEED] [--threads N] [--quick]
 *
 * The null samples, 3,000 candidates for each law, are kept under var/bench: the first run takes some minutes longer.
 * `--quick`: five seeds, without the tasks at h11 = 251 and 491.
 */
import { availableParallelism } from 'node:os'
import { parseArgs } from 'node:util'
import { benchThreads } from './benchThreads.ts'
import { nullMerits } from './nullScores.ts'
import {
  earlyCount,
  highMerit,
  measured,
  measuredRandom,
  quartiles,
  type Measured,
  type MeritSequence,
} from './searchMeasures.ts'
import { nullLawNames, usualNullLaw, type NullLawName } from '../search/nullLaws.ts'
import { searchTasks, taskBudget, type SearchTask } from './searchTasks.ts'

const { values } = parseArgs({
  options: {
    task: { type: 'string' },
    seeds: { type: 'string' },
    from: { type: 'string', default: '1' },
    threads: { type: 'string', default: String(availableParallelism()) },
    quick: { type: 'boolean', default: false },
  },
})

const nullSize = 3000
const guided = ['annealing', 'genetic', 'auto'] as const

/** What auto must keep on demanding tasks: evaluations to the null's best, and random's over its own. */
const mostEvaluations = 100
const leastFactor = 20

const named = values.task?.split(',')
const tasks = searchTasks.filter(({ name, slow }) => named?.includes(name) ?? !(values.quick && slow))
const unknown = named?.find((name) => !searchTasks.some((task) => task.name === name))
if (unknown !== undefined) {
  process.stderr.write(
    `There is no task ${unknown}; the tasks are ${searchTasks.map(({ name }) => name).join(', ')}.\n`,
  )
  process.exit(2)
}
const from = Number(values.from)
const seeds = Number(values.seeds ?? (values.quick ? 5 : 10))
const threads = benchThreads(Number(values.threads))
const print = (line: string): boolean => process.stdout.write(`${line}\n`)

const table: string[] = []
const missed: string[] = []

/** A task's null by one of the laws. */
interface NullOfTask {
  readonly law: NullLawName
  readonly merits: MeritSequence
  readonly random: Measured
}

/** One task: its nulls, its methods, and what auto has missed. */
async function runTask(task: SearchTask): Promise<void> {
  const { name, watched } = task
  const nulls: NullOfTask[] = []
  for (const law of nullLawNames) {
    const merits = await nullMerits(task, nullSize, threads, law)
    nulls.push({ law, merits, random: measuredRandom(merits, watched) })
  }
  print(`${name}: ${task.title}`)
  for (const { law, random } of nulls) row(task, 'random', law, random)
  for (const method of guided) {
    const jobs = Array.from({ length: seeds }, (_, n) =>
      threads.run({ task: name, method, seed: from + n, budget: taskBudget, evaluations: watched }),
    )
    const runs = await Promise.all(jobs)
    const found = runs.map((run) => run.merits)
    for (const { law, merits, random } of nulls) {
      const ours = measured(found, merits, watched)
      row(task, method, law, ours)
      if (method === 'auto' && law === usualNullLaw && task.demanding) judge(name, ours, random)
    }
  }
  for (const { law, merits } of nulls) {
    const high = highMerit(merits)
    table.push(
      `${' '.repeat(24)}null ${law}: 99.9 % ${score(high.value)}, best of ${merits.length} ${score(merits[0].value)}`,
    )
  }
  if (task.enumerable !== undefined) await enumerate(task, task.enumerable)
}

async function enumerate({ name }: SearchTask, budget: number): Promise<void> {
  const { merits, ended } = await threads.run({ task: name, method: 'auto', seed: from, budget })
  const isWhole = ended === 'space-exhausted'
  const line = `auto with a budget of ${budget} ${isWhole ? `enumerates all ${merits.length} candidates` : 'does not enumerate'}`
  table.push(`${' '.repeat(24)}${line}`)
  if (!isWhole) missed.push(`${name}: ${line}`)
}

function judge(name: string, auto: Measured, random: Measured): void {
  const middle = ([, median]: readonly number[]): number => median
  const toBest = middle(quartiles(auto.toBest))
  if (toBest > mostEvaluations)
    missed.push(`${name}: auto takes ${count(toBest)} evaluations to the null's best`)
  for (const [what, of] of [
    ['99.9 % quantile', 'toHigh'],
    ['best', 'toBest'],
  ] as const) {
    const factor = middle(quartiles(random[of])) / middle(quartiles(auto[of]))
    if (factor < leastFactor)
      missed.push(`${name}: to the null's ${what} only ${factor.toFixed(1)} times fewer than random`)
  }
}

const count = (n: number): string => (n === Infinity ? 'more' : String(n))
const score = (value: number): string => (Number.isInteger(value) ? String(value) : value.toFixed(3))

function row(
  { name }: SearchTask,
  method: string,
  law: NullLawName,
  { toHigh, toBest, early, late }: Measured,
): void {
  const evaluations = (values: readonly number[]): string => {
    const [low, median, high] = quartiles(values)
    return `${count(median)} [${count(low)}, ${count(high)}]`.padEnd(20)
  }
  const middle = (values: readonly number[]): string => score(quartiles(values)[1]).padStart(9)
  const line = [
    name.padEnd(12),
    method.padEnd(10),
    law.padEnd(10),
    evaluations(toHigh),
    evaluations(toBest),
    middle(early),
    middle(late),
  ]
  table.push(line.join(' '))
  print(`  ${line.slice(1).join(' ')}`)
}

for (const task of tasks) await runTask(task)
await threads.close()

print('')
print(
  `Distinct evaluations until a candidate is as good as the 99.9 % quantile of ${nullSize} null candidates, and as the ` +
    `best of them: median and quartiles over ${seeds} seeds from ${from} (“more”: than are watched). Best scores after ` +
    `${earlyCount} evaluations and after all that are watched: medians. Budget ${taskBudget}; random is drawn from the null itself.`,
)
print(
  `${'task'.padEnd(12)} ${'method'.padEnd(10)} ${'null'.padEnd(10)} ${'to 99.9 %'.padEnd(20)} ${'to the best'.padEnd(20)} ${`after ${earlyCount}`.padStart(9)}   watched`,
)
for (const line of table) print(line)
for (const line of missed) print(`MISSED ${line}`)
if (missed.length > 0) process.exitCode = 1
else
  print(
    `kept: where h11 >= 50 auto takes at most ${mostEvaluations} evaluations to the null's best, and ${leastFactor} times fewer than random`,
  )
