import type { EntityManager } from 'typeorm'
import type { CandidateRecord as CandidateRecordView } from '../../shared/candidates.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { presentVerdict } from '../presenters/verdicts.ts'
import { notFound } from '../problems.ts'
import { certificateMarks } from './certificates.ts'
import { listVerdicts } from './verdicts.ts'
import { mayBeSeen, type Viewer } from './visibility.ts'

/** Those of the keys that name stored candidates on polytopes that the viewer may see, with the polytopes loaded. */
export function listVisibleCandidates(
  manager: EntityManager,
  viewer: Viewer,
  keys: readonly string[],
): Promise<CandidateRecord[]> {
  return manager
    .createQueryBuilder(CandidateRecord, 'candidate')
    .innerJoinAndSelect('candidate.polytope', 'polytope')
    .where('candidate.key IN (:...keys)', { keys })
    .andWhere(mayBeSeen(viewer), viewer)
    .getMany()
}

/** A stored candidate on a polytope that the viewer may see, with the polytope loaded. */
export async function readVisibleCandidate(
  manager: EntityManager,
  viewer: Viewer,
  key: string,
): Promise<CandidateRecord> {
  const [candidate] = await listVisibleCandidates(manager, viewer, [key])
  if (!candidate) throw notFound('candidate')
  return candidate
}

/** Those of the keys that name stored candidates on polytopes that the viewer may see; without loading them. */
export async function visibleKeys(
  manager: EntityManager,
  viewer: Viewer,
  keys: readonly string[],
): Promise<Set<string>> {
  const rows = await manager
    .createQueryBuilder(CandidateRecord, 'candidate')
    .innerJoin('candidate.polytope', 'polytope')
    .select('candidate.key', 'key')
    .where('candidate.key IN (SELECT value FROM json_each(:keys))', { keys: JSON.stringify(keys) })
    .andWhere(mayBeSeen(viewer), viewer)
    .getRawMany<{ key: string }>()
  return new Set(rows.map(({ key }) => key))
}

export function readCampaignCandidate(
  manager: EntityManager,
  campaignId: string,
  key: string,
): Promise<CandidateRecord> {
  return readVisibleCandidate(manager, { campaignId }, key)
}

/** What a campaign knows of a candidate: its places in shortlists and the verdicts on it. */
export async function readCandidateRecord(
  manager: EntityManager,
  campaignId: string,
  key: string,
): Promise<CandidateRecordView> {
  await readCampaignCandidate(manager, campaignId, key)
  const entries = await manager.find(ShortlistEntry, {
    where: { candidateKey: key, shortlist: { campaignId } },
    relations: { shortlist: { targetVersion: { target: true } }, search: true },
    order: { shortlist: { createdAt: 'DESC' } },
  })
  const appearances: CandidateRecordView['appearances'] = []
  for (const entry of entries) {
    const shortlist = entry.shortlist
    const version = shortlist?.targetVersion
    if (!shortlist || !version) continue
    const { search } = entry
    const keyAt = async (rank: number) => {
      const neighbour = await manager.findOneBy(ShortlistEntry, { shortlistId: shortlist.id, rank })
      return neighbour?.candidateKey ?? null
    }
    appearances.push({
      shortlistId: shortlist.id,
      shortlistName: shortlist.name,
      rank: entry.rank,
      size: await manager.countBy(ShortlistEntry, { shortlistId: shortlist.id }),
      targetId: version.targetId,
      targetName: version.target?.name ?? '',
      targetVersion: version.number,
      targetVersionId: version.id,
      rule: version.text,
      scoringHash: shortlist.scoringHash,
      engineVersion: shortlist.engineVersion,
      outcome: entry.outcome,
      certificate: (await certificateMarks(manager, campaignId, version, [key]))(key),
      search: search ? { id: search.id, name: search.name, seed: search.seed } : null,
      previousKey: await keyAt(entry.rank - 1),
      nextKey: await keyAt(entry.rank + 1),
    })
  }
  const verdicts = await listVerdicts(manager, campaignId, key)
  const imported = await manager.findOne(ImportedCandidate, {
    where: { campaignId, candidateKey: key },
    relations: { author: true },
  })
  return {
    key,
    appearances,
    verdicts: verdicts.map(presentVerdict),
    imported: imported && {
      name: imported.name,
      source: imported.source,
      line: imported.line,
      author: imported.author?.name ?? '',
      createdAt: imported.createdAt,
    },
  }
}
