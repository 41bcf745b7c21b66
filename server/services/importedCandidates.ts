import { In, type EntityManager, type SelectQueryBuilder } from 'typeorm'
import type { z } from 'zod'
import type {
  EarlierVerdict,
  ImportedCandidate as ImportedView,
  importedCandidatesQuerySchema,
} from '../../shared/importedCandidates.ts'
import type { ServerContext } from '../context.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { Verdict } from '../entities/verdict.ts'
import { presentEarlierVerdict, presentImportedCandidate } from '../presenters/importedCandidates.ts'
import { notFound } from '../problems.ts'
import { ownNames } from './polytopes.ts'

/** A page of what a campaign imported, newest first, and how many match. */
export async function listImportedCandidates(
  manager: EntityManager,
  campaignId: string,
  { text, offset, limit }: z.infer<typeof importedCandidatesQuerySchema>,
): Promise<{ total: number; rows: ImportedView[] }> {
  const query = matching(manager, campaignId, text)
  const total = await query.getCount()
  const rows = await query
    .orderBy('imported.createdAt', 'DESC')
    .addOrderBy('imported.source', 'ASC')
    .addOrderBy('imported.line', 'ASC')
    .addOrderBy('imported.candidateKey', 'ASC')
    .offset(offset)
    .limit(limit)
    .getMany()
  const polytopes = rows.flatMap(({ candidate }) => (candidate?.polytope ? [candidate.polytope] : []))
  const names = await ownNames(manager, { campaignId }, polytopes)
  const verdicts = await earlierVerdicts(
    manager,
    campaignId,
    rows.map(({ candidateKey }) => candidateKey),
  )
  return { total, rows: rows.map((row) => presentImportedCandidate(row, names, verdicts)) }
}

function matching(
  manager: EntityManager,
  campaignId: string,
  text: string | undefined,
): SelectQueryBuilder<ImportedCandidate> {
  const query = manager
    .createQueryBuilder(ImportedCandidate, 'imported')
    .innerJoinAndSelect('imported.author', 'author')
    .innerJoinAndSelect('imported.candidate', 'candidate')
    .innerJoinAndSelect('candidate.polytope', 'polytope')
    .where('imported.campaignId = :campaignId', { campaignId })
  if (text === undefined || text.trim() === '') return query
  const escaped = text.trim().replace(/[\\%_]/g, '\\$&')
  return query.andWhere(
    `(imported.name LIKE :inside ESCAPE '\\' OR imported.source LIKE :inside ESCAPE '\\'
      OR polytope.name LIKE :inside ESCAPE '\\' OR imported.candidateKey LIKE :ahead ESCAPE '\\')`,
    { inside: `%${escaped}%`, ahead: `${escaped}%` },
  )
}

/** The latest word of the campaign on each candidate, per target, the newest first. */
export async function earlierVerdicts(
  manager: EntityManager,
  campaignId: string,
  candidateKeys: readonly string[],
): Promise<Map<string, EarlierVerdict[]>> {
  if (candidateKeys.length === 0) return new Map()
  const verdicts = await manager.find(Verdict, {
    where: { campaignId, candidateKey: In([...candidateKeys]) },
    relations: { targetVersion: { target: true } },
    order: { id: 'DESC' },
  })
  const latest = new Map<string, EarlierVerdict[]>()
  for (const verdict of verdicts) {
    const own = latest.get(verdict.candidateKey) ?? []
    latest.set(verdict.candidateKey, own)
    const view = presentEarlierVerdict(verdict)
    if (own.every(({ targetId }) => targetId !== view.targetId)) own.push(view)
  }
  return latest
}

/** True when a search of the campaign found the candidate, or a shortlist of it holds it. */
export async function foundInCampaign(
  manager: EntityManager,
  campaignId: string,
  candidateKey: string,
): Promise<boolean> {
  const rows = await manager.query<unknown[]>(
    `SELECT 1 FROM find f JOIN search s ON s.id = f.searchId WHERE f.candidateKey = ? AND s.campaignId = ?
     UNION
     SELECT 1 FROM shortlist_entry e JOIN shortlist l ON l.id = e.shortlistId
       WHERE e.candidateKey = ? AND l.campaignId = ?`,
    [candidateKey, campaignId, candidateKey, campaignId],
  )
  return rows.length > 0
}

/** Takes a candidate off the list of imports; the candidate, its verdicts and its places in shortlists stay. */
export async function forgetImportedCandidate(
  { writes, streams }: ServerContext,
  campaignId: string,
  candidateKey: string,
): Promise<void> {
  await writes.transaction(async (manager) => {
    const { affected } = await manager.delete(ImportedCandidate, { campaignId, candidateKey })
    if (affected === 0) throw notFound('imported candidate')
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'imports' })
}
