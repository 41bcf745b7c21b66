import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { SearchSample } from '../../../server/entities/searchSample.ts'
import type { ShortlistDetail } from '../../../shared/shortlists.ts'
import { huntScope, openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
beforeAll(async () => {
  hunt = await openSmallHunt()
})
afterAll(() => hunt.close())

describe('a search', () => {
  it('runs to its budget, tells its progress, and keeps the best', async () => {
    const created = await hunt.start()
    expect(created).toMatchObject({ state: 'queued', polytopes: 3, budget: 60, evaluations: 0, top: [] })
    const done = await hunt.finished(created.id)
    expect(done).toMatchObject({ state: 'finished', evaluations: 60, failure: null })
    expect(done.finishedAt).not.toBeNull()
    expect(done.progress.islands.map(({ evaluations }) => evaluations)).toEqual([30, 30])
    expect(done.top).toHaveLength(20)
    const [first] = done.top
    expect(first.outcome).toMatchObject({ kind: 'feasible', score: done.best })
    expect(first.candidateKey).toBe(done.progress.bestKey)
    expect(done.progress.curve.at(-1)?.[1]).toBe(done.best)
    // Fewer evaluations than rows of the uniform sample: all of them are kept.
    const { manager } = hunt.server.context.source
    expect(await manager.countBy(SearchSample, { searchId: created.id })).toBe(60)
    const list = await hunt.lead.get(hunt.path('/searches')).expect(200)
    expect(list.body.map(({ id }: { id: string }) => id)).toContain(created.id)
    const target = await hunt.lead.get(hunt.path(`/targets/${hunt.targetId}`)).expect(200)
    expect(target.body.latestScope).toEqual(huntScope)
    const uses = await hunt.lead.get(hunt.path(`/targets/${hunt.targetId}/uses`)).expect(200)
    expect(uses.body).toMatchObject([
      { versionId: hunt.targetVersionId, searches: [{ id: created.id, state: 'finished' }], shortlists: [] },
    ])
    await hunt.lead.get(hunt.path('/targets/none/uses')).expect(404)
  })

  it('gives the same result from the same seed, and another from another', async () => {
    const [a, b] = [await hunt.start({ seed: 77 }), await hunt.start({ seed: 77 })]
    const c = await hunt.start({ seed: 78 })
    const [first, second, third] = [
      await hunt.finished(a.id),
      await hunt.finished(b.id),
      await hunt.finished(c.id),
    ]
    expect(second.top).toEqual(first.top)
    expect(second.progress.curve).toEqual(first.progress.curve)
    expect(third.top).not.toEqual(first.top)
  })

  it('enumerates a small scope exactly, and says how far it has to go', async () => {
    const few = { kind: 'filter', filter: { h11Min: 9, h11Max: 10 } }
    const { id } = await hunt.start({ method: 'exhaustive', scope: few, budget: 50 })
    const done = await hunt.finished(id)
    // 16 and 4 classes modulo automorphisms.
    expect(done).toMatchObject({ state: 'finished', evaluations: 20, budget: 50 })
    expect(done.progress).toMatchObject({ budget: 20, exhausted: true, secondsLeft: 0 })
    expect(done.progress.islands.map(({ evaluations }) => evaluations)).toEqual([10, 10])
  })

  it('fails with its reason when there is more to enumerate than the budget', async () => {
    const { id } = await hunt.start({ method: 'exhaustive' })
    const failed = await hunt.finished(id)
    expect(failed).toMatchObject({ state: 'failed', failure: { code: 'search.too-many-classes' } })
    expect(failed.failure?.message).toMatch(/more than 60 classes/)
  })

  it('counts the hits of each island', async () => {
    const { body: target } = await hunt.lead
      .post(hunt.path('/targets'))
      .send({ name: 'Its own line', text: 'score volume hit volume > 0' })
      .expect(201)
    const created = await hunt.start({ targetVersionId: target.versions[0].id, budget: 20 })
    const done = await hunt.finished(created.id)
    expect(done.ownHitLine).toBe(true)
    expect(done.progress.islands.map(({ hits }) => hits)).toEqual([10, 10])
  })

  it('is compared with the null sample of its scope and rule, drawn once', async () => {
    const { id } = await hunt.start({ seed: 3 })
    await expect
      .poll(async () => (await hunt.read(id)).null?.complete, { timeout: 50_000, interval: 250 })
      .toBe(true)
    const { null: summary } = await hunt.read(id)
    expect(summary).toMatchObject({ size: 60, complete: true })
    expect(summary?.hit?.size).toBe(summary?.evaluated)
    const before = await hunt.server.context.source.query<{ count: number }[]>(
      'SELECT COUNT(*) AS count FROM null_sample',
    )
    await hunt.finished((await hunt.start({ seed: 4 })).id)
    const after = await hunt.server.context.source.query<{ count: number }[]>(
      'SELECT COUNT(*) AS count FROM null_sample',
    )
    expect(after).toEqual(before)
  })

  it("counts what lies above the null's 99 % quantile as a hit when the rule does not say", async () => {
    const { body: target } = await hunt.lead
      .post(hunt.path('/targets'))
      .send({ name: 'Hit left open', text: 'score log10(metric.divisor.top)' })
      .expect(201)
    const { id } = await hunt.start({
      targetVersionId: target.versions[0].id,
      seed: 6,
      islands: 1,
      keep: 60,
    })
    await hunt.finished(id)
    await expect
      .poll(async () => (await hunt.read(id)).null?.complete, { timeout: 50_000, interval: 250 })
      .toBe(true)
    const { top, null: summary, progress, ownHitLine } = await hunt.read(id)
    const { body: shortlist } = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: 'Hits by quantile', searchIds: [id], size: 60 })
      .expect(201)
    for (const { outcome } of [...top, ...(shortlist as ShortlistDetail).rows]) {
      if (outcome.kind !== 'feasible') throw new Error('a rule without require is feasible everywhere')
      expect(outcome.hit).toBe(outcome.score > (summary?.quantile99 ?? Number.NaN))
    }
    // All that was evaluated is in the list, so that the count of the island can be checked one by one.
    expect(ownHitLine).toBe(false)
    const { rows } = shortlist as ShortlistDetail
    expect(rows).toHaveLength(60)
    const hits = rows.filter(({ outcome }) => outcome.kind === 'feasible' && outcome.hit).length
    const [{ hits: counted, unsure = 0 }] = progress.islands
    expect(Math.abs((counted ?? Number.NaN) - hits)).toBeLessThanOrEqual(unsure / 2)
    expect(summary?.ranked?.[0]).toEqual([summary?.best, 0, 1])
    expect(summary?.bestRange?.length).toBeGreaterThan(3)
  })

  it('pauses, goes on and ends as if nothing had been', async () => {
    const settings = { seed: 9, budget: 400 }
    const undisturbed = await hunt.finished((await hunt.start(settings)).id)
    const { id } = await hunt.start(settings)
    await hunt.told(id, ({ progress }) => progress.evaluations > 0)
    const paused = await hunt.lead.post(hunt.path(`/searches/${id}/pause`)).expect(200)
    expect(paused.body.state).toBe('paused')
    const wrong = await hunt.lead.post(hunt.path(`/searches/${id}/pause`))
    expect([wrong.status, wrong.body.code]).toEqual([409, 'wrong-state'])
    const resumed = await hunt.lead.post(hunt.path(`/searches/${id}/resume`)).expect(200)
    expect(['queued', 'running']).toContain(resumed.body.state)
    const done = await hunt.finished(id)
    expect(done.top).toEqual(undisturbed.top)
    expect(done.progress).toEqual({
      ...undisturbed.progress,
      evaluationsPerSecond: expect.anything(),
      secondsLeft: 0,
    })
    const kinds = ['queued', 'started', 'paused', 'resumed', 'finished']
    expect(done.events.map(({ kind }) => kind)).toEqual(kinds)
    expect(done.events.map(({ by }) => by)).toEqual(['Lead', null, 'Lead', 'Lead', null])
    expect(done.events.at(-1)?.evaluations).toBe(400)
  })

  it('is cancelled for good, and keeps what it has found', async () => {
    const { id } = await hunt.start({ budget: 100_000, seed: 10 })
    await hunt.told(id, ({ progress }) => progress.evaluations > 0)
    const { body } = await hunt.lead.post(hunt.path(`/searches/${id}/cancel`)).expect(200)
    expect(body).toMatchObject({ state: 'cancelled', finishedAt: expect.any(String) })
    expect(body.top.length).toBeGreaterThan(0)
    const resumed = await hunt.lead.post(hunt.path(`/searches/${id}/resume`))
    expect([resumed.status, resumed.body.code]).toEqual([409, 'wrong-state'])
    await hunt.server.context.writes.idle()
    expect((await hunt.read(id)).state).toBe('cancelled')
  })

  it.each([
    [{ budget: 1 }, 'invalid-request', 'budget'],
    [{ method: 'guessing' }, 'invalid-request', 'method'],
    [{ scope: { kind: 'filter', filter: { h11Min: 999 } } }, 'scope-empty', 'scope'],
    [{ scope: { kind: 'polytopes', keys: ['0'.repeat(32)] } }, 'no-such-polytope', 'scope.keys'],
  ])('is refused with %j (%s)', async (settings, code, field) => {
    const { status, body } = await hunt.lead
      .post(hunt.path('/searches'))
      .send({ targetVersionId: hunt.targetVersionId, scope: huntScope, budget: 60, seed: 5, ...settings })
    expect(status).toBe(422)
    expect(body).toMatchObject({ code, path: field })
  })

  it("cannot use another campaign's target", async () => {
    const stranger = await hunt.server.signIn('stranger')
    const own = await stranger.post('/api/campaigns').send({ name: 'Elsewhere' }).expect(201)
    const { status } = await stranger
      .post(`/api/campaigns/${own.body.id}/searches`)
      .send({ targetVersionId: hunt.targetVersionId, scope: huntScope, budget: 60, seed: 5 })
    expect(status).toBe(404)
    await stranger.get(`/api/campaigns/${own.body.id}/targets/${hunt.targetId}`).expect(404)
  })
})
