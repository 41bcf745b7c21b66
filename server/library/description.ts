import type { Logger } from 'pino'
import type { DataSource, EntityManager } from 'typeorm'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { ComputePool } from '../jobs/computePool.ts'
import { summaryVersion } from '../jobs/compute/polytopeSummary.ts'
import type { Scheduler, WorkSource } from '../jobs/scheduler.ts'
import { readPolytopes } from '../jobs/searchProblem.ts'
import type { StorageGate } from '../jobs/storageGate.ts'
import type { Streams } from '../streams.ts'
import type { WriteLock } from '../writeLock.ts'

const stretchLength = 40

export interface DescriptionParts {
  readonly source: DataSource
  readonly writes: WriteLock
  readonly streams: Streams
  readonly scheduler: Scheduler
  readonly storage: StorageGate
  readonly pool: ComputePool
  readonly log: Logger
}

/**
 * Computes the numbers of the library for polytopes that were stored before these numbers existed, in the worker
 * threads and in turn with the searches. An interrupted pass goes on at the next start: a row says which version
 * of the numbers it holds.
 */
export class Description {
  readonly #parts: DescriptionParts
  #left = 0

  constructor(parts: DescriptionParts) {
    this.#parts = parts
  }

  /** Polytopes that are still to be described by the pass under way. */
  get left(): number {
    return this.#left
  }

  async run(): Promise<void> {
    const { source, scheduler, streams } = this.#parts
    const keys = await staleKeys(source)
    this.#left = keys.length
    if (keys.length === 0) return
    streams.toAll({ kind: 'undescribed', left: this.#left })
    await new Promise<void>((resolve, reject) => {
      let cursor = 0
      let failed = false
      const work: WorkSource = {
        campaignId: 'library',
        next: () => {
          if (failed || cursor >= keys.length) return null
          const stretch = keys.slice(cursor, cursor + stretchLength)
          cursor += stretch.length
          return this.#describe(stretch).then(
            () => {
              this.#left -= stretch.length
              streams.toAll({ kind: 'undescribed', left: this.#left })
              if (this.#left > 0) return
              scheduler.remove(work)
              resolve()
            },
            (error: unknown) => {
              if (failed) return
              failed = true
              scheduler.remove(work)
              reject(error instanceof Error ? error : new Error(String(error)))
            },
          )
        },
      }
      scheduler.add(work)
    })
  }

  async #describe(keys: readonly string[]): Promise<void> {
    const { source, pool, storage, writes } = this.#parts
    const polytopes = await readPolytopes(source, keys)
    const summaries = await pool.run('summary-of-each', {
      vertices: polytopes.map(({ coordinates }) => coordinates),
    })
    const write = async (manager: EntityManager) => {
      for (const [at, { key }] of polytopes.entries()) {
        await manager.update(PolytopeRecord, { key }, summaries[at])
      }
    }
    await storage.insist(() => writes.transaction(write))
  }
}

async function staleKeys(source: DataSource): Promise<string[]> {
  const rows = await source.manager
    .createQueryBuilder(PolytopeRecord, 'polytope')
    .select('polytope.key', 'key')
    .where('polytope.summaryVersion IS NULL OR polytope.summaryVersion < :summaryVersion', { summaryVersion })
    .orderBy('polytope.h11')
    .addOrderBy('polytope.key')
    .getRawMany<{ key: string }>()
  return rows.map(({ key }) => key)
}
