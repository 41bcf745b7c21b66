import { streamEventSchema, type StreamEvent } from '../../shared/events.ts'
import { onReached, suspectLoss } from './connection.ts'

export type StreamState = 'connecting' | 'live' | 'waiting' | 'closed'

const kinds = streamEventSchema.options.map(({ shape }) => shape.kind.value)
const firstDelay = 1_000
const longestDelay = 30_000

/** Waiting time before the next attempt: doubling up to half a minute, each waited in full or by half. */
export function reconnectDelay(attempt: number, spread: number): number {
  const full = Math.min(longestDelay, firstDelay * 2 ** attempt)
  return full / 2 + (full / 2) * spread
}

export interface EventStreamOptions {
  url: string
  onEvent: (event: StreamEvent) => void
  onState: (state: StreamState) => void
}

/**
 * The one event stream of this tab. A lost connection is opened again with growing waits, and at once
 * when another request has reached the server; `closed` with
 * reason signed-out or role-lost ends it for good. Returns the function that closes it.
 */
export function openEventStream({ url, onEvent, onState }: EventStreamOptions): () => void {
  let source: EventSource | null = null
  let timer: ReturnType<typeof setTimeout> | undefined
  let attempt = 0
  let ended = false

  const close = () => {
    ended = true
    clearTimeout(timer)
    stopListening()
    source?.close()
    onState('closed')
  }

  const reconnect = () => {
    source?.close()
    if (ended) return
    onState('waiting')
    suspectLoss()
    clearTimeout(timer)
    timer = setTimeout(connect, reconnectDelay(attempt++, Math.random()))
  }

  const receive = (message: MessageEvent<string>) => {
    const parsed = streamEventSchema.safeParse(safeJson(message.data))
    if (!parsed.success) return
    onEvent(parsed.data)
    if (parsed.data.kind !== 'closed') return
    if (parsed.data.reason === 'shutting-down') reconnect()
    else close()
  }

  function connect() {
    onState('connecting')
    source = new EventSource(url)
    source.onopen = () => {
      attempt = 0
      onState('live')
    }
    source.onerror = reconnect
    for (const kind of kinds) source.addEventListener(kind, receive)
  }

  const stopListening = onReached(() => {
    clearTimeout(timer)
    source?.close()
    connect()
  })
  connect()
  return close
}

function safeJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return null
  }
}
