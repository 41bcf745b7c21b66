import type { DataSource, EntityManager } from 'typeorm'
import { engineVersion, nullLaw } from '../../scoring/index.ts'
import type { Exploration, ExplorationSource } from '../../shared/explorations.ts'
import type { PolytopeRecord } from '../entities/polytope.ts'
import { Search } from '../entities/search.ts'
import { SearchSample } from '../entities/searchSample.ts'
import { polytopesText, readPolytopes } from '../jobs/searchProblem.ts'
import { notFound } from '../problems.ts'
import type { WriteLock } from '../writeLock.ts'
import { openNullSampleToExplore, snapshotSearchSample } from './exploredSamples.ts'
import { ownNames } from './polytopes.ts'
import { resolveScope, scopeHash } from './scopes.ts'

interface PolytopeName {
  readonly name: string
  readonly h11: number
  readonly h21: number
}

/** A sample that is going to be looked at, with all that names its candidates. */
export interface OpenedSource {
  readonly sampleId: string
  /** Seed it is drawn with; of no account for a search's. */
  readonly seed: number
  /** See `ScoredScope`. */
  readonly polytopes: string
  /** By polytope key, as the campaign calls them. */
  readonly names: ReadonlyMap<string, PolytopeName>
  readonly about: Pick<Exploration, 'size' | 'law' | 'engineVersion' | 'polytopes' | 'search'>
}

/**
 * The sample that a request means, in a campaign.
 *
 * @param inUse samples that somebody is looking at; they are not removed to make room
 * @throws Refusal for a scope or search that the campaign does not have
 */
export async function openSource(
  { source, writes }: { readonly source: DataSource; readonly writes: WriteLock },
  campaignId: string,
  asked: ExplorationSource,
  inUse: ReadonlySet<string>,
): Promise<OpenedSource> {
  const { manager } = source
  if (asked.kind === 'null') {
    const { scope, seed, size } = asked
    const polytopes = await resolveScope(manager, campaignId, scope)
    const address = { scopeHash: scopeHash(polytopes.map(({ key }) => key)), seed }
    const sample = await writes.transaction((inside) => openNullSampleToExplore(inside, address, inUse))
    const law = `${nullLaw.name}: ${nullLaw.description}`
    const about = { size, law, engineVersion, polytopes: polytopes.length, search: null }
    return { sampleId: sample.id, seed, ...(await named(manager, campaignId, polytopes)), about }
  }
  const { search, sample, islands } = await writes.transaction(async (inside) => {
    const search = await inside.findOneBy(Search, { campaignId, id: asked.search })
    if (search === null) throw notFound('search')
    const sample = await snapshotSearchSample(inside, search, inUse)
    return { search, sample, islands: await islandRows(inside, search) }
  })
  const polytopes = await readPolytopes(source, search.polytopeKeys)
  const about = {
    size: sample.drawn,
    law: 'A uniform sample of all evaluations of each island of the search: what the search chose to look at, not candidates nobody selected.',
    engineVersion: search.engineVersion,
    polytopes: polytopes.length,
    search: { id: search.id, name: search.name, islands },
  }
  return { sampleId: sample.id, seed: search.seed, ...(await named(manager, campaignId, polytopes)), about }
}

/** What the campaign calls a polytope of the sample, and its Hodge numbers. */
export function nameOf(names: OpenedSource['names'], key: string): PolytopeName {
  const name = names.get(key)
  if (name === undefined) throw new Error(`Polytope ${key} of a sample is not in its scope.`)
  return name
}

async function named(
  manager: EntityManager,
  campaignId: string,
  polytopes: readonly PolytopeRecord[],
): Promise<Pick<OpenedSource, 'polytopes' | 'names'>> {
  const own = await ownNames(manager, { campaignId }, polytopes)
  const names = polytopes.map(
    ({ key, name, h11, h21 }) => [key, { name: own.get(key) ?? name, h11, h21 }] as const,
  )
  return { polytopes: polytopesText(polytopes), names: new Map(names) }
}

/** Evaluations of each island, and the rows of its sample. */
async function islandRows(
  manager: EntityManager,
  { id, islands, progress }: Search,
): Promise<{ evaluations: number; rows: number }[]> {
  const counts = await Promise.all(
    Array.from({ length: islands }, (_, island) => manager.countBy(SearchSample, { searchId: id, island })),
  )
  return counts.map((rows, island) => ({ evaluations: progress.islands[island]?.evaluations ?? rows, rows }))
}
