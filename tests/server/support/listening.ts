import type { AddressInfo } from 'node:net'
import type { Server } from 'node:http'
import { createServer } from 'node:http'
import { streamEventSchema, type StreamEvent } from '../../../shared/events.ts'
import { address, password, type TestServer } from './testServer.ts'

/** A test server that listens on a free port, for what needs a connection of its own. */
export interface Listening {
  readonly url: string
  /** Signs in and returns the cookie. */
  cookie(name: string): Promise<string>
  close(): Promise<void>
}

export async function listening(server: TestServer): Promise<Listening> {
  const http: Server = createServer(server.app)
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve))
  const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}`
  return {
    url,
    cookie: async (name) => {
      const response = await fetch(`${url}/api/session`, {
        method: 'POST',
        headers: { 'Content-Type': 'application/json' },
        body: JSON.stringify({ email: address(name), password }),
      })
      return response.headers.get('set-cookie')?.split(';')[0] ?? ''
    },
    close: () =>
      new Promise((resolve) => {
        http.close(() => resolve())
        http.closeAllConnections()
      }),
  }
}

/** An open event stream; every event is checked against its schema. */
export class OpenStream {
  readonly events: StreamEvent[] = []
  /** Resolves when the server ends the stream. */
  readonly ended: Promise<void>
  readonly #controller: AbortController
  readonly #waiting = new Set<() => void>()

  private constructor(body: ReadableStream<Uint8Array>, controller: AbortController) {
    this.#controller = controller
    this.ended = this.#read(body)
  }

  static async open(url: string, cookie: string): Promise<OpenStream> {
    const controller = new AbortController()
    const response = await fetch(url, { headers: { cookie }, signal: controller.signal })
    if (!response.ok || response.body === null) throw new Error(`The stream was refused: ${response.status}`)
    return new OpenStream(response.body, controller)
  }

  /** The first event that fits, whether it has come already or comes yet. */
  async event(fits: (event: StreamEvent) => boolean): Promise<StreamEvent> {
    for (;;) {
      const found = this.events.find(fits)
      if (found) return found
      await new Promise<void>((resolve) => this.#waiting.add(resolve))
    }
  }

  close(): void {
    this.#controller.abort()
  }

  async #read(body: ReadableStream<Uint8Array>): Promise<void> {
    const decoder = new TextDecoder()
    let text = ''
    try {
      for await (const chunk of body) {
        text += decoder.decode(chunk, { stream: true })
        const blocks = text.split('\n\n')
        text = blocks.pop() ?? ''
        for (const block of blocks) this.#take(block)
      }
    } catch (error) {
      if (!this.#controller.signal.aborted) throw error
    }
  }

  #take(block: string): void {
    const data = block.split('\n').find((line) => line.startsWith('data:'))
    if (data === undefined) return
    this.events.push(streamEventSchema.parse(JSON.parse(data.slice(5))))
    for (const resolve of this.#waiting) resolve()
    this.#waiting.clear()
  }
}
