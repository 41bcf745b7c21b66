import { In, type EntityTarget } from 'typeorm'
import type { JobParts } from './jobParts.ts'
import { beatsPerLease, leaseMilliseconds, LeaseWatch, nextBeat, thisProcess } from './lease.ts'
import type { WorkSource } from './scheduler.ts'

/** A row that some process works on: its lease says which. */
export interface LeasedRow {
  id: string
  state: string
  leaseOwner: string | null
  leaseBeat: number | null
  createdAt: string
}

/** Such a row's work in the hands of this process. */
export interface LeasedRun extends WorkSource {
  readonly id: string
  /** Starts no further piece of work. */
  release(): void
  /** Resolves when no piece of work is in hand. */
  settled(): Promise<void>
}

interface LeasedRunsOptions {
  readonly entity: EntityTarget<LeasedRow>
  /** What a row is called in the log. */
  readonly word: string
  /**
   * Takes the lease of an open row, if it is still held by `holder` (null: by nobody), and hands its run to `hold`.
   * Called for one row at a time.
   */
  readonly takeUp: (id: string, holder: string | null) => Promise<void>
}

/** The rows of one table that this process works on: takes them up, keeps their leases, lets them go. */
export class LeasedRuns<Run extends LeasedRun> {
  readonly #parts: JobParts
  readonly #options: LeasedRunsOptions
  readonly #running = new Map<string, Run>()
  readonly #takingUp = new Map<string, Promise<void>>()
  /** Runs that were let go of with work still in hand. */
  readonly #settling = new Map<string, Promise<void>>()
  readonly #listeners = new Map<string, (() => void)[]>()
  readonly #watch = new LeaseWatch()
  #heart: NodeJS.Timeout | null = null

  constructor(parts: JobParts, options: LeasedRunsOptions) {
    this.#parts = parts
    this.#options = options
  }

  /** Takes up every row that was open when its process ended, and looks for abandoned ones from time to time. */
  async start(): Promise<void> {
    await this.#takeUpFree()
    this.#heart = setInterval(() => {
      this.#beat().catch((error: unknown) => this.#parts.log.error({ err: error }, 'leases were not renewed'))
    }, leaseMilliseconds / beatsPerLease)
    this.#heart.unref()
  }

  stop(): void {
    if (this.#heart) clearInterval(this.#heart)
    for (const run of this.#running.values()) run.release()
  }

  /** Those that this process works on. */
  runs(): Iterable<Run> {
    return this.#running.values()
  }

  /** Takes up an open row. `holder`: whose lease has been found to be left behind. */
  enqueue(id: string, holder: string | null = null): void {
    const before = this.#takingUp.get(id) ?? Promise.resolve()
    const work = before
      .then(() => this.#settling.get(id))
      .then(() =>
        this.#running.has(id) || this.#parts.closing.aborted ? undefined : this.#options.takeUp(id, holder),
      )
      .catch((error: unknown) => {
        if (this.#parts.closing.aborted) return
        this.#parts.log.error({ err: error, id }, `a ${this.#options.word} could not be taken up`)
      })
      .finally(() => {
        if (this.#takingUp.get(id) === work) this.#takingUp.delete(id)
      })
    this.#takingUp.set(id, work)
  }

  /** Keeps a run whose lease was taken. Its work begins when the scheduler gets it. */
  hold(run: Run): void {
    this.#running.set(run.id, run)
  }

  /** Lets go of a row that was paused or cancelled. */
  release(id: string): void {
    const run = this.#running.get(id)
    if (!run) return
    run.release()
    this.forget(run)
  }

  /** To be called by a run that has ended. */
  forget(run: Run): void {
    this.#parts.scheduler.remove(run)
    this.#running.delete(run.id)
    const settled = run.settled().finally(() => {
      if (this.#settling.get(run.id) === settled) this.#settling.delete(run.id)
    })
    this.#settling.set(run.id, settled)
    for (const resolve of this.#listeners.get(run.id) ?? []) resolve()
    this.#listeners.delete(run.id)
  }

  /** Resolves when no work of a row that was let go of is in hand any more. */
  async settled(id: string): Promise<void> {
    await this.#settling.get(id)
  }

  /** Resolves when this process has nothing more to do for a row that was queued with `enqueue`. */
  ended(id: string): Promise<void> {
    return new Promise((resolve) => {
      this.#listeners.set(id, [...(this.#listeners.get(id) ?? []), resolve])
    })
  }

  async #beat(): Promise<void> {
    const ids = [...this.#running.keys()]
    if (ids.length > 0) {
      await this.#parts.writes.transaction((manager) =>
        manager.update(
          this.#options.entity,
          { id: In(ids), leaseOwner: thisProcess },
          { leaseBeat: nextBeat },
        ),
      )
    }
    await this.#takeUpFree()
  }

  async #takeUpFree(): Promise<void> {
    const open = await this.#parts.source.manager.find(this.#options.entity, {
      select: { id: true, leaseOwner: true, leaseBeat: true },
      where: { state: In(['queued', 'running']) },
      order: { createdAt: 'ASC' },
    })
    for (const row of open) if (this.#watch.isFree(row.id, row)) this.enqueue(row.id, row.leaseOwner)
  }
}
