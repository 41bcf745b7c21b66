import {
  candidatesWithoutInvariants,
  readForInvariants,
  storeInvariants,
} from '../services/candidateInvariants.ts'
import type { CandidateGeometryInput } from './compute/candidateGeometry.ts'
import type { ComputedInvariants } from './compute/relatives.ts'
import type { JobParts } from './jobParts.ts'
import type { WorkSource } from './scheduler.ts'

/** Candidates per piece of work; at the largest h11 each takes a third of a second. */
const stretchLength = 10

/**
 * Computes the Wall-type invariants of candidates that have none yet, in turn with the searches. Nothing is owed to
 * a request: what is missing meanwhile is shown as still to come.
 */
export class InvariantsFiller implements WorkSource {
  readonly campaignId = 'invariants'
  readonly #parts: JobParts
  readonly #listeners = new Set<() => void>()
  #waiting = false
  #busy = false
  /** Woken while busy: from the beginning once more. */
  #again = false
  /** Asked for by name: finds of searches that a dossier is compared with. First in turn. */
  readonly #wanted = new Set<string>()
  /** Keys up to here have been looked at in this round. */
  #after = ''

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  /** To be called when candidates may have come in. */
  wake(): void {
    if (this.#parts.closing.aborted) return
    if (this.#busy) {
      this.#again = true
      return
    }
    this.#waiting = true
    this.#after = ''
    this.#parts.scheduler.add(this)
  }

  /** Asks for candidates that `wake` alone would not lead to. */
  want(candidateKeys: readonly string[]): void {
    if (candidateKeys.length === 0) return
    candidateKeys.forEach((key) => this.#wanted.add(key))
    this.wake()
  }

  /** Resolves when nothing is left to compute. */
  idle(): Promise<void> {
    if (!this.#waiting && !this.#busy) return Promise.resolve()
    return new Promise((resolve) => this.#listeners.add(resolve))
  }

  next(): Promise<void> | null {
    if (this.#busy || !this.#waiting) return null
    this.#busy = true
    this.#waiting = false
    return this.#fill()
      .catch((error: unknown) => {
        if (this.#parts.closing.aborted) return
        this.#parts.log.error({ err: error }, 'invariants of candidates could not be computed')
      })
      .finally(() => {
        this.#busy = false
        if (this.#again) {
          this.#again = false
          this.#after = ''
          this.#waiting = true
        }
        if (this.#waiting) return
        this.#parts.scheduler.remove(this)
        this.#listeners.forEach((resolve) => resolve())
        this.#listeners.clear()
      })
  }

  async #fill(): Promise<void> {
    const { source, storage, writes } = this.#parts
    const candidates =
      this.#wanted.size > 0
        ? await readForInvariants(source.manager, this.#takeWanted())
        : await this.#nextInOrder()
    const computed = await this.#compute(candidates)
    await storage.insist(() => writes.transaction((manager) => storeInvariants(manager, computed)))
  }

  #takeWanted(): string[] {
    const keys = [...this.#wanted].slice(0, stretchLength)
    keys.forEach((key) => this.#wanted.delete(key))
    this.#waiting = true
    return keys
  }

  async #nextInOrder(): Promise<CandidateGeometryInput[]> {
    const { manager } = this.#parts.source
    const candidates = await candidatesWithoutInvariants(manager, this.#after, stretchLength)
    this.#after = candidates.at(-1)?.key ?? this.#after
    if (candidates.length === stretchLength) this.#waiting = true
    return candidates
  }

  /** One that cannot be computed is logged and passed by, so that it does not hold up the others. */
  async #compute(candidates: readonly CandidateGeometryInput[]): Promise<ComputedInvariants[]> {
    const { background, closing, log } = this.#parts
    if (candidates.length === 0) return []
    try {
      return await background.run('invariants-of-each', { candidates })
    } catch (error) {
      closing.throwIfAborted()
      if (candidates.length === 1) {
        log.error({ err: error, candidate: candidates[0].key }, 'the invariants of a candidate are missing')
        return []
      }
    }
    const computed: ComputedInvariants[] = []
    for (const candidate of candidates) computed.push(...(await this.#compute([candidate])))
    return computed
  }
}
