import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { listening, OpenStream, type Listening } from './support/listening.ts'
import { openTestServer, type TestServer } from './support/testServer.ts'

let server: TestServer
let http: Listening

beforeAll(async () => {
  server = await openTestServer()
  http = await listening(server)
})
afterAll(async () => {
  await http.close()
  await server.close()
})

const send = (cookie: string, method: string, path: string, body?: object) =>
  fetch(`${http.url}${path}`, {
    method,
    headers: { cookie, ...(body ? { 'Content-Type': 'application/json' } : {}) },
    body: body && JSON.stringify(body),
  })
const stream = (cookie: string) =>
  OpenStream.open(`${http.url}/api/events?campaign=${server.campaignId}`, cookie)
const campaign = (rest: string) => `/api/campaigns/${server.campaignId}${rest}`

describe('the event stream', () => {
  it('is for members of the campaign', async () => {
    const url = `${http.url}/api/events?campaign=${server.campaignId}`
    expect((await fetch(url)).status).toBe(401)
    const cookie = await http.cookie('stranger')
    expect((await fetch(url, { headers: { cookie } })).status).toBe(404)
  })

  it('tells every member of changes in the campaign', async () => {
    const lead = await http.cookie('lead')
    const [first, second] = [await stream(lead), await stream(await http.cookie('reader'))]
    const response = await send(lead, 'PATCH', campaign(`/members/${server.accounts.reviewer}`), {
      role: 'reader',
    })
    expect(response.status).toBe(204)
    for (const one of [first, second]) {
      expect(await one.event(({ kind }) => kind === 'changed')).toEqual({ kind: 'changed', what: 'members' })
      one.close()
    }
  })

  it('ends on sign-out, in every tab of the session and in no other session', async () => {
    const cookie = await http.cookie('reader')
    const tabs = [await stream(cookie), await stream(cookie)]
    const elsewhere = await stream(await http.cookie('reader'))
    await send(cookie, 'DELETE', '/api/session')
    for (const tab of tabs) {
      await tab.ended
      expect(tab.events.at(-1)).toEqual({ kind: 'closed', reason: 'signed-out' })
    }
    expect(elsewhere.events).toEqual([])
    elsewhere.close()
  })

  it('ends when the membership ends, and cannot be opened again', async () => {
    const cookie = await http.cookie('reviewer')
    const open = await stream(cookie)
    await send(await http.cookie('lead'), 'DELETE', campaign(`/members/${server.accounts.reviewer}`))
    await open.ended
    expect(open.events.at(-1)).toEqual({ kind: 'closed', reason: 'role-lost' })
    await expect(stream(cookie)).rejects.toThrow(/404/)
  })

  it('ends at the next check when its session has run out or its owner was removed by another process', async () => {
    const { source } = server.context
    const [lost, expired] = [
      await stream(await http.cookie('reader')),
      await stream(await http.cookie('lead')),
    ]
    await server.recheckStreams()
    const { campaignId, accounts } = server
    await source.query('DELETE FROM membership WHERE campaignId = ? AND accountId = ?', [
      campaignId,
      accounts.reader,
    ])
    await server.recheckStreams()
    await lost.ended
    expect(lost.events.at(-1)).toEqual({ kind: 'closed', reason: 'role-lost' })
    expect(expired.events).toEqual([])
    vi.useFakeTimers({ toFake: ['Date'], now: Date.now() + 15 * 24 * 3600 * 1000 })
    try {
      await server.recheckStreams()
    } finally {
      vi.useRealTimers()
    }
    await expired.ended
    expect(expired.events.at(-1)).toEqual({ kind: 'closed', reason: 'signed-out' })
    await server.context.writes.transaction((manager) =>
      manager.query("INSERT INTO membership (campaignId, accountId, role) VALUES (?, ?, 'reader')", [
        campaignId,
        accounts.reader,
      ]),
    )
  })

  it('is forgotten when the tab closes it', async () => {
    const { streams } = server.context
    const before = streams.size
    const open = await stream(await http.cookie('reader'))
    expect(streams.size).toBe(before + 1)
    open.close()
    await open.ended
    await expect.poll(() => streams.size).toBe(before)
  })

  it('ends with the server', async () => {
    const open = await stream(await http.cookie('reader'))
    server.context.streams.closeAll()
    await open.ended
    expect(open.events.at(-1)).toEqual({ kind: 'closed', reason: 'shutting-down' })
  })
})
