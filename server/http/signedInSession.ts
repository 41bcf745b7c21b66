import type { Request } from 'express'

declare module 'express-session' {
  interface SessionData {
    accountId: string
  }
}

/** Starts a session for the account under a new identifier: one that was planted before sign-in is worthless. */
export async function startSession(request: Request, accountId: string): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    request.session.regenerate((error: unknown) => (error ? reject(error) : resolve()))
  })
  request.session.accountId = accountId
  await new Promise<void>((resolve, reject) => {
    request.session.save((error: unknown) => (error ? reject(error) : resolve()))
  })
}

export async function endSession(request: Request): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    request.session.destroy((error: unknown) => (error ? reject(error) : resolve()))
  })
}
