import type session from 'express-session'
import type { DataSource } from 'typeorm'
import { Account } from '../entities/account.ts'
import { Membership } from '../entities/membership.ts'
import type { StreamOwner } from '../streams.ts'

/** How often open streams are asked whether their owners may still read them (milliseconds). */
export const recheckMilliseconds = 60_000

/**
 * Why a stream that was opened rightly must end now; null when it may stay. Sessions run out, and accounts and
 * memberships may end by the command line, in another process: nothing tells the open stream.
 */
export async function whyClosed(
  source: DataSource,
  sessions: session.Store,
  { accountId, sessionId, campaignId }: StreamOwner,
): Promise<'signed-out' | 'role-lost' | null> {
  const found = await new Promise<session.SessionData | null>((resolve, reject) => {
    sessions.get(sessionId, (error: unknown, data) => (error ? reject(error) : resolve(data ?? null)))
  })
  if (found?.accountId !== accountId) return 'signed-out'
  if (!(await source.manager.existsBy(Account, { id: accountId }))) return 'signed-out'
  if (campaignId === null || (await source.manager.existsBy(Membership, { campaignId, accountId })))
    return null
  return 'role-lost'
}
