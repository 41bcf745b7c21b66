import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { huntRule } from '../support/smallHunt.ts'
import { openTestServer, type Agent, type TestServer } from '../support/testServer.ts'

let server: TestServer
let lead: Agent
beforeAll(async () => {
  server = await openTestServer()
  lead = await server.signIn('lead')
})
afterAll(() => server.close())

const path = (rest: string) => `/api/campaigns/${server.campaignId}${rest}`

describe('targets', () => {
  it('keep every version, and make none when nothing changed', async () => {
    const created = await lead.post(path('/targets')).send({ name: 'Second', text: 'score 1' }).expect(201)
    const place = path(`/targets/${created.body.id}`)
    const same = await lead.post(`${place}/versions`).send({ text: 'score 1' }).expect(201)
    expect(same.body.versions).toHaveLength(1)
    expect(same.body.latestScope).toBeNull()
    const next = await lead.post(`${place}/versions`).send({ text: 'score h11' }).expect(201)
    expect(next.body.versions.map(({ number }: { number: number }) => number)).toEqual([2, 1])
    const renamed = await lead.patch(place).send({ name: 'Other' }).expect(200)
    expect(renamed.body.name).toBe('Other')
  })

  it('are refused with located messages when the rule is wrong', async () => {
    const { status, body } = await lead.post(path('/targets')).send({ name: 'Wrong', text: 'score volum' })
    expect(status).toBe(422)
    expect(body).toMatchObject({ code: 'rule-invalid', path: 'text' })
    expect(body.issues[0]).toMatchObject({ line: 1, column: 7, severity: 'error' })
    const check = await lead.post(path('/rules/check')).send({ text: 'score volum' }).expect(200)
    expect(check.body).toEqual({ ok: false, issues: body.issues, scoringHash: null })
    const sound = await lead.post(path('/rules/check')).send({ text: huntRule }).expect(200)
    expect(sound.body).toMatchObject({ ok: true, scoringHash: expect.stringMatching(/^[0-9a-f]{64}$/) })
  })
})
