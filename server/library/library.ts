import type { FactsOrProblem } from '../jobs/compute/importBlocks.ts'
import type { PolytopeFacts } from '../jobs/compute/polytopeFacts.ts'
import type { WorkSource } from '../jobs/scheduler.ts'
import { loadedOf, storeBundled } from '../services/libraryRows.ts'
import { readBundledFile, type BundledFile, type BundledPolytope } from './bundled.ts'
import { Description, type DescriptionParts } from './description.ts'

const stretchLength = 40

/**
 * The bundled polytopes. At first start their normal forms and Hodge numbers are computed in the worker threads,
 * in turn with the searches; what the files say about them is checked, not trusted.
 */
export class Library {
  readonly #parts: DescriptionParts
  readonly #description: Description
  #loaded = 0
  #total = 0

  constructor(parts: DescriptionParts) {
    this.#parts = parts
    this.#description = new Description(parts)
  }

  /** How far loading has come; null when there is nothing left to load. */
  get loading(): { loaded: number; total: number } | null {
    return this.#loaded < this.#total ? { loaded: this.#loaded, total: this.#total } : null
  }

  /** Stored polytopes whose numbers are still being computed. */
  get undescribed(): number {
    return this.#description.left
  }

  /** Computes the numbers of the library for polytopes stored before these numbers existed. */
  describe(): Promise<void> {
    return this.#description.run()
  }

  /** Announces files to be loaded, so that progress is told over all of them. */
  async open(places: readonly URL[]): Promise<BundledFile[]> {
    const files = places.map(readBundledFile)
    for (const file of files) {
      this.#total += file.polytopes.length
      this.#loaded += await loadedOf(this.#parts.source.manager, file)
    }
    return files
  }

  /** Loads what is missing of files that were announced, one after the other. */
  async load(files: readonly BundledFile[]): Promise<void> {
    for (const file of files) {
      const from = await loadedOf(this.#parts.source.manager, file)
      if (from < file.polytopes.length) await this.#loadFrom(file, from)
    }
  }

  #loadFrom(file: BundledFile, from: number): Promise<void> {
    const { scheduler, pool, storage, writes, streams, log } = this.#parts
    let cursor = from
    let failed = false
    // Stretches may be computed side by side, but are stored in order: the stored count must have no gaps.
    let stored: Promise<void> = Promise.resolve()
    return new Promise((resolve, reject) => {
      const end = (outcome: () => void) => {
        scheduler.remove(source)
        outcome()
      }
      const source: WorkSource = {
        campaignId: 'library',
        next: () => {
          if (failed || cursor >= file.polytopes.length) return null
          const stretch = file.polytopes.slice(cursor, cursor + stretchLength)
          cursor += stretch.length
          const loaded = cursor
          const computed = pool.run('facts-of-each', { points: stretch.map(({ vertices }) => vertices) })
          // Its failure is met below, after the stretches before it.
          computed.catch(() => undefined)
          const before = stored
          stored = (async () => {
            await before
            const answers = await computed
            const rows = stretch.map((source, i) => ({ source, facts: assertedFacts(source, answers[i]) }))
            await storage.insist(() =>
              writes.transaction((manager) => storeBundled(manager, file, rows, loaded)),
            )
            this.#loaded += stretch.length
            streams.toAll({ kind: 'library', loaded: this.#loaded, total: this.#total })
            if (loaded === file.polytopes.length) end(resolve)
          })()
          stored.catch((error: unknown) => {
            if (failed) return
            failed = true
            log.warn({ file: file.name, err: error }, 'loading the bundled library stopped')
            end(() => reject(error))
          })
          return computed.then(
            () => undefined,
            () => undefined,
          )
        },
      }
      scheduler.add(source)
    })
  }
}

/** The engine's facts, after a comparison with what the file states. */
function assertedFacts(stated: BundledPolytope, answer: FactsOrProblem): PolytopeFacts {
  const { facts, problem } = answer
  if (!facts) throw new Error(`Bundled polytope ${stated.id} is refused: ${problem.message}`)
  for (const name of ['h11', 'h21', 'latticePoints', 'dualLatticePoints', 'favourable'] as const) {
    if (stated[name] !== facts[name]) {
      throw new Error(
        `Bundled polytope ${stated.id}: ${name} is ${facts[name]}, the file says ${stated[name]}.`,
      )
    }
  }
  return facts
}
