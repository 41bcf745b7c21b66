import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { addAccount, address, openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let lead: Agent
beforeAll(async () => {
  server = await openTestServer()
  lead = await server.signIn('lead')
})
afterAll(() => server.close())

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`

describe('campaigns', () => {
  it('are listed for their members only, with the role', async () => {
    const mine = await (await server.signIn('reviewer')).get('/api/campaigns').expect(200)
    expect(mine.body).toHaveLength(1)
    expect(mine.body[0]).toMatchObject({ id: server.campaignId, role: 'reviewer', searches: 0, undecided: 0 })
    const strange = await (await server.signIn('stranger')).get('/api/campaigns').expect(200)
    expect(strange.body).toEqual([])
  })

  it('make their author lead', async () => {
    const stranger = await server.signIn('stranger')
    const { body } = await stranger.post('/api/campaigns').send({ name: '  Own hunt ' }).expect(201)
    expect(body).toMatchObject({ name: 'Own hunt', description: '', role: 'lead' })
    expect(body.members).toEqual([expect.objectContaining({ email: address('stranger'), role: 'lead' })])
  })

  it('can be renamed by a lead', async () => {
    const { body } = await lead.patch(path()).send({ description: 'Wider than before' }).expect(200)
    expect(body).toMatchObject({ name: 'Test hunt', description: 'Wider than before' })
  })

  it('need a name', async () => {
    const { status, body } = await lead.post('/api/campaigns').send({ name: '   ' })
    expect(status).toBe(422)
    expect(body.path).toBe('name')
  })
})

describe('members', () => {
  it('are added by address, once', async () => {
    await addAccount(server, 'newcomer')
    const { body } = await lead
      .post(path('/members'))
      .send({ email: address('newcomer'), role: 'reviewer' })
      .expect(201)
    expect(body.members).toContainEqual(
      expect.objectContaining({ email: address('newcomer'), role: 'reviewer' }),
    )
    const again = await lead.post(path('/members')).send({ email: address('newcomer'), role: 'lead' })
    expect(again.status).toBe(409)
    expect(again.body.code).toBe('already-member')
  })

  it('must have an account', async () => {
    const { status, body } = await lead
      .post(path('/members'))
      .send({ email: 'ghost@tests.example', role: 'reader' })
    expect(status).toBe(422)
    expect(body).toMatchObject({ code: 'no-such-account', path: 'email', found: 'ghost@tests.example' })
  })

  it('get another role, with effect from the next request', async () => {
    const reader = await server.signIn('reader')
    await reader.patch(path()).send({ name: 'Mine' }).expect(403)
    await lead
      .patch(path(`/members/${server.accounts.reader}`))
      .send({ role: 'lead' })
      .expect(204)
    await reader.patch(path()).send({ name: 'Test hunt' }).expect(200)
    await lead
      .patch(path(`/members/${server.accounts.reader}`))
      .send({ role: 'reader' })
      .expect(204)
    await reader.patch(path()).send({ name: 'Mine' }).expect(403)
  })

  it('lose sight of the campaign when they are removed', async () => {
    const reviewer = await server.signIn('reviewer')
    await reviewer.get(path()).expect(200)
    await lead.delete(path(`/members/${server.accounts.reviewer}`)).expect(204)
    await reviewer.get(path()).expect(404)
    await lead.delete(path(`/members/${server.accounts.reviewer}`)).expect(404)
  })

  it('always include a lead: the last one can neither leave nor step down', async () => {
    const leave = await lead.delete(path(`/members/${server.accounts.lead}`))
    expect(leave.status).toBe(409)
    expect(leave.body.code).toBe('last-lead')
    const stepDown = await lead.patch(path(`/members/${server.accounts.lead}`)).send({ role: 'reader' })
    expect(stepDown.status).toBe(409)
    await lead
      .patch(path(`/members/${server.accounts.lead}`))
      .send({ role: 'lead' })
      .expect(204)
  })
})
