// @vitest-environment happy-dom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { type StreamEvent } from '../../shared/events.ts'
import { noteReached } from '../../src/api/connection.ts'
import { openEventStream, reconnectDelay, type StreamState } from '../../src/api/eventStream.ts'

class FakeSource extends EventTarget {
  static made: FakeSource[] = []
  onopen: (() => void) | null = null
  onerror: (() => void) | null = null
  closed = false
  constructor(readonly url: string) {
    super()
    FakeSource.made.push(this)
  }
  close() {
    this.closed = true
  }
  say(kind: string, data: unknown) {
    this.dispatchEvent(new MessageEvent(kind, { data: JSON.stringify(data) }))
  }
}

let events: StreamEvent[]
let states: StreamState[]
/** Whether the server is out of reach for requests as well. */
let away = true
const last = () => FakeSource.made.at(-1) as FakeSource

beforeEach(() => {
  vi.useFakeTimers()
  vi.stubGlobal('EventSource', FakeSource)
  vi.stubGlobal('fetch', () =>
    away ? Promise.reject(new TypeError('away')) : Promise.resolve(new Response()),
  )
  away = true
  FakeSource.made = []
  events = []
  states = []
})
afterEach(() => {
  close()
  noteReached()
  vi.useRealTimers()
  vi.unstubAllGlobals()
})
let close = () => {}
const open = () => {
  close = openEventStream({
    url: '/api/events',
    onEvent: (e) => events.push(e),
    onState: (s) => states.push(s),
  })
}

describe('the event stream', () => {
  it('hands on events of the agreed form and drops others', () => {
    open()
    last().say('changed', { kind: 'changed', what: 'targets' })
    last().say('changed', { kind: 'changed', what: 'something else' })
    expect(events).toEqual([{ kind: 'changed', what: 'targets' }])
  })

  it('connects again with growing waits, and starts afresh once it was live', () => {
    open()
    last().onerror?.()
    expect(last().closed).toBe(true)
    expect(states.at(-1)).toBe('waiting')
    vi.advanceTimersByTime(1_000)
    expect(FakeSource.made).toHaveLength(2)
    last().onerror?.()
    vi.advanceTimersByTime(999)
    expect(FakeSource.made).toHaveLength(2)
    vi.advanceTimersByTime(1_001)
    expect(FakeSource.made).toHaveLength(3)
    last().onopen?.()
    expect(states.at(-1)).toBe('live')
  })

  it('connects again at once when another request has reached the server', async () => {
    open()
    for (let i = 0; i < 8; i++) {
      last().onerror?.()
      await vi.advanceTimersByTimeAsync(40_000)
    }
    last().onerror?.()
    await vi.advanceTimersByTimeAsync(10)
    const made = FakeSource.made.length
    noteReached()
    expect(FakeSource.made).toHaveLength(made + 1)
    // A stream that is refused while the server is there keeps its growing waits.
    away = false
    last().onerror?.()
    await vi.advanceTimersByTimeAsync(10)
    expect(FakeSource.made).toHaveLength(made + 1)
  })

  it('ends for good when the session or the role is gone', () => {
    open()
    last().say('closed', { kind: 'closed', reason: 'signed-out' })
    last().onerror?.()
    vi.advanceTimersByTime(60_000)
    expect(FakeSource.made).toHaveLength(1)
    expect(states.at(-1)).toBe('closed')
  })

  it('comes back after the server was shut down', () => {
    open()
    last().say('closed', { kind: 'closed', reason: 'shutting-down' })
    vi.advanceTimersByTime(1_000)
    expect(FakeSource.made).toHaveLength(2)
  })

  it('never waits longer than half a minute', () => {
    expect(reconnectDelay(0, 1)).toBe(1_000)
    expect(reconnectDelay(3, 0)).toBe(4_000)
    expect(reconnectDelay(40, 1)).toBe(30_000)
  })
})
