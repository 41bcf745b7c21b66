import { In, type EntityManager } from 'typeorm'
import type { ShortlistProvenance } from '../../shared/shortlists.ts'
import { Search } from '../entities/search.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import { unprocessable } from '../problems.ts'
import { findsOf, type Entrant } from './assemblies.ts'
import { readNullSummary } from './nullSamples.ts'
import { requireSoundRule } from './rules.ts'
import { readVersion } from './targets.ts'

/** What a list is drawn from: the finds of searches as they stand, and the version by which they are ranked. */
export interface ShortlistGround {
  readonly searches: readonly Search[]
  readonly version: TargetVersion
  /** How the version scores: under the engine of the searches, or the present one where a version was named. */
  readonly scoringHash: string
  readonly engineVersion: string
  readonly finds: number
  readonly entrants: readonly Entrant[]
}

/** The finds of searches of the campaign as they stand, once each. */
export async function readFinds(
  manager: EntityManager,
  campaignId: string,
  searchIds: readonly string[],
): Promise<Pick<ShortlistGround, 'searches' | 'finds' | 'entrants'>> {
  const searches = await readSearches(manager, campaignId, searchIds)
  const { finds, entrants } = await findsOf(manager, searches)
  if (entrants.length === 0) {
    throw unprocessable('nothing-found', 'These searches have not found any candidate yet.', {
      path: 'searchIds',
    })
  }
  return { searches, finds, entrants }
}

export async function readGround(
  manager: EntityManager,
  campaignId: string,
  input: { readonly searchIds: readonly string[]; readonly targetVersionId?: string },
): Promise<ShortlistGround> {
  const ground = await readFinds(manager, campaignId, input.searchIds)
  const { searches } = ground
  if (input.targetVersionId !== undefined) {
    const version = await readVersion(manager, campaignId, input.targetVersionId)
    const { scoringHash, engineVersion } = requireSoundRule(version.text, 'targetVersionId')
    return { ...ground, version, scoringHash, engineVersion }
  }
  const [{ targetVersionId, scoringHash, engineVersion }] = searches
  if (searches.some((search) => search.scoringHash !== scoringHash)) {
    throw unprocessable(
      'mixed-targets',
      'These searches ran with different rules (or engine versions): their scores cannot be ranked in one list. Name the target version by which to rank them.',
      { path: 'searchIds' },
    )
  }
  const version = await readVersion(manager, campaignId, targetVersionId)
  return { ...ground, version, scoringHash, engineVersion }
}

/** Searches of the campaign in the order asked for, once each. */
async function readSearches(
  manager: EntityManager,
  campaignId: string,
  searchIds: readonly string[],
): Promise<Search[]> {
  const ids = [...new Set(searchIds)]
  const searches = await manager.find(Search, {
    where: { campaignId, id: In(ids) },
    relations: { targetVersion: { target: true } },
  })
  const missing = ids.find((id) => searches.every((search) => search.id !== id))
  if (missing !== undefined) {
    throw unprocessable('no-such-search', 'This campaign has no such search.', {
      path: 'searchIds',
      found: missing,
    })
  }
  return searches.sort((a, b) => ids.indexOf(a.id) - ids.indexOf(b.id))
}

/** @param searches with target version and target loaded */
export async function frozenSearches(
  manager: EntityManager,
  searches: readonly Search[],
  listScoringHash: string,
): Promise<ShortlistProvenance['searches']> {
  const frozen: ShortlistProvenance['searches'] = []
  for (const search of searches) {
    const { targetVersion } = search
    const sample = await readNullSummary(manager, search)
    frozen.push({
      id: search.id,
      name: search.name,
      method: search.method,
      seed: search.seed,
      islands: search.islands,
      state: search.state,
      evaluations: search.evaluations,
      budget: search.budget,
      polytopes: search.polytopeKeys.length,
      targetName: targetVersion?.target?.name ?? '',
      targetVersion: targetVersion?.number ?? 0,
      rule: search.scoringHash === listScoringHash ? null : (targetVersion?.text ?? ''),
      scoringHash: search.scoringHash,
      engineVersion: search.engineVersion,
      null: sample && {
        law: sample.law,
        seed: sample.seed,
        size: sample.size,
        evaluated: sample.evaluated,
        best: sample.best,
      },
    })
  }
  return frozen
}
