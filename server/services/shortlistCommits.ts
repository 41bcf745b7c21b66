import { randomUUID } from 'node:crypto'
import type { EntityManager } from 'typeorm'
import type { ShortlistProvenance } from '../../shared/shortlists.ts'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { Search } from '../entities/search.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import type { HitLine } from '../jobs/searchProgress.ts'
import type { DrawnList } from './assemblies.ts'
import { withHitLine } from './finds.ts'
import { readHitLine } from './nullSamples.ts'
import { reportColumns } from './rules.ts'

/** Rows per statement: SQLite takes a limited number of values in one. */
const rowsPerInsert = 1_000

export interface NewShortlist {
  readonly campaignId: string
  readonly authorId: string
  readonly name: string
  readonly version: TargetVersion
  readonly scoringHash: string
  readonly engineVersion: string
  /** The searches whose finds are in it; their null samples draw the hit line of a rule without one. */
  readonly searches: readonly Pick<Search, 'id' | 'scopeHash'>[]
  /** Those the list is said to come from, where its outcomes were taken over from another list. */
  readonly searchIds?: readonly string[]
  readonly chosen: DrawnList['chosen']
  readonly provenance: ShortlistProvenance | null
  /** Places in the list that was scored anew or issued anew, by candidate key. */
  readonly previous?: ReadonlyMap<string, { readonly rank: number; readonly outcome: OutcomeView }>
  readonly reissueOf?: Pick<Shortlist, 'id' | 'issue'>
}

/** Stores a list with everything it was made from, frozen; returns its identifier. */
export async function insertShortlist(manager: EntityManager, list: NewShortlist): Promise<string> {
  const { version, scoringHash, searches } = list
  const id = randomUUID()
  const lines = new Map<string, HitLine>()
  for (const search of searches) {
    const address = { scopeHash: search.scopeHash, scoringHash }
    lines.set(search.id, await readHitLine(manager, address, version.text))
  }
  await manager.insert(Shortlist, {
    id,
    campaignId: list.campaignId,
    targetVersionId: version.id,
    name: list.name,
    searchIds: [...(list.searchIds ?? searches.map((search) => search.id))],
    columns: reportColumns(version.text),
    scoringHash,
    engineVersion: list.engineVersion,
    provenance: list.provenance,
    reissueOfId: list.reissueOf?.id ?? null,
    issue: (list.reissueOf?.issue ?? 0) + 1,
    authorId: list.authorId,
    createdAt: new Date().toISOString(),
  })
  const entries = list.chosen.map(({ candidateKey, searchId, outcome, front }, place) => {
    const previous = list.previous?.get(candidateKey)
    return {
      shortlistId: id,
      rank: place + 1,
      candidateKey,
      searchId,
      outcome: withHitLine(outcome, searchId === null ? null : (lines.get(searchId) ?? null)),
      front,
      previousRank: previous?.rank ?? null,
      previousOutcome: previous?.outcome ?? null,
    }
  })
  for (let from = 0; from < entries.length; from += rowsPerInsert) {
    await manager.insert(ShortlistEntry, entries.slice(from, from + rowsPerInsert))
  }
  return id
}
