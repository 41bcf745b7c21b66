import { In } from 'typeorm'
import { engineVersion } from '../../scoring/index.ts'
import type { SearchStanding } from '../../shared/searches.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { Find } from '../entities/find.ts'
import { Search } from '../entities/search.ts'
import { SearchIsland } from '../entities/searchIsland.ts'
import { unfinishedNulls } from '../services/nullSamples.ts'
import { failSearch, takeLease, type IslandFind } from '../services/searchCommits.ts'
import { originalBudget } from '../services/searchSpecifications.ts'
import { readStarts } from '../services/searchStarts.ts'
import type { JobParts } from './jobParts.ts'
import { LeasedRuns } from './leasedRuns.ts'
import type { NullSampler } from './nullSampler.ts'
import { RunningSearch, type Island } from './runningSearch.ts'
import { polytopesText, readPolytopes, type ScoredScope } from './searchProblem.ts'
import type { IslandProgress } from './segment.ts'

/** Runs the searches of the database. */
export class SearchRunner {
  readonly #parts: JobParts
  readonly #nulls: NullSampler
  readonly #runs: LeasedRuns<RunningSearch>

  constructor(parts: JobParts, nulls: NullSampler) {
    this.#parts = parts
    this.#nulls = nulls
    this.#runs = new LeasedRuns(parts, {
      entity: Search,
      word: 'search',
      takeUp: (id, holder) => this.#takeUp(id, holder),
    })
  }

  /**
   * Takes up every search that was queued or running when its process ended, and the null samples that were being
   * drawn; looks for abandoned searches from time to time.
   */
  async start(): Promise<void> {
    await this.#runs.start()
    for (const search of await unfinishedNulls(this.#parts.source.manager)) await this.#drawNull(search)
  }

  stop(): void {
    this.#runs.stop()
  }

  /** Takes up a queued search. */
  enqueue(searchId: string): void {
    this.#runs.enqueue(searchId)
  }

  /** Lets go of a search that was paused or cancelled; segments in hand are still committed. */
  release(searchId: string): void {
    this.#runs.release(searchId)
  }

  /** Resolves when no segment of a search that was let go of is in hand any more. */
  settled(searchId: string): Promise<void> {
    return this.#runs.settled(searchId)
  }

  /** Resolves when this process has nothing more to do for a search that was queued with `enqueue`. */
  ended(searchId: string): Promise<void> {
    return this.#runs.ended(searchId)
  }

  /** How the searches in the hands of this process stand, by their identifiers. */
  standings(): Map<string, SearchStanding> {
    const { scheduler, storage } = this.#parts
    const inLine = scheduler.standings()
    const standings = new Map<string, SearchStanding>()
    for (const run of this.#runs.runs()) {
      const standing = inLine.get(run)
      if (storage.trouble) standings.set(run.id, { kind: 'held', ...storage.trouble })
      else if (!standing) continue
      else if (standing.place === null) standings.set(run.id, { kind: 'working', threads: standing.inHand })
      else standings.set(run.id, { kind: 'waiting', place: standing.place, threads: scheduler.slots })
    }
    return standings
  }

  async #takeUp(searchId: string, holder: string | null): Promise<void> {
    const { source, writes, scheduler, streams, closing } = this.#parts
    const search = await source.manager.findOne(Search, {
      where: { id: searchId, state: In(['queued', 'running']) },
      relations: { targetVersion: true },
    })
    if (!search?.targetVersion) return
    if (search.engineVersion !== engineVersion) {
      await writes.transaction((manager) =>
        failSearch(manager, searchId, engineChanged(search.engineVersion)),
      )
      return
    }
    const { scope, pointsMax } = await this.#scopeOf(search)
    const starts = JSON.stringify(await readStarts(source.manager, searchId))
    const { islands: count, keep, surrogate, extensions } = search
    const settings = {
      ...search.settings,
      budget: originalBudget(search),
      islands: count,
      keep,
      surrogate,
    }
    const rows = await source.manager.find(SearchIsland, { where: { searchId }, order: { number: 'ASC' } })
    const islands = rows.map((row): Island => ({
      number: row.number,
      problem: {
        ...scope,
        method: search.method,
        seed: search.seed,
        island: row.number,
        settings,
        starts,
        extensions,
      },
      segment: row.segment,
      state: row.state,
      progress: row.progress === null ? null : (JSON.parse(row.progress) as IslandProgress),
      done: row.done,
      busy: false,
    }))
    const finds = await this.#readFinds(search)
    const taken = await writes.transaction((manager) => takeLease(manager, searchId, holder))
    if (!taken || closing.aborted) return
    const running = new RunningSearch(search, islands, finds, this.#parts, (ended) =>
      this.#runs.forget(ended),
    )
    this.#runs.hold(running)
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
