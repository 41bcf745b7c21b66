import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import type { CreateSearch, SearchDetail, SearchProgress, SearchState } from '../../shared/searches.ts'
import type { ServerContext } from '../context.ts'
import { Search } from '../entities/search.ts'
import { SearchIsland } from '../entities/searchIsland.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { islandHits, type HitLine } from '../jobs/searchProgress.ts'
import type { IslandProgress } from '../jobs/segment.ts'
import { presentSearch } from '../presenters/searches.ts'
import { conflict, notFound } from '../problems.ts'
import { topFinds, withHitLine } from './finds.ts'
import { readHitLine, readNullSummary } from './nullSamples.ts'
import { requireSoundRule } from './rules.ts'
import { namedScope, resolveScope, scopeHash } from './scopes.ts'
import { readSearchEvents, recordSearchEvent } from './searchEvents.ts'
import { readVersion } from './targets.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/** Newest first. */
export function listSearches(manager: EntityManager, campaignId: string): Promise<Search[]> {
  return manager.find(Search, {
    where: { campaignId },
    relations: withWords,
    order: { createdAt: 'DESC', id: 'ASC' },
  })
}

export async function readSearch(
  manager: EntityManager,
  campaignId: string,
  searchId: string,
): Promise<SearchDetail> {
  const search = await manager.findOne(Search, { where: { campaignId, id: searchId }, relations: withWords })
  if (search === null) throw notFound('search')
  const shortlists = await manager.find(Shortlist, { where: { campaignId }, order: { createdAt: 'ASC' } })
  const line = await readHitLine(manager, search, search.targetVersion?.text ?? '')
  const top = await topFinds(manager, search, 20)
  return presentSearch(search, {
    progress: await progressWithHits(manager, search, line),
    nullSummary: await readNullSummary(manager, search),
    ownHitLine: line === 'rule',
    top: top.map((row) => ({ ...row, outcome: withHitLine(row.outcome, line) })),
    shortlists: shortlists.filter(({ searchIds }) => searchIds.includes(search.id)),
    events: await readSearchEvents(manager, search.id),
  })
}

/**
 * A search's progress with the hits of its islands. A null sample may be complete only after the search has ended, so
 * what lies above its quantile is counted here, from what each island stored last.
 */
export async function progressWithHits(
  manager: EntityManager,
  { id, progress }: Pick<Search, 'id' | 'progress'>,
  line: HitLine,
): Promise<SearchProgress> {
  if (line === 'rule') return progress
  if (line === null) return { ...progress, islands: progress.islands.map(withoutHits) }
  const rows = await manager.find(SearchIsland, {
    select: { searchId: true, number: true, progress: true },
    where: { searchId: id },
    order: { number: 'ASC' },
  })
  const islands = progress.islands.map((island, n) => {
    const text = rows.at(n)?.progress ?? null
    return text === null ? island : { ...island, ...islandHits(JSON.parse(text) as IslandProgress, line) }
  })
  return { ...progress, islands }
}

/** Versions before counted none where the rule has no hit line; that is not known to be none. */
function withoutHits({ hits, unsure, ...island }: SearchProgress['islands'][number]) {
  void [hits, unsure]
  return island
}

/**
 * Queues a search: its rule is checked, and the polytopes its scope holds now are written down. With the same
 * polytopes, rule, method, budget, islands and seed it gives the same result.
 */
export async function createSearch(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  input: CreateSearch,
): Promise<SearchDetail> {
  const { source, writes, streams, jobs } = context
  const version = await readVersion(source.manager, campaignId, input.targetVersionId)
  const { scoringHash, engineVersion } = requireSoundRule(version.text, 'targetVersionId')
  const scope = await namedScope(source.manager, campaignId, input.scope)
  const polytopes = await resolveScope(source.manager, campaignId, scope)
  const polytopeKeys = polytopes.map(({ key }) => key)
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    const earlier = await manager.countBy(Search, { campaignId })
    await manager.insert(Search, {
      id,
      campaignId,
      targetVersionId: version.id,
      name: input.name || `${version.target.name}, search ${earlier + 1}`,
      method: input.method,
      scope,
      polytopeKeys,
      scopeHash: scopeHash(polytopeKeys),
      budget: input.budget,
      seed: input.seed,
      islands: input.islands,
      keep: input.keep,
      surrogate: input.surrogate,
      scoringHash,
      engineVersion,
      state: 'queued',
      failureCode: null,
      failureMessage: null,
      progress: emptyProgress(input.islands),
      evaluations: 0,
      best: null,
      workMilliseconds: 0,
      leaseOwner: null,
      leaseUntil: null,
      authorId,
      createdAt: new Date().toISOString(),
      finishedAt: null,
    })
    await manager.insert(
      SearchIsland,
      Array.from({ length: input.islands }, (_, number) => ({
        searchId: id,
        number,
        segment: 0,
        state: null,
        progress: null,
        done: false,
      })),
    )
    await recordSearchEvent(manager, id, 'queued', { accountId: authorId })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'searches' })
  jobs.searches.enqueue(id)
  return readSearch(source.manager, campaignId, id)
}

export function emptyProgress(islands: number): SearchProgress {
  return {
    evaluations: 0,
    proposals: 0,
    accepted: 0,
    restarts: 0,
    feasible: 0,
    infeasible: 0,
    undefined: 0,
    best: null,
    bestKey: null,
    curve: [],
    islands: Array.from({ length: islands }, () => ({ evaluations: 0, best: null, exhausted: false })),
    exhausted: false,
    evaluationsPerSecond: null,
    secondsLeft: null,
  }
}

/** A running search keeps what it has committed and lets its slots go after the segments in hand. */
export function pauseSearch(
  context: ServerContext,
  campaignId: string,
  searchId: string,
  accountId: string,
): Promise<SearchDetail> {
  const from = ['queued', 'running'] as const
  return move(context, campaignId, searchId, { from, to: 'paused', word: 'paused', accountId })
}

/** Goes on from the last committed segment; also after a failure. */
export async function resumeSearch(
  context: ServerContext,
  campaignId: string,
  searchId: string,
  accountId: string,
): Promise<SearchDetail> {
  const from = ['paused', 'failed'] as const
  await move(context, campaignId, searchId, { from, to: 'queued', word: 'resumed', accountId })
  context.jobs.searches.enqueue(searchId)
  return readSearch(context.source.manager, campaignId, searchId)
}

/** Ends a search for good; what it found stays. */
export function cancelSearch(
  context: ServerContext,
  campaignId: string,
  searchId: string,
  accountId: string,
): Promise<SearchDetail> {
  const from = ['queued', 'running', 'paused', 'failed'] as const
  return move(context, campaignId, searchId, { from, to: 'cancelled', word: 'cancelled', accountId })
}

async function move(
  { source, writes, streams, jobs }: ServerContext,
  campaignId: string,
  searchId: string,
  step: {
    readonly from: readonly SearchState[]
    readonly to: SearchState
    readonly word: 'paused' | 'resumed' | 'cancelled'
    readonly accountId: string
  },
): Promise<SearchDetail> {
  await writes.transaction(async (manager) => {
    const search = await manager.findOneBy(Search, { campaignId, id: searchId })
    if (search === null) throw notFound('search')
    if (!step.from.includes(search.state)) {
      throw conflict('wrong-state', `This search is ${search.state}; it cannot be ${step.word}.`)
    }
    await manager.update(
      Search,
      { id: searchId, state: In([...step.from]) },
      {
        state: step.to,
        leaseOwner: null,
        leaseUntil: null,
        finishedAt: step.to === 'cancelled' ? new Date().toISOString() : null,
        ...(step.to === 'queued' ? { failureCode: null, failureMessage: null } : {}),
      },
    )
    await recordSearchEvent(manager, searchId, step.word, { accountId: step.accountId })
  })
  if (step.to !== 'queued') jobs.searches.release(searchId)
  const detail = await readSearch(source.manager, campaignId, searchId)
  streams.toCampaign(campaignId, {
    kind: 'search',
    id: searchId,
    state: detail.state,
    progress: detail.progress,
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'searches' })
  return detail
}
