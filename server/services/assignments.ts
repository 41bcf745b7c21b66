import type { EntityManager } from 'typeorm'
import type { Assign, Assigned, Assignee } from '../../shared/assignments.ts'
import { may } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Assignment } from '../entities/assignment.ts'
import { Membership } from '../entities/membership.ts'
import { Target } from '../entities/target.ts'
import { unprocessable } from '../problems.ts'
import { visibleKeys } from './candidates.ts'

/** Rows per statement: SQLite takes a limited number of values in one. */
const rowsPerInsert = 500

/** Hands candidates of a target to a member who gives verdicts, or to nobody in particular. */
export async function assign(
  { source, writes, streams }: ServerContext,
  campaignId: string,
  authorId: string,
  { targetId, candidateKeys, accountId }: Assign,
): Promise<Assigned> {
  const keys = [...new Set(candidateKeys)]
  const seen = await visibleKeys(source.manager, { campaignId }, keys)
  const missing = keys.find((key) => !seen.has(key))
  if (missing !== undefined) {
    throw unprocessable('no-such-candidate', 'This campaign knows no such candidate.', {
      path: 'candidateKeys',
      found: missing,
    })
  }
  const assignee = await writes.transaction(async (manager) => {
    if (!(await manager.existsBy(Target, { id: targetId, campaignId }))) {
      throw unprocessable('no-such-target', 'This campaign has no such target.', {
        path: 'targetId',
        found: targetId,
      })
    }
    const found = accountId === null ? null : await readReviewer(manager, campaignId, accountId)
    await manager
      .createQueryBuilder()
      .delete()
      .from(Assignment)
      .where('targetId = :targetId AND candidateKey IN (SELECT value FROM json_each(:keys))', {
        targetId,
        keys: JSON.stringify(keys),
      })
      .execute()
    if (found) await insertAll(manager, keys, { targetId, campaignId, reviewerId: found.id, authorId })
    return found
  })
  const assigned = { targetId, candidateKeys: keys, assignee }
  streams.toCampaign(campaignId, { kind: 'assigned', ...assigned })
  return assigned
}

async function insertAll(
  manager: EntityManager,
  keys: readonly string[],
  common: Pick<Assignment, 'targetId' | 'campaignId' | 'reviewerId' | 'authorId'>,
): Promise<void> {
  const createdAt = new Date().toISOString()
  const rows = keys.map((candidateKey) => ({ ...common, candidateKey, createdAt }))
  for (let from = 0; from < rows.length; from += rowsPerInsert) {
    await manager.insert(Assignment, rows.slice(from, from + rowsPerInsert))
  }
}

/** A member whose role gives verdicts. */
async function readReviewer(
  manager: EntityManager,
  campaignId: string,
  accountId: string,
): Promise<Assignee> {
  const membership = await manager.findOne(Membership, {
    where: { campaignId, accountId },
    relations: { account: true },
  })
  if (!membership?.account) {
    throw unprocessable('no-such-member', 'This campaign has no such member.', {
      path: 'accountId',
      found: accountId,
    })
  }
  const { account, role } = membership
  if (!may(role, 'verdicts.give')) {
    throw unprocessable(
      'gives-no-verdicts',
      `${account.name} is a ${role} in this campaign and gives no verdicts; a lead can change the role.`,
      { path: 'accountId' },
    )
  }
  return { id: account.id, name: account.name }
}

/** Who is to judge each candidate of a target. */
export async function assignees(
  manager: EntityManager,
  targetId: string,
): Promise<ReadonlyMap<string, Assignee>> {
  const rows = await manager.query<(Assignee & { candidateKey: string })[]>(
    `SELECT a.candidateKey AS candidateKey, p.id AS id, p.name AS name
     FROM assignment a JOIN account p ON p.id = a.reviewerId WHERE a.targetId = ?`,
    [targetId],
  )
  return new Map(rows.map(({ candidateKey, id, name }) => [candidateKey, { id, name }]))
}

/** What somebody was given goes back to nobody when they leave or give no verdicts any more. */
export async function release(manager: EntityManager, campaignId: string, accountId: string): Promise<void> {
  await manager.delete(Assignment, { campaignId, reviewerId: accountId })
}
