import type { EntityManager } from 'typeorm'
import { may, type Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Account } from '../entities/account.ts'
import { Membership } from '../entities/membership.ts'
import { conflict, notFound, unprocessable } from '../problems.ts'
import { normalAddress } from './accounts.ts'
import { release } from './assignments.ts'

export async function addMember(
  { writes, streams }: ServerContext,
  campaignId: string,
  input: { email: string; role: Role },
): Promise<void> {
  await writes.transaction(async (manager) => {
    const account = await manager.findOneBy(Account, { email: normalAddress(input.email) })
    if (account === null) {
      throw unprocessable(
        'no-such-account',
        'No account has this address. An administrator can create one.',
        {
          path: 'email',
          found: input.email,
        },
      )
    }
    if (await manager.existsBy(Membership, { campaignId, accountId: account.id })) {
      throw conflict('already-member', `${account.name} is already a member of this campaign.`)
    }
    await manager.insert(Membership, { campaignId, accountId: account.id, role: input.role })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'members' })
}

export async function changeRole(
  { writes, streams }: ServerContext,
  campaignId: string,
  accountId: string,
  role: Role,
): Promise<void> {
  await writes.transaction(async (manager) => {
    const membership = await findMember(manager, campaignId, accountId)
    if (membership.role === 'lead' && role !== 'lead') await keepOneLead(manager, campaignId)
    await manager.update(Membership, { campaignId, accountId }, { role })
    if (!may(role, 'verdicts.give')) await release(manager, campaignId, accountId)
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'members' })
}

/** Ends a membership, and with it the account's streams of this campaign. */
export async function removeMember(
  { writes, streams }: ServerContext,
  campaignId: string,
  accountId: string,
): Promise<void> {
  await writes.transaction(async (manager) => {
    const membership = await findMember(manager, campaignId, accountId)
    if (membership.role === 'lead') await keepOneLead(manager, campaignId)
    await manager.delete(Membership, { campaignId, accountId })
    await release(manager, campaignId, accountId)
  })
  streams.closeMembership(campaignId, accountId)
  streams.toCampaign(campaignId, { kind: 'changed', what: 'members' })
}

async function findMember(
  manager: EntityManager,
  campaignId: string,
  accountId: string,
): Promise<Membership> {
  const membership = await manager.findOneBy(Membership, { campaignId, accountId })
  if (membership === null) throw notFound('member')
  return membership
}

/** A campaign without a lead could never be managed again. */
async function keepOneLead(manager: EntityManager, campaignId: string): Promise<void> {
  const leads = await manager.countBy(Membership, { campaignId, role: 'lead' })
  if (leads <= 1) throw conflict('last-lead', 'The last lead cannot leave: make somebody else lead first.')
}
