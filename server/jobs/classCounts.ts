import type { WalkPosition } from '../../scoring/index.ts'
import { classCountLimit } from '../../shared/polytopeStructure.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { ClassNumbers } from './compute/classCount.ts'
import type { JobParts } from './jobParts.ts'
import type { WorkSource } from './scheduler.ts'

/** Classes per slice: short beside a segment of a search, so that a count holds nobody up. */
const slice = 200

type Counted = Pick<PolytopeRecord, 'key' | 'coordinates'>

interface Count {
  readonly campaigns: Set<string>
  readonly orbits: Set<string>
  /** What products and short walks gave; undefined before that was asked. */
  numbers?: ClassNumbers
  position: WalkPosition | null
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
  start(campaignId: string, polytope: Counted): void {
    const { key } = polytope
    const running = this.#running.get(key)
    if (running) {
      running.campaigns.add(campaignId)
      return
    }
    const count: Count = { campaigns: new Set([campaignId]), orbits: new Set(), position: null, seen: 0 }
    this.#running.set(key, count)
    const { scheduler, log, closing } = this.#parts
    const end = () => {
      scheduler.remove(work)
      this.#running.delete(key)
      this.#tell(key, count, true)
    }
    let busy = false
    const work: WorkSource = {
      campaignId,
      lane: 'counts',
      next: () => {
        if (busy) return null
        busy = true
        return this.#step(polytope, count).then(
          (ended) => {
            busy = false
            if (ended) end()
            else this.#tell(key, count, false)
          },
          (error: unknown) => {
            if (!closing.aborted) log.warn({ polytope: key, err: error }, 'a class count failed')
            end()
          },
        )
      },
    }
    scheduler.add(work)
  }

  /** One slice; resolves with whether it was the last. */
  async #step({ key, coordinates }: Counted, count: Count): Promise<boolean> {
    const { background } = this.#parts
    if (count.numbers === undefined) {
      const numbers = await background.run('class-numbers', { vertices: coordinates })
      count.numbers = numbers
      const { classes, candidates } = numbers
      if (classes === null) return false
      await this.#store(key, {
        ...numbersOf(classes),
        classOrbits: candidates === null ? null : Number(candidates),
      })
      // What is left is to count modulo symmetry, where a walk can.
      return candidates !== null || Number(classes) > classCountLimit
    }
    const { position, classes, keys } = await background.run('class-count', {
      vertices: coordinates,
      position: count.position,
      most: slice,
    })
    count.position = position
    count.seen += classes
    for (const orbit of keys) count.orbits.add(orbit)
    if (position === null) {
      await this.#store(key, { ...numbersOf(String(count.seen)), classOrbits: count.orbits.size })
      return true
    }
    if (count.seen < classCountLimit) return false
    if (count.numbers.classes === null) await this.#store(key, { classesSeen: count.seen })
    return true
  }

  #store(key: string, found: Partial<PolytopeRecord>): Promise<unknown> {
    const { storage, writes } = this.#parts
    return storage.insist(() =>
      writes.transaction((manager) => manager.update(PolytopeRecord, { key }, found)),
    )
  }

  #tell(key: string, { campaigns, seen }: Count, ended: boolean): void {
    for (const campaign of campaigns) {
      this.#parts.streams.toCampaign(campaign, { kind: 'class-count', key, seen, ended })
    }
  }
}

const numbersOf = (digits: string) => ({ classes: Number(digits), classDigits: digits, classesSeen: null })
