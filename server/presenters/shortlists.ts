import type { Assignee } from '../../shared/assignments.ts'
import type { CertificateMark } from '../../shared/certificates.ts'
import type { ShortlistDetail, ShortlistRow, ShortlistSummary } from '../../shared/shortlists.ts'
import type { Search } from '../entities/search.ts'
import type { Shortlist } from '../entities/shortlist.ts'
import type { ShortlistEntry } from '../entities/shortlistEntry.ts'
import type { Verdict } from '../entities/verdict.ts'
import type { ExternalContents } from '../services/externalTables.ts'
import { presentVerdict } from './verdicts.ts'

export interface Tally {
  readonly size: number
  readonly verified: number
  readonly rejected: number
  /** Of the undecided ones, those verified by the first of two readers. */
  readonly oneReader: number
  readonly waiting: ShortlistSummary['waiting']
}

/** @param shortlist with author, target version and target loaded */
export function presentShortlistSummary(shortlist: Shortlist, tally: Tally): ShortlistSummary {
  const version = shortlist.targetVersion
  return {
    id: shortlist.id,
    name: shortlist.name,
    targetId: version?.targetId ?? '',
    targetName: version?.target?.name ?? '',
    targetVersion: version?.number ?? 0,
    targetVersionId: shortlist.targetVersionId,
    size: tally.size,
    undecided: tally.size - tally.verified - tally.rejected,
    verified: tally.verified,
    rejected: tally.rejected,
    oneReader: tally.oneReader,
    waiting: tally.waiting,
    issue: shortlist.issue,
    reissueOfId: shortlist.reissueOfId,
    createdAt: shortlist.createdAt,
    author: shortlist.author?.name ?? '',
  }
}

export interface ShortlistContents {
  readonly tally: Tally
  readonly searches: readonly Pick<Search, 'id' | 'name' | 'seed'>[]
  /** Lists made from it by scoring it anew. */
  readonly rescored: ShortlistDetail['rescored']
  /** By rank, with candidate and polytope loaded. */
  readonly entries: readonly ShortlistEntry[]
  /** The latest verdict per candidate key. */
  readonly verdicts: ReadonlyMap<string, Verdict>
  readonly certificateOf: (candidateKey: string) => CertificateMark
  /** The campaign's own names of its imports, by polytope key. */
  readonly names: ReadonlyMap<string, string>
  /** By candidate key. */
  readonly assignees: ReadonlyMap<string, Assignee>
  readonly reissueOf: ShortlistDetail['reissueOf']
  readonly reissues: ShortlistDetail['reissues']
  readonly external: ExternalContents
}

export function presentShortlist(shortlist: Shortlist, contents: ShortlistContents): ShortlistDetail {
  return {
    ...presentShortlistSummary(shortlist, contents.tally),
    rule: shortlist.targetVersion?.text ?? '',
    scoringHash: shortlist.scoringHash,
    engineVersion: shortlist.engineVersion,
    columns: shortlist.columns,
    searches: contents.searches.map(({ id, name, seed }) => ({ id, name, seed })),
    provenance: shortlist.provenance,
    rescored: contents.rescored,
    reissueOf: contents.reissueOf,
    reissues: contents.reissues,
    external: [...contents.external.columns],
    rows: contents.entries.map((entry) => presentEntry(entry, contents)),
  }
}

function presentEntry(
  entry: ShortlistEntry,
  { verdicts, certificateOf, names, assignees, external }: ShortlistContents,
): ShortlistRow {
  const polytope = entry.candidate?.polytope
  if (!polytope) throw new Error('A shortlist entry was presented without its polytope.')
  const verdict = verdicts.get(entry.candidateKey)
  return {
    rank: entry.rank,
    front: entry.front,
    previous: presentPrevious(entry),
    candidateKey: entry.candidateKey,
    polytopeKey: polytope.key,
    polytopeName: names.get(polytope.key) ?? polytope.name,
    h11: polytope.h11,
    h21: polytope.h21,
    outcome: entry.outcome,
    searchId: entry.searchId,
    certificate: certificateOf(entry.candidateKey),
    verdict: verdict ? presentVerdict(verdict) : null,
    assignee: assignees.get(entry.candidateKey) ?? null,
    external: external.valuesOf(entry.candidateKey),
  }
}

function presentPrevious({ previousRank, previousOutcome }: ShortlistEntry): ShortlistRow['previous'] {
  if (previousRank === null || previousOutcome === null) return null
  const { kind } = previousOutcome
  return { rank: previousRank, kind, score: kind === 'feasible' ? previousOutcome.score : null }
}
