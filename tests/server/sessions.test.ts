import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createAccount } from '../../server/services/accounts.ts'
import { signInAttempts } from '../../server/routes/session.ts'
import { address, openTestServer, password, type TestServer } from './support/testServer.ts'

let server: TestServer
beforeAll(async () => {
  server = await openTestServer()
})
afterAll(() => server.close())

describe('signing in and out', () => {
  it('says who is signed in', async () => {
    const before = await request(server.app).get('/api/session').expect(200)
    expect(before.body.account).toBeNull()
    const agent = await server.signIn('reader')
    const after = await agent.get('/api/session').expect(200)
    expect(after.body).toMatchObject({ account: { id: server.accounts.reader, email: address('reader') } })
    expect(after.body.account).not.toHaveProperty('passwordHash')
    expect(after.body.version).toMatch(/^\d+\.\d+\.\d+/)
  })

  it('takes the address in any case', async () => {
    await request(server.app)
      .post('/api/session')
      .send({ email: address('reader').toUpperCase(), password })
      .expect(200)
  })

  it('gives a cookie that scripts cannot read and other sites do not send', async () => {
    const response = await request(server.app)
      .post('/api/session')
      .send({ email: address('reader'), password })
    const [cookie] = response.get('Set-Cookie') ?? []
    expect(cookie).toMatch(/^tessellary=/)
    expect(cookie).toMatch(/HttpOnly/)
    expect(cookie).toMatch(/SameSite=Lax/)
    expect(cookie).not.toMatch(/Secure/)
  })

  it('starts a session under a new identifier, so that a planted one is worthless', async () => {
    const agent = await server.signIn('reader')
    const first = await agent
      .post('/api/session')
      .send({ email: address('reader'), password })
      .expect(200)
    const second = await agent
      .post('/api/session')
      .send({ email: address('reader'), password })
      .expect(200)
    const cookieOf = (response: request.Response) => response.get('Set-Cookie')?.[0].split(';')[0]
    expect(cookieOf(first)).toBeDefined()
    expect(cookieOf(second)).not.toBe(cookieOf(first))
    const old = await request(server.app)
      .get('/api/session')
      .set('Cookie', cookieOf(first) ?? '')
    expect(old.body.account).toBeNull()
  })

  it('ends on sign-out, also for a copy of the cookie', async () => {
    const signedIn = await request(server.app)
      .post('/api/session')
      .send({ email: address('reader'), password })
    const cookie = signedIn.get('Set-Cookie')?.[0].split(';')[0] ?? ''
    await request(server.app).get('/api/campaigns').set('Cookie', cookie).expect(200)
    await request(server.app).delete('/api/session').set('Cookie', cookie).expect(204)
    await request(server.app).get('/api/campaigns').set('Cookie', cookie).expect(401)
  })

  it('answers an unknown address and a wrong password alike', async () => {
    const attempt = (email: string) =>
      request(server.app).post('/api/session').send({ email, password: 'not the password' })
    const known = await attempt(address('lead'))
    const unknown = await attempt(address('nobody'))
    expect(known.status).toBe(401)
    expect(unknown.status).toBe(401)
    expect(unknown.body).toEqual(known.body)
    expect(known.body.code).toBe('sign-in-failed')
  })

  it('refuses what is no sign-in (422, naming the field)', async () => {
    const response = await request(server.app).post('/api/session').send({ email: 'nobody' })
    expect(response.status).toBe(422)
    expect(response.body).toMatchObject({ code: 'invalid-request', path: 'email' })
  })
})

describe('attempts', () => {
  it('are limited when they fail (429), and not otherwise', async () => {
    const own = await openTestServer()
    try {
      const attempt = (word: string) =>
        request(own.app)
          .post('/api/session')
          .send({ email: address('lead'), password: word })
      for (let i = 0; i < signInAttempts + 2; i += 1) await attempt(password).expect(200)
      for (let i = 0; i < signInAttempts; i += 1) await attempt('wrong').expect(401)
      const late = await attempt(password)
      expect(late.status).toBe(429)
      expect(late.body).toMatchObject({ code: 'too-many-attempts' })
    } finally {
      await own.close()
    }
  })
})

describe('a set-up link', () => {
  const setUp = (token: string, word = 'a long enough password') =>
    request(server.app).post('/api/setup').send({ token, name: 'New Person', password: word })

  it('lets its account choose a password, once', async () => {
    const { token } = await createAccount(server.context.writes, 'New.Person@tests.example')
    const before = await request(server.app)
      .post('/api/session')
      .send({ email: 'new.person@tests.example', password: 'a long enough password' })
    expect(before.status).toBe(401)
    const response = await setUp(token).expect(200)
    expect(response.body.account).toMatchObject({ name: 'New Person', email: 'new.person@tests.example' })
    const again = await setUp(token)
    expect(again.status).toBe(422)
    expect(again.body.code).toBe('link-invalid')
    await request(server.app)
      .post('/api/session')
      .send({ email: 'new.person@tests.example', password: 'a long enough password' })
      .expect(200)
  })

  it('is replaced by a newer one, and refused for an account that has a password', async () => {
    const first = await createAccount(server.context.writes, 'second@tests.example')
    const second = await createAccount(server.context.writes, 'second@tests.example')
    await setUp(first.token).expect(422)
    await setUp(second.token).expect(200)
    await expect(createAccount(server.context.writes, 'second@tests.example')).rejects.toThrow(
      /already an account/,
    )
  })

  it('wants a password of some length', async () => {
    const { token } = await createAccount(server.context.writes, 'third@tests.example')
    const response = await setUp(token, 'short')
    expect(response.status).toBe(422)
    expect(response.body).toMatchObject({ path: 'password' })
  })

  it('is kept as a hash only', async () => {
    const { token } = await createAccount(server.context.writes, 'fourth@tests.example')
    const rows = await server.context.source.query<object[]>('SELECT * FROM set_up_link')
    expect(JSON.stringify(rows)).not.toContain(token)
  })
})
