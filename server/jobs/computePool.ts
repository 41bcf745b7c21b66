import { fileURLToPath } from 'node:url'
import Piscina from 'piscina'
import type { Logger } from 'pino'
import { Refusal } from '../problems.ts'
import type { TaskAnswer, TaskInput, TaskName, TaskOutput } from './tasks.ts'

export type ComputeFailureCode = 'worker-threw' | 'worker-died' | 'worker-stuck'

/** Work that came to nothing through no fault of the caller. */
export class ComputeFailure extends Error {
  readonly code: ComputeFailureCode

  constructor(code: ComputeFailureCode, message: string, options?: ErrorOptions) {
    super(message, options)
    this.name = 'ComputeFailure'
    this.code = code
  }
}

export interface PoolOptions {
  readonly threads: number
  /** Added to the threads' nice value, so that they yield to the web side. */
  readonly nice: number
  readonly log: Logger
  /** Tests put a misbehaving worker here. */
  readonly workerFile?: URL
  /** A worker's heap may grow to what the largest polytopes need, and no further. */
  readonly heapMegabytes?: number
  /** How long a thread without work is kept, with all it has built. */
  readonly idleMilliseconds?: number
}

/** The worker file lies beside the server's entry, in source (.ts) and in the build (.js). */
const ownExtension = import.meta.url.endsWith('.ts') ? '.ts' : '.js'
const ownWorker = new URL(`../worker${ownExtension}`, import.meta.url)

/** How long a task may take before its thread is taken for stuck and ended. The dearest take a minute. */
export const taskLimitMilliseconds = 10 * 60 * 1000

/**
 * The same for a piece of a search or of a null sample. Pieces aim at a second; the dearest single evaluation takes a
 * quarter of one (h11 = 491), some seconds where the threads have a small part of a busy machine.
 */
export const pieceLimitMilliseconds = 5 * 60 * 1000

export interface RunOptions {
  readonly signal?: AbortSignal
  /** See `taskLimitMilliseconds`. */
  readonly limitMilliseconds?: number
  /**
   * Begin once more on a new thread when the first died or got stuck: tasks are pure, so nothing is done twice. Not
   * when it ran out of memory or threw, which it would do again.
   */
  readonly again?: boolean
}

/** Worker threads that run named tasks of the engine. */
export class ComputePool {
  readonly threads: number
  readonly #pool: Piscina
  readonly #log: Logger
  readonly #closing = new AbortController()

  constructor({
    threads,
    nice,
    log,
    workerFile = ownWorker,
    heapMegabytes = 1024,
    idleMilliseconds = 60_000,
  }: PoolOptions) {
    this.threads = threads
    this.#log = log
    this.#pool = new Piscina({
      filename: fileURLToPath(workerFile),
      minThreads: 0,
      maxThreads: threads,
      idleTimeout: idleMilliseconds,
      niceIncrement: nice,
      // Source needs the loader that the server itself runs under; the build needs nothing.
      execArgv: workerFile.pathname.endsWith('.ts') ? ['--import', import.meta.resolve('tsx')] : [],
      resourceLimits: { maxOldGenerationSizeMb: heapMegabytes },
    })
    // Without a listener a thread that fails while idle would end the server.
    this.#pool.on('error', (error: unknown) => log.error({ err: error }, 'a worker thread failed while idle'))
  }

  /**
   * Runs a task on a thread.
   *
   * @throws Refusal for a mistake in the input; ComputeFailure when the task threw, died or was stuck; the
   *   signal's reason when the caller gave up
   */
  async run<Name extends TaskName>(
    name: Name,
    input: TaskInput<Name>,
    options: RunOptions = {},
  ): Promise<TaskOutput<Name>> {
    try {
      return await this.#once(name, input, options)
    } catch (error) {
      if (!options.again || !mayDoBetter(error)) throw error
      this.#log.warn({ err: error, task: name }, 'a piece of work begins once more')
    }
    return this.#once(name, input, options)
  }

  async #once<Name extends TaskName>(
    name: Name,
    input: TaskInput<Name>,
    { signal, limitMilliseconds = taskLimitMilliseconds }: RunOptions,
  ): Promise<TaskOutput<Name>> {
    const limit = AbortSignal.timeout(limitMilliseconds)
    const signals = [this.#closing.signal, limit, ...(signal ? [signal] : [])]
    let answer: TaskAnswer<TaskOutput<Name>>
    try {
      answer = (await this.#pool.run({ name, input }, { signal: AbortSignal.any(signals) })) as TaskAnswer<
        TaskOutput<Name>
      >
    } catch (error) {
      signal?.throwIfAborted()
      this.#closing.signal.throwIfAborted()
      if (limit.aborted) {
        const seconds = Math.round(limitMilliseconds / 1000)
        throw new ComputeFailure('worker-stuck', `The computation did not end within ${seconds} seconds.`)
      }
      const reason = error instanceof Error ? error.message : String(error)
      throw new ComputeFailure('worker-died', `The worker thread ended: ${reason}`, { cause: error })
    }
    if (answer.ok) return answer.value
    if (answer.kind === 'input') {
      const { code, message, path, found } = answer
      throw new Refusal(422, code, message, { ...(path === '' ? {} : { path }), found })
    }
    throw new ComputeFailure('worker-threw', answer.message, { cause: answer.stack })
  }

  /** Ends all threads; running tasks are abandoned. */
  async close(): Promise<void> {
    this.#closing.abort(new Error('The server is shutting down.'))
    await this.#pool.destroy()
  }
}

/** Whether a second try has better prospects. */
function mayDoBetter(error: unknown): boolean {
  if (!(error instanceof ComputeFailure) || error.code === 'worker-threw') return false
  const { cause } = error
  return !(cause instanceof Error && 'code' in cause && cause.code === 'ERR_WORKER_OUT_OF_MEMORY')
}
