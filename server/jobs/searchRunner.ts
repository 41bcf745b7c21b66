import { In } from 'typeorm'
import { engineVersion } from '../../scoring/index.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { Find } from '../entities/find.ts'
import { Search } from '../entities/search.ts'
import { SearchIsland } from '../entities/searchIsland.ts'
import { unfinishedNulls } from '../services/nullSamples.ts'
import { failSearch, takeLease, type IslandFind } from '../services/searchCommits.ts'
import type { JobParts } from './jobParts.ts'
import { isFree, leaseMilliseconds, thisProcess } from './lease.ts'
import type { NullSampler } from './nullSampler.ts'
import { RunningSearch, type Island } from './runningSearch.ts'
import { polytopesText, readPolytopes, type ScoredScope } from './searchProblem.ts'
import type { IslandProgress } from './segment.ts'

/** Runs the searches of the database: takes them up, keeps their leases, lets them go. */
export class SearchRunner {
  readonly #parts: JobParts
  readonly #nulls: NullSampler
  readonly #running = new Map<string, RunningSearch>()
  /** Searches that were let go of with segments still in hand. */
  readonly #settling = new Map<string, Promise<void>>()
  readonly #listeners = new Map<string, (() => void)[]>()
  #heart: NodeJS.Timeout | null = null

  constructor(parts: JobParts, nulls: NullSampler) {
    this.#parts = parts
    this.#nulls = nulls
  }

  /**
   * Takes up every search that was queued or running when its process ended, and the null samples that were being
   * drawn; looks for abandoned searches from time to time.
   */
  async start(): Promise<void> {
    await this.#takeUpFree()
    for (const search of await unfinishedNulls(this.#parts.source.manager)) await this.#drawNull(search)
    this.#heart = setInterval(() => {
      this.#beat().catch((error: unknown) => this.#parts.log.error({ err: error }, 'leases were not renewed'))
    }, leaseMilliseconds / 3)
    this.#heart.unref()
  }

  stop(): void {
    if (this.#heart) clearInterval(this.#heart)
    for (const search of this.#running.values()) search.release()
  }

  /** Takes up a queued search. */
  enqueue(searchId: string): void {
    this.#takeUp(searchId).catch((error: unknown) => {
      if (this.#parts.closing.aborted) return
      this.#parts.log.error({ err: error, search: searchId }, 'a search could not be taken up')
    })
  }

  /** Lets go of a search that was paused or cancelled. */
  release(searchId: string): void {
    const search = this.#running.get(searchId)
    if (!search) return
    search.release()
    this.#forget(search)
  }

  /** Resolves when this process has nothing more to do for a search that was queued with `enqueue`. */
  ended(searchId: string): Promise<void> {
    return new Promise((resolve) => {
      this.#listeners.set(searchId, [...(this.#listeners.get(searchId) ?? []), resolve])
    })
  }

  #forget(search: RunningSearch): void {
    for (const resolve of this.#listeners.get(search.id) ?? []) resolve()
    this.#listeners.delete(search.id)
    this.#parts.scheduler.remove(search)
    this.#running.delete(search.id)
    const settled = search.settled().finally(() => {
      if (this.#settling.get(search.id) === settled) this.#settling.delete(search.id)
    })
    this.#settling.set(search.id, settled)
  }

  async #beat(): Promise<void> {
    const { writes } = this.#parts
    const ids = [...this.#running.keys()]
    if (ids.length > 0) {
      await writes.transaction((manager) =>
        manager.update(
          Search,
          { id: In(ids), leaseOwner: thisProcess },
          { leaseUntil: Date.now() + leaseMilliseconds },
        ),
      )
    }
    await this.#takeUpFree()
  }

  async #takeUpFree(): Promise<void> {
    const waiting = await this.#parts.source.manager.find(Search, {
      select: { id: true, leaseOwner: true, leaseUntil: true },
      where: { state: In(['queued', 'running']) },
      order: { createdAt: 'ASC' },
    })
    for (const search of waiting) if (isFree(search)) this.enqueue(search.id)
  }

  async #takeUp(searchId: string): Promise<void> {
    await this.#settling.get(searchId)
    if (this.#running.has(searchId)) return
    const { source, writes, scheduler, streams, closing } = this.#parts
    const search = await source.manager.findOne(Search, {
      where: { id: searchId, state: In(['queued', 'running']) },
      relations: { targetVersion: true },
    })
    if (!search?.targetVersion || !isFree(search)) return
    if (search.engineVersion !== engineVersion) {
      await writes.transaction((manager) =>
        failSearch(manager, searchId, engineChanged(search.engineVersion)),
      )
      return
    }
    const { scope, pointsMax } = await this.#scopeOf(search)
    const rows = await source.manager.find(SearchIsland, { where: { searchId }, order: { number: 'ASC' } })
    const islands = rows.map((row): Island => ({
      number: row.number,
      problem: {
        ...scope,
        method: search.method,
        seed: search.seed,
        island: row.number,
        settings: { budget: search.budget, islands: search.islands, keep: search.keep },
      },
      segment: row.segment,
      state: row.state,
      progress: row.progress === null ? null : (JSON.parse(row.progress) as IslandProgress),
      done: row.done,
      busy: false,
    }))
    const finds = await this.#readFinds(search)
    const taken = await writes.transaction((manager) => takeLease(manager, searchId))
    if (!taken || closing.aborted || this.#running.has(searchId)) return
    const running = new RunningSearch(search, islands, finds, this.#parts, (ended) => this.#forget(ended))
    this.#running.set(searchId, running)
    streams.toCampaign(search.campaignId, {
      kind: 'search',
      id: searchId,
      state: 'running',
      progress: search.progress,
    })
    scheduler.add(running)
    await this.#nulls.want(search, scope, pointsMax)
  }

  async #drawNull(search: Search): Promise<void> {
    const { scope, pointsMax } = await this.#scopeOf(search)
    await this.#nulls.want(search, scope, pointsMax)
  }

  /** @param search with its target version loaded */
  async #scopeOf(search: Search): Promise<{ scope: ScoredScope; pointsMax: number }> {
    if (!search.targetVersion) throw new Error('A search was read without its target version.')
    const records = await readPolytopes(this.#parts.source, search.polytopeKeys)
    const pointsMax = records.reduce((most, { points }) => Math.max(most, points), 0)
    return { scope: { rule: search.targetVersion.text, polytopes: polytopesText(records) }, pointsMax }
  }

  async #readFinds(search: Search): Promise<IslandFind[]> {
    const { manager } = this.#parts.source
    const finds = await manager.find(Find, {
      where: { searchId: search.id },
      relations: { candidate: true },
      order: { rank: 'ASC' },
    })
    const keys = finds.map(({ candidateKey }) => candidateKey)
    const values = await manager.findBy(CandidateValue, {
      scoringHash: search.scoringHash,
      candidateKey: In(keys),
    })
    const outcomes = new Map(values.map(({ candidateKey, outcome }) => [candidateKey, outcome]))
    return finds.flatMap(({ candidateKey, candidate, island }) => {
      const outcome = outcomes.get(candidateKey)
      if (!candidate || !outcome) return []
      return [
        { candidateKey, polytopeKey: candidate.polytopeKey, heights: candidate.heights, outcome, island },
      ]
    })
  }
}

function engineChanged(ran: string) {
  return {
    code: 'engine-changed',
    message: `This search ran with engine ${ran}; the engine is ${engineVersion} now. Start a new search.`,
  }
}
