import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let agent: Agent
beforeAll(async () => {
  server = await openTestServer()
  agent = await server.signIn('lead')
})
afterAll(() => server.close())

describe('requests that change something', () => {
  const create = () => agent.post('/api/campaigns')

  it.each([
    ['Sec-Fetch-Site', 'cross-site'],
    ['Sec-Fetch-Site', 'same-site'],
    ['Origin', 'https://elsewhere.example'],
    ['Origin', 'null'],
  ])('are refused when %s is %s', async (header, value) => {
    const response = await create().set(header, value).send({ name: 'Planted' })
    expect(response.status).toBe(403)
    expect(response.body.code).toBe('foreign-origin')
  })

  it('are taken from our own pages, and from programs', async () => {
    await create().set('Sec-Fetch-Site', 'same-origin').send({ name: 'From the page' }).expect(201)
    await create()
      .set('Origin', server.context.config.baseUrl)
      .send({ name: 'From an old browser' })
      .expect(201)
    await create().send({ name: 'From a program' }).expect(201)
  })

  it('must be JSON: what a plain form can send is refused', async () => {
    for (const type of ['text/plain', 'application/x-www-form-urlencoded']) {
      const response = await create().set('Content-Type', type).send('name=Planted')
      expect(response.status).toBe(415)
      expect(response.body).toMatchObject({ code: 'not-json-type', found: type })
    }
  })

  it('that are broken JSON are told so', async () => {
    const response = await create().set('Content-Type', 'application/json').send('{"name": ')
    expect(response.status).toBe(400)
    expect(response.body.code).toBe('not-json')
  })

  it('that are too large are told so', async () => {
    const response = await create().send({ name: 'x', description: 'y'.repeat(200_000) })
    expect(response.status).toBe(413)
    expect(response.body.code).toBe('too-large')
  })
})

describe('every answer', () => {
  it('forbids foreign scripts and framing, and is not kept by caches', async () => {
    const { headers } = await request(server.app).get('/api/health').expect(200)
    expect(headers['content-security-policy']).toContain("script-src 'self';")
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'")
    expect(headers['content-security-policy']).not.toMatch(/script-src[^;]*unsafe/)
    expect(headers['x-content-type-options']).toBe('nosniff')
    expect(headers['x-powered-by']).toBeUndefined()
    expect(headers['cache-control']).toBe('no-store')
  })
})
