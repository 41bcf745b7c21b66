import type { NullSummary } from '../../shared/nullSamples.ts'
import type { ScoredRow } from '../../shared/outcomes.ts'
import type { SearchEventView } from '../../shared/searchEvents.ts'
import type { SearchDetail, SearchProgress, SearchSummary } from '../../shared/searches.ts'
import type { Search } from '../entities/search.ts'

/** @param search with author, target version and target loaded */
export function presentSearchSummary(search: Search): SearchSummary {
  const version = search.targetVersion
  return {
    id: search.id,
    name: search.name,
    state: search.state,
    method: search.method,
    targetId: version?.targetId ?? '',
    targetName: version?.target?.name ?? '',
    targetVersion: version?.number ?? 0,
    polytopes: search.polytopeKeys.length,
    budget: search.budget,
    seed: search.seed,
    evaluations: search.evaluations,
    best: search.best,
    createdAt: search.createdAt,
    finishedAt: search.finishedAt,
    author: search.author?.name ?? '',
    isImported: search.imported !== null,
  }
}

export interface SearchSurroundings {
  readonly progress: SearchProgress
  readonly nullSummary: NullSummary | null
  readonly ownHitLine: boolean
  readonly top: readonly ScoredRow[]
  readonly ahead: number | null
  readonly shortlists: readonly { readonly id: string; readonly name: string }[]
  readonly events: readonly SearchEventView[]
}

export function presentSearch(search: Search, around: SearchSurroundings): SearchDetail {
  return {
    ...presentSearchSummary(search),
    targetVersionId: search.targetVersionId,
    rule: search.targetVersion?.text ?? '',
    scoringHash: search.scoringHash,
    engineVersion: search.engineVersion,
    scope: search.scope,
    islands: search.islands,
    keep: search.keep,
    surrogate: search.surrogate,
    settings: search.settings,
    extensions: search.extensions,
    starts: search.startsFrom,
    imported: search.imported && { source: search.imported.source, checked: search.imported.checked },
    ahead: around.ahead,
    progress: around.progress,
    null: around.nullSummary,
    ownHitLine: around.ownHitLine,
    top: [...around.top],
    failure:
      search.failureCode === null ? null : { code: search.failureCode, message: search.failureMessage ?? '' },
    shortlists: around.shortlists.map(({ id, name }) => ({ id, name })),
    events: [...around.events],
  }
}
