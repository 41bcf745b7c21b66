import { AsyncLocalStorage } from 'node:async_hooks'
import type { DataSource, EntityManager, QueryRunner } from 'typeorm'

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
    const result = this.#tail.then(() => this.#inside.run(true, () => this.#transaction(work)))
    this.#tail = result.catch(() => undefined)
    return result
  }

  async #transaction<T>(work: (manager: EntityManager) => Promise<T>): Promise<T> {
    try {
      return await this.#source.transaction(work)
    } catch (error) {
      await this.#leaveNoneOpen()
      throw error
    }
  }

  /**
   * On a full disk SQLite ends a transaction by itself, or cannot commit it. TypeORM then takes one for open that is
   * not, makes savepoints of the next ones, and may leave one open for good, so that all later commits are lost when the
   * process ends. So after a failure the connection is brought back to where no transaction is open.
   */
  async #leaveNoneOpen(): Promise<void> {
    // There is one connection, and one query runner for it.
    const runner = this.#source.createQueryRunner() as QueryRunner & { transactionDepth: number }
    await runner.query('ROLLBACK').catch(() => undefined)
    const state: { isTransactionActive: boolean; transactionDepth: number } = runner
    state.isTransactionActive = false
    state.transactionDepth = 0
  }

  /** Resolves when everything queued so far is committed or rolled back. */
  async idle(): Promise<void> {
    await this.#tail
  }
}
