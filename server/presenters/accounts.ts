import type { Account as AccountView, Session } from '../../shared/session.ts'
import type { Account } from '../entities/account.ts'

export function presentAccount(account: Account): AccountView {
  return { id: account.id, name: account.name, email: account.email }
}

export function presentSession(account: Account | null, version: string): Session {
  return { account: account === null ? null : presentAccount(account), version }
}
