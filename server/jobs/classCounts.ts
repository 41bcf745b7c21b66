import type { WalkPosition } from '../../scoring/index.ts'
import { classCountLimit } from '../../shared/polytopeStructure.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { JobParts } from './jobParts.ts'
import type { WorkSource } from './scheduler.ts'

/** Classes per slice: short beside a segment of a search, so that a count holds nobody up. */
const slice = 100

interface Count {
  readonly campaigns: Set<string>
  readonly orbits: Set<string>
  seen: number
}

/**
 * Counts of all classes of a polytope, in slices on the background threads and in turn with the searches. The result
 * is kept with the polytope; a count that a restart cuts off is simply asked for again.
 */
export class ClassCounts {
  readonly #parts: JobParts
  readonly #running = new Map<string, Count>()

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  /** How many classes a count under way has seen; null when there is none. */
  seen(polytopeKey: string): number | null {
    return this.#running.get(polytopeKey)?.seen ?? null
  }

  /** Begins a count for a campaign, or joins the one under way. */
  start(campaignId: string, polytope: Pick<PolytopeRecord, 'key' | 'coordinates'>): void {
    const { key, coordinates } = polytope
    const running = this.#running.get(key)
    if (running) {
      running.campaigns.add(campaignId)
      return
    }
    const count: Count = { campaigns: new Set([campaignId]), orbits: new Set(), seen: 0 }
    this.#running.set(key, count)
    const { scheduler, background, log } = this.#parts
    let position: WalkPosition | null = null
    let busy = false
    const end = () => {
      scheduler.remove(work)
      this.#running.delete(key)
      this.#tell(key, count, true)
    }
    const step = async () => {
      const output = await background.run('class-count', { vertices: coordinates, position, most: slice })
      count.seen += output.classes
      for (const orbit of output.keys) count.orbits.add(orbit)
      position = output.position
      const complete = position === null
      if (complete || count.seen >= classCountLimit) {
        await this.#store(key, count, complete)
        end()
      } else this.#tell(key, count, false)
    }
    const work: WorkSource = {
      campaignId,
      next: () => {
        if (busy) return null
        busy = true
        return step().then(
          () => {
            busy = false
          },
          (error: unknown) => {
            if (!this.#parts.closing.aborted) log.warn({ polytope: key, err: error }, 'a class count failed')
            end()
          },
        )
      },
    }
    scheduler.add(work)
  }

  #store(key: string, { seen, orbits }: Count, complete: boolean): Promise<unknown> {
    return this.#parts.writes.transaction((manager) =>
      manager.update(
        PolytopeRecord,
        { key },
        complete ? { classes: seen, classOrbits: orbits.size, classesSeen: null } : { classesSeen: seen },
      ),
    )
  }

  #tell(key: string, { campaigns, seen }: Count, ended: boolean): void {
    for (const campaign of campaigns) {
      this.#parts.streams.toCampaign(campaign, { kind: 'class-count', key, seen, ended })
    }
  }
}
