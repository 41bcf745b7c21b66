import { AsyncLocalStorage } from 'node:async_hooks'
import type { DataSource, EntityManager } from 'typeorm'

/**
 * The one way to write to the database. All requests and jobs share one SQLite connection: two transactions at
 * once would fail, and a write made beside another's open transaction would vanish with its rollback. So
 * transactions queue here. Nothing slow (hashing, worker threads, the network) may be awaited inside one.
 */
export class WriteLock {
  readonly #source: DataSource
  readonly #inside = new AsyncLocalStorage<true>()
  #tail: Promise<unknown> = Promise.resolve()

  constructor(source: DataSource) {
    this.#source = source
  }

  /** Runs `work` in a transaction of its own, after all earlier ones; a throw rolls it back. */
  transaction<T>(work: (manager: EntityManager) => Promise<T>): Promise<T> {
    // Waiting for itself would hang for ever: say so instead.
    if (this.#inside.getStore()) return Promise.reject(new Error('A transaction was opened inside another.'))
    const result = this.#tail.then(() => this.#inside.run(true, () => this.#source.transaction(work)))
    this.#tail = result.catch(() => undefined)
    return result
  }

  /** Resolves when everything queued so far is committed or rolled back. */
  async idle(): Promise<void> {
    await this.#tail
  }
}
