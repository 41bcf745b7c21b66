import { storageTrouble, type StorageTrouble } from '../storageTrouble.ts'

/** Pauses between tries to write: the first, and the longest, each twice the one before. */
const firstPause = 500
const longestPause = 10_000

interface GateParts {
  /** Aborted when the server shuts down. */
  readonly closing: AbortSignal
  /** Called when trouble begins, changes or ends (null). */
  readonly changed: (trouble: StorageTrouble | null) => void
}

/**
 * Results of jobs wait here while the database cannot be written (a full disk, say): they are kept in memory and
 * written when there is room. Meanwhile nothing new is begun, so what waits is one piece of work per thread.
 */
export class StorageGate {
  readonly #parts: GateParts
  #trouble: StorageTrouble | null = null
  #waiting = 0
  #pause = firstPause

  constructor(parts: GateParts) {
    this.#parts = parts
  }

  /** Why nothing can be written just now; null when all is well. */
  get trouble(): StorageTrouble | null {
    return this.#trouble
  }

  /**
   * Writes, and tries again as long as the storage is in trouble.
   *
   * @throws what `write` throws, but for trouble with the storage; the reason of shutting down
   */
  async insist<T>(write: () => Promise<T>): Promise<T> {
    let waited = false
    try {
      for (;;) {
        try {
          return await write()
        } catch (error) {
          const trouble = storageTrouble(error)
          if (trouble === null) throw error
          this.#parts.closing.throwIfAborted()
          if (!waited) this.#waiting += 1
          waited = true
          this.#set(trouble)
        }
        await this.#nextTry()
        this.#parts.closing.throwIfAborted()
      }
    } finally {
      if (waited) {
        this.#waiting -= 1
        if (this.#waiting === 0) this.#set(null)
      }
    }
  }

  #set(trouble: StorageTrouble | null): void {
    if (trouble === null) this.#pause = firstPause
    if (this.#trouble?.code === trouble?.code) return
    this.#trouble = trouble
    this.#parts.changed(trouble)
  }

  #nextTry(): Promise<void> {
    const pause = this.#pause
    this.#pause = Math.min(longestPause, 2 * pause)
    return new Promise((resolve) => {
      const timer = setTimeout(end, pause)
      this.#parts.closing.addEventListener('abort', end, { once: true })
      const { closing } = this.#parts
      function end() {
        clearTimeout(timer)
        closing.removeEventListener('abort', end)
        resolve()
      }
    })
  }
}
