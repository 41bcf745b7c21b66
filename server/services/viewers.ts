import type { EntityManager } from 'typeorm'
import { Membership } from '../entities/membership.ts'
import { notFound } from '../problems.ts'
import type { Viewer } from './visibility.ts'

/**
 * An account that looks from inside one campaign, or from all of its campaigns at once.
 *
 * @throws Refusal 404 when the account does not belong to the campaign
 */
export async function viewerOf(
  manager: EntityManager,
  accountId: string,
  campaignId: string | undefined,
): Promise<Viewer> {
  if (campaignId === undefined) return { accountId }
  if (!(await manager.existsBy(Membership, { campaignId, accountId }))) throw notFound('campaign')
  return { campaignId }
}
