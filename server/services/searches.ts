import { randomUUID } from 'node:crypto'
import { In, LessThan, type EntityManager } from 'typeorm'
import { startless } from '../../shared/searches.ts'
import type { CreateSearch, SearchDetail, SearchProgress, SearchState } from '../../shared/searches.ts'
import { engineVersion as presentEngine, islandBudget } from '../../scoring/index.ts'
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
import { requireInScope, resolveStarts, storeStarts } from './searchStarts.ts'
import { readSearchEvents, recordSearchEvent } from './searchEvents.ts'
import { readVersion } from './targets.ts'

const [mostEvaluations, mostExtensions] = [1_000_000, 100]

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
  const { imported } = search
  const nullSummary = imported ? imported.null : await readNullSummary(manager, search)
  const known = await readHitLine(manager, search, search.targetVersion?.text ?? '')
  // A result is compared with the null sample that it reports itself.
  const line = imported && known !== 'rule' ? (imported.null?.quantile99 ?? null) : known
  const top = await topFinds(manager, search, 20)
  return presentSearch(search, {
    progress: imported ? search.progress : await progressWithHits(manager, search, line),
    nullSummary,
    ahead:
      search.state === 'queued'
        ? await manager.countBy(Search, { state: 'queued', createdAt: LessThan(search.createdAt) })
        : null,
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
 * polytopes, rule, method, settings, budget, islands, seed and candidates to begin from it gives the same result.
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
  const given = input.starts && (await resolveStarts(source.manager, campaignId, input.starts))
  if (given) requireInScope(given.starts, polytopeKeys)
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
      settings: input.settings ?? {},
      startsFrom: given
        ? {
            kind: given.kind,
            id: given.id,
            name: given.name,
            count: given.starts.length,
            used: !startless.includes(input.method),
          }
        : null,
      extensions: [],
      imported: null,
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
      leaseBeat: null,
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
    if (given) await storeStarts(manager, id, given.starts)
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

/**
 * Adds budget to a search that has ended or is paused; one that has ended goes on at once. When it is asked for makes no
 * difference: see `extensionsSchema` of the engine.
 */
export async function extendSearch(
  context: ServerContext,
  campaignId: string,
  searchId: string,
  evaluations: number,
  accountId: string,
): Promise<SearchDetail> {
  const { source, writes, streams, jobs } = context
  // A segment that is still in hand was begun without the extension.
  await jobs.searches.settled(searchId)
  const isOver = await writes.transaction(async (manager) => {
    const search = await manager.findOneBy(Search, { campaignId, id: searchId })
    if (search === null) throw notFound('search')
    requireExtendable(search, evaluations)
    const { state, budget, extensions, progress } = search
    const isOver = state === 'finished'
    await manager.update(
      Search,
      { id: searchId },
      {
        budget: budget + evaluations,
        extensions: [...extensions, evaluations],
        progress: { ...progress, budget: (progress.budget ?? budget) + evaluations, secondsLeft: null },
        ...(isOver && { state: 'queued' as const, finishedAt: null }),
      },
    )
    await extendIslands(manager, search, evaluations)
    await recordSearchEvent(manager, searchId, 'extended', {
      accountId,
      note: `+ ${evaluations} evaluations`,
    })
    return isOver
  })
  if (isOver) jobs.searches.enqueue(searchId)
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

/** Each island gets its share; one that has nothing left to find says so again at its next segment. */
async function extendIslands(
  manager: EntityManager,
  { id, islands: count }: Search,
  evaluations: number,
): Promise<void> {
  for (const { number, progress } of await manager.findBy(SearchIsland, { searchId: id })) {
    const before = progress === null ? null : (JSON.parse(progress) as IslandProgress)
    const share = islandBudget({ budget: evaluations, islands: count }, number)
    const budget = before?.budget === undefined || before.exhausted ? before?.budget : before.budget + share
    await manager.update(
      SearchIsland,
      { searchId: id, number },
      { done: false, progress: before && JSON.stringify({ ...before, budget }) },
    )
  }
}

/** @throws Refusal 409 */
function requireExtendable(search: Search, evaluations: number): void {
  const { state, imported, method, progress, budget, extensions } = search
  if (imported !== null) {
    throw conflict('imported-result', 'This result was run elsewhere; its state is not here to go on from.')
  }
  if (state !== 'finished' && state !== 'paused') {
    throw conflict(
      'wrong-state',
      `This search is ${state}; one that is paused or has finished can be extended.`,
    )
  }
  if (method === 'exhaustive' || progress.exhausted) {
    throw conflict(
      'nothing-left',
      'This search has ended because nothing new turns up: more budget would not be used.',
    )
  }
  if (search.engineVersion !== presentEngine) {
    throw conflict(
      'engine-changed',
      `This search ran with engine ${search.engineVersion}; the engine is ${presentEngine} now. Start a new search.`,
    )
  }
  if (budget + evaluations > mostEvaluations || extensions.length >= mostExtensions) {
    throw conflict(
      'too-long',
      `A search makes at most ${mostEvaluations} evaluations in all, with at most ${mostExtensions} extensions.`,
    )
  }
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
        leaseBeat: null,
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
