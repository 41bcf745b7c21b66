import { availableParallelism } from 'node:os'
import { parseArgs } from 'node:util'
import { evaluateAll } from './cli/evaluateCommand.ts'
import { failureLine, failureOf } from './cli/failure.ts'
import { readInput } from './cli/readInput.ts'
import { runSearch } from './cli/searchCommand.ts'
import { searchSpec } from './cli/searchSpec.ts'
import { readStates, writeStates } from './cli/stateFile.ts'
import { inPlace, workerThreads } from './cli/threads.ts'
import { InputError } from './errors.ts'

const usage = 'usage: evaluate FILE.json | -    or    search SPEC.json | - [--state FILE] [--threads N]'

/** Headless use. Standard output carries JSON only; what goes wrong is one line each on standard error. */
async function main(): Promise<number> {
  const [command, ...rest] = process.argv.slice(2)
  if (command === 'evaluate') return evaluate(rest)
  if (command === 'search') return await search(rest)
  throw new InputError('usage', usage)
}

function evaluate(args: string[]): number {
  const { file } = argumentsOf(args, false)
  const { output, failures, status } = evaluateAll(readInput(file))
  if (output !== undefined) process.stdout.write(`${JSON.stringify(output)}\n`)
  for (const failure of failures) process.stderr.write(`${failureLine(failure)}\n`)
  return status
}

async function search(args: string[]): Promise<number> {
  const { file, state, threads: wanted } = argumentsOf(args, true)
  const spec = searchSpec(readInput(file))
  const jobs = spec.settings.islands + (spec.null === undefined ? 0 : 1)
  const count = Math.min(jobs, wanted ?? availableParallelism())
  const threads = count > 1 ? workerThreads(count) : inPlace()
  try {
    await runSearch(spec, {
      threads,
      states: state === undefined ? null : (readStates(state)?.jobs ?? null),
      print: (line) => process.stdout.write(`${JSON.stringify(line)}\n`),
      ...(state !== undefined && { save: (states) => writeStates(state, states) }),
    })
    return 0
  } finally {
    await threads.close()
  }
}

function argumentsOf(args: string[], forSearch: boolean): { file: string; state?: string; threads?: number } {
  let parsed
  try {
    parsed = parseArgs({
      args,
      allowPositionals: true,
      options: forSearch ? { state: { type: 'string' }, threads: { type: 'string' } } : {},
    })
  } catch (error) {
    throw new InputError('usage', `${error instanceof Error ? error.message : String(error)} ${usage}`)
  }
  if (parsed.positionals.length !== 1) throw new InputError('usage', usage)
  const { state, threads } = parsed.values as { state?: string; threads?: string }
  if (threads !== undefined && !/^[1-9][0-9]{0,2}$/.test(threads)) {
    throw new InputError('usage', `--threads takes a number from 1 on, not ${JSON.stringify(threads)}.`)
  }
  return {
    file: parsed.positionals[0],
    ...(state !== undefined && { state }),
    ...(threads !== undefined && { threads: Number(threads) }),
  }
}

// A reader that closes early (`| head`) is no error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0)
  throw error
})

main()
  .catch((error: unknown) => {
    const failure = failureOf(error)
    process.stderr.write(`${failureLine(failure)}\n`)
    return failure.status
  })
  .then((status) => {
    process.exitCode = status
  })
