import type { EntityManager } from 'typeorm'
import type { TargetUses } from '../../shared/targets.ts'
import { Search } from '../entities/search.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { Target } from '../entities/target.ts'
import { notFound } from '../problems.ts'

/** What each version of a target was used for, newest first. */
export async function readTargetUses(
  manager: EntityManager,
  campaignId: string,
  targetId: string,
): Promise<TargetUses> {
  if (!(await manager.existsBy(Target, { campaignId, id: targetId }))) throw notFound('target')
  const where = { campaignId, targetVersion: { targetId } }
  const order = { createdAt: 'DESC', id: 'ASC' } as const
  const searches = await manager.find(Search, {
    select: { id: true, targetVersionId: true, name: true, state: true, createdAt: true },
    where,
    order,
  })
  const shortlists = await manager.find(Shortlist, {
    select: { id: true, targetVersionId: true, name: true, createdAt: true },
    where,
    order,
  })
  const uses = new Map<string, TargetUses[number]>()
  const usesOf = (versionId: string): TargetUses[number] => {
    const known = uses.get(versionId) ?? { versionId, searches: [], shortlists: [] }
    uses.set(versionId, known)
    return known
  }
  for (const { targetVersionId, id, name, state, createdAt } of searches)
    usesOf(targetVersionId).searches.push({ id, name, state, createdAt })
  for (const { targetVersionId, id, name, createdAt } of shortlists)
    usesOf(targetVersionId).shortlists.push({ id, name, createdAt })
  return [...uses.values()]
}
