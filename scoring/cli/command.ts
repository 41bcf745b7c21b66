import { availableParallelism } from 'node:os'
import { parseArgs } from 'node:util'
import { InputError } from '../errors.ts'
import { makeCertificate, recheckFile } from './certifyCommand.ts'
import { evaluateAll } from './evaluateCommand.ts'
import { failureLine, failureOf } from './failure.ts'
import { readInput } from './readInput.ts'
import { runSearch } from './searchCommand.ts'
import { searchSpec } from './searchSpec.ts'
import { readStates, writeStates } from './stateFile.ts'
import { inPlace, workerThreads } from './threads.ts'

const usage =
  'usage: evaluate FILE.json | -    or    search SPEC.json | - [--state FILE] [--threads N]    or    certify FILE.json | - [--make]'

/** Where a command prints, line by line: JSON on `out`, what goes wrong on `err`. */
export interface Printer {
  out(line: string): void
  err(line: string): void
}

/**
 * Headless use. Returns the exit status: 0, 2 for bad input, 1 for a fault of ours or a certificate that fails.
 * @param args the command and its arguments
 */
export async function runCommand(args: readonly string[], printer: Printer): Promise<number> {
  try {
    const [command, ...rest] = args
    if (command === 'evaluate') return evaluate(rest, printer)
    if (command === 'search') return await search(rest, printer)
    if (command === 'certify') return certifyFile(rest, printer)
    throw new InputError('usage', usage)
  } catch (error) {
    const failure = failureOf(error)
    printer.err(failureLine(failure))
    return failure.status
  }
}

function evaluate(args: string[], printer: Printer): number {
  const { file } = argumentsOf(args, {})
  const { output, failures, status } = evaluateAll(readInput(file))
  if (output !== undefined) printer.out(JSON.stringify(output))
  for (const failure of failures) printer.err(failureLine(failure))
  return status
}

async function search(args: string[], printer: Printer): Promise<number> {
  const {
    file,
    state,
    threads: wanted,
  } = argumentsOf(args, { state: { type: 'string' }, threads: { type: 'string' } })
  const spec = searchSpec(readInput(file))
  const states = state === undefined ? null : (readStates(state)?.jobs ?? null)
  const jobs = spec.settings.islands + (spec.null === undefined ? 0 : 1)
  const count = Math.min(jobs, wanted ?? availableParallelism())
  const threads = count > 1 ? workerThreads(count) : inPlace()
  try {
    await runSearch(spec, {
      threads,
      states,
      print: (line) => printer.out(JSON.stringify(line)),
      ...(state !== undefined && { save: (all) => writeStates(state, all) }),
    })
    return 0
  } finally {
    await threads.close()
  }
}

function certifyFile(args: string[], printer: Printer): number {
  const { file, make } = argumentsOf(args, { make: { type: 'boolean' } })
  const { output, status } = make === true ? makeCertificate(readInput(file)) : recheckFile(readInput(file))
  printer.out(JSON.stringify(output))
  return status
}

interface Arguments {
  readonly file: string
  readonly state?: string
  readonly threads?: string
  readonly make?: boolean
}

function argumentsOf(
  args: string[],
  options: Readonly<Record<string, { type: 'string' | 'boolean' }>>,
): Omit<Arguments, 'threads'> & { readonly threads?: number } {
  let parsed
  try {
    parsed = parseArgs({ args, allowPositionals: true, options })
  } catch (error) {
    throw new InputError('usage', `${error instanceof Error ? error.message : String(error)} ${usage}`)
  }
  if (parsed.positionals.length !== 1) throw new InputError('usage', usage)
  const { threads, ...others } = parsed.values as Omit<Arguments, 'file'>
  if (threads !== undefined && !/^[1-9][0-9]{0,2}$/.test(threads)) {
    throw new InputError('usage', `--threads takes a number from 1 on, not ${JSON.stringify(threads)}.`)
  }
  return {
    file: parsed.positionals[0],
    ...others,
    ...(threads !== undefined && { threads: Number(threads) }),
  }
}
