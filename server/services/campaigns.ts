import { randomUUID } from 'node:crypto'
import type { EntityManager } from 'typeorm'
import type { CampaignDetail, CampaignSummary } from '../../shared/campaigns.ts'
import type { Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Campaign } from '../entities/campaign.ts'
import { Membership } from '../entities/membership.ts'
import { presentCampaign, presentCampaignSummary, type CampaignCounts } from '../presenters/campaigns.ts'
import { listSearches } from './searches.ts'
import { listShortlists } from './shortlists.ts'
import { listTargets } from './targets.ts'
import { tallyShortlists } from './verdicts.ts'

/** The campaigns an account belongs to, by name. */
export async function listCampaigns(manager: EntityManager, accountId: string): Promise<CampaignSummary[]> {
  const memberships = await manager.find(Membership, {
    where: { accountId },
    relations: { campaign: true },
    order: { campaign: { name: 'ASC' } },
  })
  const counts = await countContents(
    manager,
    memberships.map(({ campaignId }) => campaignId),
  )
  return memberships.flatMap(({ campaign, role }) =>
    campaign ? [presentCampaignSummary(campaign, role, counts.get(campaign.id) ?? nothing)] : [],
  )
}

export async function readCampaign(
  manager: EntityManager,
  campaignId: string,
  role: Role,
): Promise<CampaignDetail> {
  const campaign = await manager.findOneByOrFail(Campaign, { id: campaignId })
  const counts = await countContents(manager, [campaignId])
  return presentCampaign(campaign, role, {
    counts: counts.get(campaignId) ?? nothing,
    members: await manager.find(Membership, {
      where: { campaignId },
      relations: { account: true },
      order: { account: { name: 'ASC' } },
    }),
    targets: await listTargets(manager, campaignId),
    searches: await listSearches(manager, campaignId),
    shortlists: await listShortlists(manager, campaignId),
    tallies: await tallyShortlists(manager, [campaignId]),
  })
}

/** Makes a campaign with its author as lead. */
export async function createCampaign(
  { writes, source }: Pick<ServerContext, 'writes' | 'source'>,
  authorId: string,
  input: { name: string; description: string },
): Promise<CampaignDetail> {
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    await manager.insert(Campaign, { id, ...input, createdAt: new Date().toISOString() })
    await manager.insert(Membership, { campaignId: id, accountId: authorId, role: 'lead' })
  })
  return readCampaign(source.manager, id, 'lead')
}

export async function editCampaign(
  { writes, source, streams }: ServerContext,
  campaign: { id: string; role: Role },
  input: { name?: string; description?: string; secondReader?: boolean },
): Promise<CampaignDetail> {
  const changes = Object.fromEntries(Object.entries(input).filter(([, value]) => value !== undefined))
  if (Object.keys(changes).length > 0) {
    await writes.transaction((manager) => manager.update(Campaign, { id: campaign.id }, changes))
    streams.toCampaign(campaign.id, { kind: 'changed', what: 'members' })
  }
  return readCampaign(source.manager, campaign.id, campaign.role)
}

const nothing: CampaignCounts = { targets: 0, searches: 0, runningSearches: 0, shortlists: 0, undecided: 0 }

async function countContents(
  manager: EntityManager,
  campaignIds: readonly string[],
): Promise<Map<string, CampaignCounts>> {
  if (campaignIds.length === 0) return new Map()
  const places = campaignIds.map(() => '?').join(', ')
  const rows = await manager.query<(Omit<CampaignCounts, 'undecided'> & { id: string })[]>(
    `SELECT c.id AS id,
       (SELECT COUNT(*) FROM target t WHERE t.campaignId = c.id) AS targets,
       (SELECT COUNT(*) FROM search s WHERE s.campaignId = c.id) AS searches,
       (SELECT COUNT(*) FROM search s WHERE s.campaignId = c.id AND s.state IN ('queued', 'running'))
         AS runningSearches,
       (SELECT COUNT(*) FROM shortlist l WHERE l.campaignId = c.id) AS shortlists
     FROM campaign c WHERE c.id IN (${places})`,
    [...campaignIds],
  )
  const undecided = new Map<string, number>()
  const tallies = await tallyShortlists(manager, campaignIds)
  const owners = await manager.query<{ id: string; campaignId: string }[]>(
    `SELECT s.id AS id, s.campaignId AS campaignId FROM shortlist s WHERE s.campaignId IN (${places})
       AND NOT EXISTS (SELECT 1 FROM shortlist n WHERE n.reissueOfId = s.id)`,
    [...campaignIds],
  )
  for (const { id, campaignId } of owners) {
    const tally = tallies.get(id)
    if (!tally) continue
    const open = tally.size - tally.verified - tally.rejected
    undecided.set(campaignId, (undecided.get(campaignId) ?? 0) + open)
  }
  return new Map(rows.map(({ id, ...counts }) => [id, { ...counts, undecided: undecided.get(id) ?? 0 }]))
}
