import { createHash, randomBytes, randomUUID } from 'node:crypto'
import { IsNull, MoreThan, type DataSource } from 'typeorm'
import { Account } from '../entities/account.ts'
import { SetUpLink } from '../entities/setUpLink.ts'
import { conflict, Refusal, unprocessable } from '../problems.ts'
import type { WriteLock } from '../writeLock.ts'
import { hashPassword, passwordFits } from './passwords.ts'

const linkLifetimeMilliseconds = 7 * 24 * 3600 * 1000

/** E-mail addresses are compared and stored in lower case. */
export const normalAddress = (email: string) => email.trim().toLowerCase()

const digest = (token: string) => createHash('sha256').update(token).digest('hex')

/** The account, when the password is its own. Unknown address and wrong password are not told apart. */
export async function authenticate(source: DataSource, email: string, password: string): Promise<Account> {
  const account = await source.manager.findOneBy(Account, { email: normalAddress(email) })
  const fits = await passwordFits(account?.passwordHash ?? null, password)
  if (account === null || !fits) {
    throw new Refusal(401, 'sign-in-failed', 'The address and the password do not fit together.')
  }
  return account
}

/**
 * Makes an account without a password and returns the token of its one-time set-up link. For an account that
 * has not been set up yet, earlier links are replaced.
 */
export async function createAccount(
  writes: WriteLock,
  email: string,
): Promise<{ token: string; expiresAt: string }> {
  const address = normalAddress(email)
  const token = randomBytes(32).toString('base64url')
  const now = new Date()
  const expiresAt = new Date(now.getTime() + linkLifetimeMilliseconds).toISOString()
  await writes.transaction(async (manager) => {
    let account = await manager.findOneBy(Account, { email: address })
    if (account?.passwordHash) throw conflict('account-exists', `There is already an account for ${address}.`)
    if (account === null) {
      account = manager.create(Account, {
        id: randomUUID(),
        email: address,
        name: address,
        passwordHash: null,
        demo: false,
        createdAt: now.toISOString(),
      })
      await manager.insert(Account, account)
    }
    await manager.delete(SetUpLink, { accountId: account.id })
    await manager.insert(SetUpLink, {
      tokenHash: digest(token),
      accountId: account.id,
      expiresAt,
      usedAt: null,
    })
  })
  return { token, expiresAt }
}

/** Uses a set-up link: the account gets its name and password, once. */
export async function setUpAccount(
  writes: WriteLock,
  input: { token: string; name: string; password: string },
): Promise<Account> {
  const passwordHash = await hashPassword(input.password)
  return writes.transaction(async (manager) => {
    const now = new Date().toISOString()
    const link = await manager.findOneBy(SetUpLink, {
      tokenHash: digest(input.token),
      usedAt: IsNull(),
      expiresAt: MoreThan(now),
    })
    if (link === null) {
      throw unprocessable('link-invalid', 'This set-up link has been used, has expired, or never existed.', {
        path: 'token',
      })
    }
    await manager.update(SetUpLink, { tokenHash: link.tokenHash }, { usedAt: now })
    await manager.update(Account, { id: link.accountId }, { name: input.name, passwordHash })
    return manager.findOneByOrFail(Account, { id: link.accountId })
  })
}
