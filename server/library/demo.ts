import { randomUUID } from 'node:crypto'
import type { Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Account } from '../entities/account.ts'
import { Membership } from '../entities/membership.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import { createCampaign } from '../services/campaigns.ts'
import { hashPassword } from '../services/passwords.ts'
import { createSearch, readSearch } from '../services/searches.ts'
import { createShortlist } from '../services/shortlists.ts'
import { createTarget } from '../services/targets.ts'
import { demoCampaign, demoPassword, demoSearch, demoShortlist, demoTargets, demoTeam } from './demoTeam.ts'

export interface Demo {
  readonly campaignId: string
  /** The account in whose name the first search runs. */
  readonly investigatorId: string
  /** Version of the first target. */
  readonly targetVersionId: string
}

/**
 * Makes the demo team, its campaign and its targets, in a new database outside production. Returns what the first
 * search needs, or null when there was nothing to do.
 */
export async function seedDemo(context: ServerContext): Promise<Demo | null> {
  const { config, source, writes } = context
  if (config.production || (await source.manager.exists(Account))) return null
  const passwordHash = await hashPassword(demoPassword)
  const createdAt = new Date().toISOString()
  const team = demoTeam.map(({ name, email, role }) => ({ id: randomUUID(), name, email, role }))
  await writes.transaction((manager) =>
    manager.insert(
      Account,
      team.map(({ id, name, email }) => ({ id, name, email, passwordHash, demo: true, createdAt })),
    ),
  )
  const idOf = (role: Role) => {
    const member = team.find((one) => one.role === role)
    if (!member) throw new Error(`The demo team has no ${role}.`)
    return member.id
  }
  const campaign = await createCampaign(context, idOf('lead'), demoCampaign)
  await writes.transaction((manager) =>
    manager.insert(
      Membership,
      team
        .filter(({ role }) => role !== 'lead')
        .map(({ id, role }) => ({ campaignId: campaign.id, accountId: id, role })),
    ),
  )
  const investigatorId = idOf('investigator')
  const versions: string[] = []
  for (const target of demoTargets) {
    const created = await createTarget(context, campaign.id, investigatorId, target)
    versions.push(created.versions[0].version.id)
  }
  return { campaignId: campaign.id, investigatorId, targetVersionId: versions[0] }
}

/**
 * The demo's one short search and the shortlist of what it found, through the same services as everybody's. Resolves
 * when the search has ended.
 */
export async function runDemoSearch(context: ServerContext, demo: Demo): Promise<void> {
  const { source, jobs } = context
  const { campaignId, investigatorId, targetVersionId } = demo
  const { polytopeName, ...settings } = demoSearch
  const place = { name: polytopeName, origin: 'bundled' } as const
  const { key } = await source.manager.findOneByOrFail(PolytopeRecord, place)
  const { id } = await createSearch(context, campaignId, investigatorId, {
    ...settings,
    targetVersionId,
    scope: { kind: 'polytopes', keys: [key] },
  })
  await jobs.searches.ended(id)
  const { state } = await readSearch(source.manager, campaignId, id)
  // Somebody may have paused or cancelled it meanwhile.
  if (state === 'finished') {
    await createShortlist(context, campaignId, investigatorId, { ...demoShortlist, searchIds: [id] })
  }
}

/** Whether this database was begun with the demo team. */
export function hasDemo({ source }: ServerContext): Promise<boolean> {
  return source.manager.existsBy(Account, { demo: true })
}

/** What a person at the terminal needs to begin. */
export function announce(address: string, demoExists: boolean): string {
  const width = Math.max(...demoTeam.map(({ email }) => email.length))
  const lines = [`Tessellary   ${address}`]
  if (demoExists) {
    lines.push('', 'Demo sign-in (invented people; on this machine only)')
    for (const { email, role } of demoTeam) lines.push(`  ${email.padEnd(width)}   ${role}`)
    lines.push(`  password: ${demoPassword}`)
  }
  const rule = '-'.repeat(Math.max(...lines.map((line) => line.length)))
  return `\n${[rule, ...lines, rule].join('\n')}\n\n`
}
