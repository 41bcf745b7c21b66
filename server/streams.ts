import type { Request, Response } from 'express'
import { createSession, type Session } from 'better-sse'
import type { StreamEvent } from '../shared/events.ts'

/** Whom an open stream belongs to. */
export interface StreamOwner {
  readonly accountId: string
  readonly sessionId: string
  /** null: only what concerns everybody, and the account's own previews. */
  readonly campaignId: string | null
}

interface OpenStream extends StreamOwner {
  readonly session: Session
  readonly response: Response
}

export type ClosingReason = Extract<StreamEvent, { kind: 'closed' }>['reason']

/** The server-sent event streams that are open, one per tab. */
export class Streams {
  readonly #open = new Set<OpenStream>()

  get size(): number {
    return this.#open.size
  }

  /** Turns the response into a stream; it stays open until either side closes it. */
  async open(request: Request, response: Response, owner: StreamOwner): Promise<void> {
    const session = await createSession(request, response, {
      keepAlive: 15_000,
      retry: 2_000,
      trustClientEventId: false,
      // Proxies must pass events on as they come.
      headers: { 'Cache-Control': 'no-store', 'X-Accel-Buffering': 'no' },
    })
    const stream: OpenStream = { ...owner, session, response }
    this.#open.add(stream)
    session.on('disconnected', () => this.#open.delete(stream))
  }

  toCampaign(campaignId: string, event: StreamEvent): void {
    this.#send(event, (stream) => stream.campaignId === campaignId)
  }

  toAccount(accountId: string, event: StreamEvent): void {
    this.#send(event, (stream) => stream.accountId === accountId)
  }

  toAll(event: StreamEvent): void {
    this.#send(event, () => true)
  }

  /** On sign-out: the streams of every tab of that session. */
  closeSession(sessionId: string): void {
    this.#close('signed-out', (stream) => stream.sessionId === sessionId)
  }

  /** When an account leaves a campaign. */
  closeMembership(campaignId: string, accountId: string): void {
    this.#close('role-lost', (stream) => stream.campaignId === campaignId && stream.accountId === accountId)
  }

  /**
   * Ends the streams whose owners may not read them any more.
   *
   * @param whyClosed null when a stream may stay
   */
  async recheck(whyClosed: (owner: StreamOwner) => Promise<ClosingReason | null>): Promise<void> {
    for (const stream of [...this.#open]) {
      const reason = await whyClosed(stream)
      if (reason !== null) this.#close(reason, (other) => other === stream)
    }
  }

  closeAll(): void {
    this.#close('shutting-down', () => true)
  }

  #send(event: StreamEvent, concerns: (stream: OpenStream) => boolean): void {
    for (const stream of this.#open) {
      if (stream.session.isConnected && concerns(stream)) stream.session.push(event, event.kind)
    }
  }

  #close(reason: ClosingReason, concerns: (stream: OpenStream) => boolean): void {
    for (const stream of [...this.#open].filter(concerns)) {
      this.#open.delete(stream)
      if (stream.session.isConnected) stream.session.push({ kind: 'closed', reason }, 'closed')
      stream.response.end()
    }
  }
}
