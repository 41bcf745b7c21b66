import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { StreamEvent } from '../../../shared/events.ts'
import { OpenStream } from '../support/listening.ts'
import { huntRule, huntScope, openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
beforeAll(async () => {
  hunt = await openSmallHunt()
})
afterAll(() => hunt.close())

describe('a preview', () => {
  const preview = (text: string, size = 40) =>
    hunt.lead.post(hunt.path('/previews')).send({ text, scope: huntScope, size })
  const ended = async (id: string) =>
    (await leadStream.event(
      (event) => event.kind === 'preview' && event.preview.id === id && event.preview.state !== 'running',
    )) as StreamEvent & { kind: 'preview' }

  let leadStream: OpenStream
  beforeAll(async () => {
    leadStream = await OpenStream.open(
      `${hunt.http.url}/api/events?campaign=${hunt.server.campaignId}`,
      await hunt.http.cookie('lead'),
    )
  })
  afterAll(() => leadStream.close())

  it('evaluates the rule on a null sample and says what it cost', async () => {
    const { body } = await preview(`require h11 > 10 label "large"\n${huntRule}`).expect(202)
    expect(body).toMatchObject({ state: 'running', evaluated: 0, size: 40 })
    const { preview: done } = await ended(body.id)
    expect(done).toMatchObject({ state: 'done', evaluated: 40, message: null })
    expect(done.feasible + done.infeasible + done.undefined).toBe(40)
    const [large, favourable] = done.requires
    expect(large).toMatchObject({ label: 'large', stage: 'polytope', reached: 40 })
    expect(large.passed).toBeLessThan(40)
    expect(favourable.label).toBe('favourable')
    expect(done.cost.median).toBeGreaterThan(0)
    expect(done.cost.stages.map(({ stage }) => stage)).toContain('metric')
    const scores = done.best.flatMap(({ outcome }) => (outcome.kind === 'feasible' ? [outcome.score] : []))
    expect(scores).toEqual([...scores].sort((a, b) => b - a))
    expect((await hunt.lead.get(hunt.path(`/previews/${body.id}`)).expect(200)).body).toEqual(done)
    await hunt.lead.get(`/api/candidates/${done.best[0].candidateKey}`).expect(200)
  })

  it('is replaced by the next one of the same account', async () => {
    const first = await preview(huntRule, 2000).expect(202)
    const second = await preview(huntRule, 10).expect(202)
    expect((await ended(first.body.id)).preview.state).toBe('replaced')
    expect((await ended(second.body.id)).preview.state).toBe('done')
    await hunt.lead.get(hunt.path(`/previews/${first.body.id}`)).expect(404)
  })

  it('is ended on request', async () => {
    const { body } = await preview(huntRule, 2000).expect(202)
    await hunt.lead.delete(hunt.path('/previews')).expect(204)
    expect((await ended(body.id)).preview.state).toBe('replaced')
  })

  it('is refused for a rule with an error', async () => {
    const { status, body } = await preview('score')
    expect([status, body.code]).toEqual([422, 'rule-invalid'])
    expect(body.issues.length).toBeGreaterThan(0)
  })
})
