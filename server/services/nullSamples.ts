import { randomUUID } from 'node:crypto'
import { IsNull, type EntityManager } from 'typeorm'
import { engineVersion } from '../../scoring/index.ts'
import type { NullSummary } from '../../shared/nullSamples.ts'
import { NullSample } from '../entities/nullSample.ts'
import { Search } from '../entities/search.ts'
import type { HitLine } from '../jobs/searchProgress.ts'
import type { NullChunkOutput } from '../jobs/nullChunk.ts'
import { leavesHitOpen } from './rules.ts'

/** Where a null sample lies: the same for all searches of one rule over one scope. */
export type NullAddress = Pick<Search, 'scopeHash' | 'scoringHash'>

/** The null sample of a search's scope and rule, as far as it has come; null before its first piece. */
export async function readNullSummary(
  manager: EntityManager,
  { scopeHash, scoringHash }: NullAddress,
): Promise<NullSummary | null> {
  // Its state, which may be large, stays where it is.
  const sample = await manager.findOne(NullSample, {
    select: { id: true, summary: true },
    where: { scopeHash, scoringHash },
  })
  return sample?.summary ?? null
}

/**
 * What counts as a hit: `rule` where the rule says so itself, else scores above the 99 % quantile of its null
 * sample; null while that is incomplete.
 */
export async function readHitLine(
  manager: EntityManager,
  address: NullAddress,
  ruleText: string,
): Promise<HitLine> {
  if (!leavesHitOpen(ruleText)) return 'rule'
  const summary = await readNullSummary(manager, address)
  return summary?.complete ? summary.quantile99 : null
}

/** The sample at an address, begun when there is none. */
export async function openNullSample(
  manager: EntityManager,
  { scopeHash, scoringHash }: NullAddress,
  { seed, size }: { readonly seed: number; readonly size: number },
): Promise<NullSample> {
  const known = await manager.findOneBy(NullSample, { scopeHash, scoringHash })
  if (known !== null) return known
  const sample = manager.create(NullSample, {
    id: randomUUID(),
    scopeHash,
    scoringHash,
    seed,
    size,
    complete: false,
    state: null,
    summary: null,
    failure: null,
  })
  await manager.insert(NullSample, sample)
  return sample
}

/** The state is dropped when the sample is complete: the summary is all that is used then. */
export async function commitNullChunk(
  manager: EntityManager,
  id: string,
  { state, summary, done }: NullChunkOutput,
): Promise<void> {
  await manager.update(NullSample, { id }, { state: done ? null : state, summary, complete: done })
}

export async function failNullSample(manager: EntityManager, id: string, failure: string): Promise<void> {
  await manager.update(NullSample, { id }, { failure })
}

/** The searches that are compared with a null sample. */
export function searchesAgainst(
  manager: EntityManager,
  { scopeHash, scoringHash }: NullAddress,
): Promise<Search[]> {
  return manager.find(Search, { select: { id: true, campaignId: true }, where: { scopeHash, scoringHash } })
}

/** One search for each null sample that is still to be drawn, with its target version loaded. */
export async function unfinishedNulls(manager: EntityManager): Promise<Search[]> {
  const samples = await manager.findBy(NullSample, { complete: false, failure: IsNull() })
  const searches: Search[] = []
  for (const { scopeHash, scoringHash } of samples) {
    const search = await manager.findOne(Search, {
      where: { scopeHash, scoringHash, engineVersion },
      relations: { targetVersion: true },
    })
    if (search !== null) searches.push(search)
  }
  return searches
}
