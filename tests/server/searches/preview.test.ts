import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { previewChunk } from '../../../scoring/index.ts'
import { PolytopeRecord } from '../../../server/entities/polytope.ts'
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

  it('computes nothing more once it is ended, and goes on from there when it is asked for again', async () => {
    const run = vi.spyOn(hunt.server.context.jobs.interactive, 'run')
    const pieces = () => run.mock.calls.filter(([task]) => task === 'preview-chunk').length
    const rule = huntRule.replace('> -3', '> -3.5')
    const { body } = await preview(rule, 400).expect(202)
    const begun = (await leadStream.event(
      (event) => event.kind === 'preview' && event.preview.id === body.id && event.preview.evaluated > 0,
    )) as StreamEvent & { kind: 'preview' }
    expect(begun.preview.state).toBe('running')
    await hunt.lead.delete(hunt.path('/previews')).expect(204)
    // The piece in hand comes back, and nothing follows.
    await Promise.allSettled(run.mock.results.map(({ value }) => value as Promise<unknown>))
    const stopped = pieces()
    await hunt.lead.get('/api/health').expect(200)
    expect(pieces()).toBe(stopped)

    const again = await preview(`# the same in other words\n\n${rule.replaceAll(' ', '  ')}`, 400).expect(202)
    const first = (await leadStream.event(
      (event) => event.kind === 'preview' && event.preview.id === again.body.id,
    )) as StreamEvent & { kind: 'preview' }
    expect(first.preview.evaluated).toBeGreaterThanOrEqual(begun.preview.evaluated)
    const { preview: done } = await ended(again.body.id)
    const computed = pieces()

    const cached = await preview(`${rule}# once more`, 400).expect(202)
    expect(cached.body).toEqual({ ...done, id: cached.body.id })
    expect(pieces()).toBe(computed)
    run.mockRestore()
  })

  it('of another rule on the same sample says the same as without what is kept', async () => {
    const other = 'score volume\nrequire min(d in divisors : d.volume) >= 0.5\nhit volume > 100'
    const { body } = await preview(other, 40).expect(202)
    const { preview: warm } = await ended(body.id)
    expect(warm.cost.stages.map(({ stage }) => stage)).toEqual(['topology', 'cone'])
    const polytopes = (
      await hunt.server.context.source.manager.find(PolytopeRecord, { order: { key: 'ASC' } })
    ).map(({ key, coordinates }) => ({ key, vertices: coordinates }))
    const cold = previewChunk({ polytopes, ruleText: other, size: 40, seed: 1, state: null, count: 40 })
    if ('error' in cold) throw new Error(cold.error.message)
    expect(warm.feasible).toBe(cold.summary.feasible)
    expect(warm.histogram).toEqual(cold.summary.histogram)
  })

  it('is refused for a rule with an error', async () => {
    const { status, body } = await preview('score')
    expect([status, body.code]).toEqual([422, 'rule-invalid'])
    expect(body.issues.length).toBeGreaterThan(0)
  })
})
