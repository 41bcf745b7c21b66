import { randomUUID } from 'node:crypto'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import request from 'supertest'
import { readConfig } from '../../../server/config.ts'
import { Account } from '../../../server/entities/account.ts'
import { Membership } from '../../../server/entities/membership.ts'
import type { JobOptions } from '../../../server/jobs/jobs.ts'
import { createCampaign } from '../../../server/services/campaigns.ts'
import { hashPassword } from '../../../server/services/passwords.ts'
import { openServer, type OpenServer } from '../../../server/start.ts'
import { roles, type Role } from '../../../shared/roles.ts'
import { builtWorker } from './builtWorker.ts'

export type Agent = ReturnType<typeof request.agent>

export const password = 'a password for the tests'
const passwordHash = hashPassword(password)

export interface TestServer extends OpenServer {
  /** A campaign with one member per role, named after it. */
  readonly campaignId: string
  /** Account identifiers of the four members and of `stranger`, who belongs to no campaign. */
  readonly accounts: Readonly<Record<Role | 'stranger', string>>
  /** Signed in as a member or stranger. */
  signIn(name: Role | 'stranger'): Promise<Agent>
}

export interface TestServerOptions {
  readonly environment?: Record<string, string>
  readonly jobs?: JobOptions
}

/** A server on databases in memory, with answers checked against their schemas; nobody listens. */
export async function openTestServer(options: TestServerOptions = {}): Promise<TestServer> {
  const folder = mkdtempSync(join(tmpdir(), 'tessellary-server-'))
  const config = readConfig({
    NODE_ENV: 'test',
    LOG_LEVEL: 'silent',
    WORKERS: '1',
    DATA_DIR: folder,
    ...options.environment,
  })
  const server = await openServer(config, {
    inMemory: true,
    checkAnswers: true,
    jobs: { ...builtWorker, ...options.jobs },
  })
  const { context } = server
  const accounts = {
    lead: await addAccount(server, 'lead'),
    investigator: await addAccount(server, 'investigator'),
    reviewer: await addAccount(server, 'reviewer'),
    reader: await addAccount(server, 'reader'),
    stranger: await addAccount(server, 'stranger'),
  }
  const { id: campaignId } = await createCampaign(context, accounts.lead, {
    name: 'Test hunt',
    description: '',
  })
  await context.writes.transaction(async (manager) => {
    for (const role of roles.filter((role) => role !== 'lead')) {
      await manager.insert(Membership, { campaignId, accountId: accounts[role], role })
    }
  })
  return {
    ...server,
    campaignId,
    accounts,
    signIn: (name) => signIn(server, address(name)),
    close: async () => {
      await server.close()
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

export const address = (name: string) => `${name}@tests.example`

/** Adds an account with the common password; returns its identifier. */
export async function addAccount({ context }: OpenServer, name: string): Promise<string> {
  const id = randomUUID()
  const account = {
    id,
    email: address(name),
    name: name[0].toUpperCase() + name.slice(1),
    passwordHash: await passwordHash,
    demo: false,
    createdAt: new Date().toISOString(),
  }
  await context.writes.transaction((manager) => manager.insert(Account, account))
  return id
}

export async function signIn({ app }: OpenServer, email: string): Promise<Agent> {
  const agent = request.agent(app)
  await agent.post('/api/session').send({ email, password }).expect(200)
  return agent
}
