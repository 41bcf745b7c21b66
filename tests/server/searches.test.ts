import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { caution } from '../../shared/caution.ts'
import type { CandidateGeometry, ClassPicture } from '../../shared/candidates.ts'
import type { SearchDetail } from '../../shared/searches.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { StreamEvent } from '../../shared/events.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { listening, OpenStream, type Listening } from './support/listening.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

const rule = `require favourable label "favourable"
score log10(metric.divisor.top)
report volume, smallest = min(d in divisors : d.volume)
hit log10(metric.divisor.top) > -3
`

let server: TestServer
let http: Listening
let stream: OpenStream
let lead: Agent
let targetId: string
let targetVersionId: string

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`

beforeAll(async () => {
  server = await openTestServer({ environment: { WORKERS: '2' }, jobs: { nullSize: () => 60 } })
  await loadEntries(
    server,
    bundledEntries('large', (id) => /^w(9-39|10-46|20-17)-newton/.test(id)),
  )
  http = await listening(server)
  stream = await OpenStream.open(
    `${http.url}/api/events?campaign=${server.campaignId}`,
    await http.cookie('reader'),
  )
  lead = await server.signIn('lead')
  const { body } = await lead.post(path('/targets')).send({ name: 'Long range', text: rule }).expect(201)
  targetId = body.id
  targetVersionId = body.versions[0].id
})
afterAll(async () => {
  stream.close()
  await http.close()
  await server.close()
})

const scope = { kind: 'filter', filter: { h11Min: 9, h11Max: 20 } }

const start = async (settings: object = {}): Promise<SearchDetail> => {
  const { body } = await lead
    .post(path('/searches'))
    .send({ targetVersionId, scope, budget: 60, seed: 5, islands: 2, keep: 20, ...settings })
    .expect(201)
  return body as SearchDetail
}

const read = async (id: string): Promise<SearchDetail> =>
  (await lead.get(path(`/searches/${id}`)).expect(200)).body as SearchDetail

const told = (id: string, fits: (event: StreamEvent & { kind: 'search' }) => boolean) =>
  stream.event((event) => event.kind === 'search' && event.id === id && fits(event))

const finished = async (id: string): Promise<SearchDetail> => {
  await told(id, ({ state }) => state === 'finished' || state === 'failed')
  return read(id)
}

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
    const sound = await lead.post(path('/rules/check')).send({ text: rule }).expect(200)
    expect(sound.body).toMatchObject({ ok: true, scoringHash: expect.stringMatching(/^[0-9a-f]{64}$/) })
  })
})

describe('a search', () => {
  it('runs to its budget, tells its progress, and keeps the best', async () => {
    const created = await start()
    expect(created).toMatchObject({ state: 'queued', polytopes: 3, budget: 60, evaluations: 0, top: [] })
    const done = await finished(created.id)
    expect(done).toMatchObject({ state: 'finished', evaluations: 60, failure: null })
    expect(done.finishedAt).not.toBeNull()
    expect(done.progress.islands.map(({ evaluations }) => evaluations)).toEqual([30, 30])
    expect(done.top).toHaveLength(20)
    const [first] = done.top
    expect(first.outcome).toMatchObject({ kind: 'feasible', score: done.best })
    expect(first.candidateKey).toBe(done.progress.bestKey)
    expect(done.progress.curve.at(-1)?.[1]).toBe(done.best)
    const list = await lead.get(path('/searches')).expect(200)
    expect(list.body.map(({ id }: { id: string }) => id)).toContain(created.id)
    const target = await lead.get(path(`/targets/${targetId}`)).expect(200)
    expect(target.body.latestScope).toEqual(scope)
  })

  it('gives the same result from the same seed, and another from another', async () => {
    const [a, b] = [await start({ seed: 77 }), await start({ seed: 77 })]
    const c = await start({ seed: 78 })
    const [first, second, third] = [await finished(a.id), await finished(b.id), await finished(c.id)]
    expect(second.top).toEqual(first.top)
    expect(second.progress.curve).toEqual(first.progress.curve)
    expect(third.top).not.toEqual(first.top)
  })

  it('enumerates a small scope exactly, and says how far it has to go', async () => {
    const few = { kind: 'filter', filter: { h11Min: 9, h11Max: 10 } }
    const { id } = await start({ method: 'exhaustive', scope: few, budget: 50 })
    const done = await finished(id)
    // 16 and 4 classes modulo automorphisms.
    expect(done).toMatchObject({ state: 'finished', evaluations: 20, budget: 50 })
    expect(done.progress).toMatchObject({ budget: 20, exhausted: true, secondsLeft: 0 })
    expect(done.progress.islands.map(({ evaluations }) => evaluations)).toEqual([10, 10])
  })

  it('fails with its reason when there is more to enumerate than the budget', async () => {
    const { id } = await start({ method: 'exhaustive' })
    const failed = await finished(id)
    expect(failed).toMatchObject({ state: 'failed', failure: { code: 'search.too-many-classes' } })
    expect(failed.failure?.message).toMatch(/more than 60 classes/)
  })

  it('counts the hits of each island', async () => {
    const { body: target } = await lead
      .post(path('/targets'))
      .send({ name: 'Its own line', text: 'score volume hit volume > 0' })
      .expect(201)
    const created = await start({ targetVersionId: target.versions[0].id, budget: 20 })
    const done = await finished(created.id)
    expect(done.ownHitLine).toBe(true)
    expect(done.progress.islands.map(({ hits }) => hits)).toEqual([10, 10])
  })

  it('is compared with the null sample of its scope and rule, drawn once', async () => {
    const { id } = await start({ seed: 3 })
    await expect
      .poll(async () => (await read(id)).null?.complete, { timeout: 50_000, interval: 250 })
      .toBe(true)
    const { null: summary } = await read(id)
    expect(summary).toMatchObject({ size: 60, complete: true })
    expect(summary?.hit?.size).toBe(summary?.evaluated)
    const before = await server.context.source.query<{ count: number }[]>(
      'SELECT COUNT(*) AS count FROM null_sample',
    )
    await finished((await start({ seed: 4 })).id)
    const after = await server.context.source.query<{ count: number }[]>(
      'SELECT COUNT(*) AS count FROM null_sample',
    )
    expect(after).toEqual(before)
  })

  it("counts what lies above the null's 99 % quantile as a hit when the rule does not say", async () => {
    const { body: target } = await lead
      .post(path('/targets'))
      .send({ name: 'Hit left open', text: 'score log10(metric.divisor.top)' })
      .expect(201)
    const { id } = await start({ targetVersionId: target.versions[0].id, seed: 6 })
    await finished(id)
    await expect
      .poll(async () => (await read(id)).null?.complete, { timeout: 50_000, interval: 250 })
      .toBe(true)
    const { top, null: summary } = await read(id)
    const { body: shortlist } = await lead
      .post(path('/shortlists'))
      .send({ name: 'Hits by quantile', searchIds: [id], size: 20 })
      .expect(201)
    for (const { outcome } of [...top, ...(shortlist as ShortlistDetail).rows]) {
      if (outcome.kind !== 'feasible') throw new Error('a rule without require is feasible everywhere')
      expect(outcome.hit).toBe(outcome.score > (summary?.quantile99 ?? Number.NaN))
    }
  })

  it('pauses, goes on and ends as if nothing had been', async () => {
    const settings = { seed: 9, budget: 400 }
    const undisturbed = await finished((await start(settings)).id)
    const { id } = await start(settings)
    await told(id, ({ progress }) => progress.evaluations > 0)
    const paused = await lead.post(path(`/searches/${id}/pause`)).expect(200)
    expect(paused.body.state).toBe('paused')
    const wrong = await lead.post(path(`/searches/${id}/pause`))
    expect([wrong.status, wrong.body.code]).toEqual([409, 'wrong-state'])
    const resumed = await lead.post(path(`/searches/${id}/resume`)).expect(200)
    expect(['queued', 'running']).toContain(resumed.body.state)
    const done = await finished(id)
    expect(done.top).toEqual(undisturbed.top)
    expect(done.progress).toEqual({
      ...undisturbed.progress,
      evaluationsPerSecond: expect.anything(),
      secondsLeft: 0,
    })
  })

  it('is cancelled for good, and keeps what it has found', async () => {
    const { id } = await start({ budget: 100_000, seed: 10 })
    await told(id, ({ progress }) => progress.evaluations > 0)
    const { body } = await lead.post(path(`/searches/${id}/cancel`)).expect(200)
    expect(body).toMatchObject({ state: 'cancelled', finishedAt: expect.any(String) })
    expect(body.top.length).toBeGreaterThan(0)
    const resumed = await lead.post(path(`/searches/${id}/resume`))
    expect([resumed.status, resumed.body.code]).toEqual([409, 'wrong-state'])
    await server.context.writes.idle()
    expect((await read(id)).state).toBe('cancelled')
  })

  it.each([
    [{ budget: 1 }, 'invalid-request', 'budget'],
    [{ method: 'guessing' }, 'invalid-request', 'method'],
    [{ scope: { kind: 'filter', filter: { h11Min: 999 } } }, 'scope-empty', 'scope'],
    [{ scope: { kind: 'polytopes', keys: ['0'.repeat(32)] } }, 'no-such-polytope', 'scope.keys'],
  ])('is refused with %j (%s)', async (settings, code, field) => {
    const { status, body } = await lead
      .post(path('/searches'))
      .send({ targetVersionId, scope, budget: 60, seed: 5, ...settings })
    expect(status).toBe(422)
    expect(body).toMatchObject({ code, path: field })
  })

  it("cannot use another campaign's target", async () => {
    const stranger = await server.signIn('stranger')
    const own = await stranger.post('/api/campaigns').send({ name: 'Elsewhere' }).expect(201)
    const { status } = await stranger
      .post(`/api/campaigns/${own.body.id}/searches`)
      .send({ targetVersionId, scope, budget: 60, seed: 5 })
    expect(status).toBe(404)
    await stranger.get(`/api/campaigns/${own.body.id}/targets/${targetId}`).expect(404)
  })
})

describe('a shortlist', () => {
  let shortlist: ShortlistDetail
  let searchId: string

  beforeAll(async () => {
    searchId = (await finished((await start({ seed: 21 })).id)).id
    const { body } = await lead
      .post(path('/shortlists'))
      .send({ name: '=First look', searchIds: [searchId], size: 12 })
      .expect(201)
    shortlist = body as ShortlistDetail
  })

  it('freezes the best of its searches in their order', async () => {
    const search = await read(searchId)
    expect(shortlist).toMatchObject({ size: 12, undecided: 12, verified: 0, columns: ['volume', 'smallest'] })
    expect(shortlist.rows.map(({ rank }) => rank)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12])
    expect(shortlist.rows.map(({ candidateKey }) => candidateKey)).toEqual(
      search.top.slice(0, 12).map(({ candidateKey }) => candidateKey),
    )
    expect(search.shortlists).toEqual([{ id: shortlist.id, name: '=First look' }])
  })

  it('merges several searches without repeating a candidate', async () => {
    const other = await finished((await start({ seed: 22 })).id)
    const { body } = await lead
      .post(path('/shortlists'))
      .send({ name: 'Both', searchIds: [searchId, other.id], size: 500 })
      .expect(201)
    const keys = (body as ShortlistDetail).rows.map(({ candidateKey }) => candidateKey)
    expect(new Set(keys).size).toBe(keys.length)
    expect(keys.length).toBeGreaterThan(20)
  })

  it('refuses searches that are not there or do not go together', async () => {
    const missing = await lead.post(path('/shortlists')).send({ name: 'x', searchIds: ['nothing'] })
    expect([missing.status, missing.body.code]).toEqual([422, 'no-such-search'])
    const target = await lead
      .post(path('/targets'))
      .send({ name: 'Other', text: 'score -volume' })
      .expect(201)
    const other = await finished((await start({ targetVersionId: target.body.versions[0].id })).id)
    const mixed = await lead.post(path('/shortlists')).send({ name: 'x', searchIds: [searchId, other.id] })
    expect([mixed.status, mixed.body.code]).toEqual([422, 'mixed-targets'])
  })

  it('opens the dossier of its candidates, computed from the stored heights', async () => {
    const { candidateKey, polytopeKey, outcome } = shortlist.rows[0]
    const stranger = await server.signIn('stranger')
    const { body } = await stranger.get(`/api/candidates/${candidateKey}`).expect(200)
    expect(body.polytope.key).toBe(polytopeKey)
    const { divisorSpectrum } = (await stranger.get(`/api/candidates/${candidateKey}/spectra`).expect(200))
      .body
    expect(divisorSpectrum).toHaveLength(body.polytope.points - 4)
    expect(outcome.kind).toBe('feasible')
    if (outcome.kind !== 'feasible') return
    // The spectrum by full decomposition against the score's top eigenvalue by iteration.
    expect(Math.log10(divisorSpectrum.at(-1))).toBeCloseTo(outcome.score, 8)
    expect(Math.log10(body.topEigenvalue)).toBe(outcome.score)
    expect(body.reference.volume).toBeCloseTo(outcome.report.volume as number, 8)
    const triples = body.intersections.filter(([i, j, k]: number[]) => i < j && j < k)
    expect(triples).toHaveLength(body.triangles.length)
    // Euler number = sum_{i<j<k} kappa_ijk - sum_k c2 . D_k = 2 (h11 - h21).
    const sum = (list: number[]) => list.reduce((a, b) => a + b, 0)
    const euler = sum(triples.map(([, , , value]: number[]) => value)) - sum(body.secondChern)
    expect(euler).toBe(body.polytope.euler)
    await stranger.get(`/api/candidates/${'0'.repeat(32)}`).expect(404)
  })

  it('draws small pictures of many candidates in one request, as the dossiers have them', async () => {
    const keys = shortlist.rows.slice(0, 5).map(({ candidateKey }) => candidateKey)
    const unknown = '0'.repeat(32)
    const stranger = await server.signIn('stranger')
    const { body } = await stranger
      .get(`/api/candidates/pictures?keys=${[...keys, unknown].join(',')}`)
      .expect(200)
    const pictures = body as ClassPicture[]
    expect(pictures.map(({ key }) => key).sort()).toEqual([...keys].sort())
    const [{ key, faces }] = pictures
    const dossier = (await stranger.get(`/api/candidates/${key}`).expect(200)).body as CandidateGeometry
    const largest = Math.max(...dossier.polytope.twoFaces.map(({ area }) => area))
    expect(faces).toHaveLength(2)
    expect(faces[0].area).toBe(largest)
    for (const { index, triangles, area } of faces) {
      expect(triangles).toHaveLength(area)
      expect(triangles).toEqual(dossier.triangles.filter((_, t) => dossier.faceOf[t] === index))
    }
    const bad = await stranger.get('/api/candidates/pictures?keys=nonsense')
    expect([bad.status, bad.body.code]).toEqual([422, 'invalid-request'])
  })

  it('answers a browser that still holds a dossier without sending it again, but not a stranger to it', async () => {
    const address = `/api/candidates/${shortlist.rows[0].candidateKey}`
    const { headers } = await lead.get(address).expect(200)
    expect(headers['cache-control']).toBe('private, no-cache')
    await lead.get(address).set('If-None-Match', headers.etag).expect(304)
    await request(server.app).get(address).set('If-None-Match', headers.etag).expect(401)
  })

  it('takes verdicts, keeps their history and counts the latest', async () => {
    const reviewer = await server.signIn('reviewer')
    const { candidateKey } = shortlist.rows[1]
    const place = path(`/candidates/${candidateKey}`)
    const give = (value: string, reason?: string) =>
      reviewer.post(`${place}/verdicts`).send({ targetVersionId, value, reason })
    const bare = await give('verified')
    expect([bare.status, bare.body.code, bare.body.path]).toEqual([422, 'reason-required', 'reason'])
    const override = await give('verified', 'checked by hand').expect(201)
    expect(override.body).toMatchObject({ value: 'verified', override: true, author: 'Reviewer' })
    await give('rejected', 'a small cycle').expect(201)
    const { body } = await reviewer.get(place).expect(200)
    expect(body.verdicts.map(({ value }: { value: string }) => value)).toEqual(['rejected', 'verified'])
    const [appearance] = body.appearances.filter(
      ({ shortlistId }: { shortlistId: string }) => shortlistId === shortlist.id,
    )
    expect(appearance).toMatchObject({
      rank: 2,
      size: 12,
      previousKey: shortlist.rows[0].candidateKey,
      nextKey: shortlist.rows[2].candidateKey,
    })
    const after = await reviewer.get(path(`/shortlists/${shortlist.id}`)).expect(200)
    expect(after.body).toMatchObject({ undecided: 11, verified: 0, rejected: 1 })
    expect(after.body.rows[1].verdict).toMatchObject({ value: 'rejected', override: false })
    const campaign = await reviewer.get(path()).expect(200)
    expect(campaign.body.shortlistList.find(({ id }: { id: string }) => id === shortlist.id).rejected).toBe(1)
    await give('undecided').expect(201)
    const back = await reviewer.get(path(`/shortlists/${shortlist.id}`)).expect(200)
    expect(back.body).toMatchObject({ undecided: 12, rejected: 0 })
  })

  it('is exported with caution, units, conventions and schema version', async () => {
    const table = await lead.get(path(`/shortlists/${shortlist.id}/export.csv`)).expect(200)
    expect(table.headers['content-type']).toMatch(/^text\/csv/)
    expect(table.headers['content-disposition']).toMatch(/shortlist-first-look\.csv/)
    const lines = table.text.trimEnd().split('\r\n')
    const remarks = lines.filter((line) => line.startsWith('#'))
    expect(remarks).toContain(`# ${caution}`)
    expect(remarks.join('\n')).toMatch(/schema tessellary\.shortlist-table\/1/)
    expect(remarks.join('\n')).toMatch(/Units: .*h11: count/)
    expect(remarks.join('\n')).toMatch(/score log10\(metric\.divisor\.top\)/)
    const rows = lines.slice(remarks.length)
    expect(rows[0]).toMatch(/^rank,candidate,polytope,.*,report: volume,report: smallest$/)
    expect(rows).toHaveLength(13)
    expect(rows[1].split(',').slice(0, 2)).toEqual(['1', shortlist.rows[0].candidateKey])
    const document = await lead.get(path(`/shortlists/${shortlist.id}/export.json`)).expect(200)
    expect(document.body).toMatchObject({
      schema: 'tessellary.shortlist/1',
      caution,
      units: { h11: 'count' },
    })
    expect(document.body.conventions.join(' ')).toMatch(/Einstein-frame/)
    expect(document.body.shortlist.rows).toHaveLength(12)
  })
})

describe('a preview', () => {
  const preview = (text: string, size = 40) => lead.post(path('/previews')).send({ text, scope, size })
  const ended = async (id: string) =>
    (await leadStream.event(
      (event) => event.kind === 'preview' && event.preview.id === id && event.preview.state !== 'running',
    )) as StreamEvent & { kind: 'preview' }

  let leadStream: OpenStream
  beforeAll(async () => {
    leadStream = await OpenStream.open(
      `${http.url}/api/events?campaign=${server.campaignId}`,
      await http.cookie('lead'),
    )
  })
  afterAll(() => leadStream.close())

  it('evaluates the rule on a null sample and says what it cost', async () => {
    const { body } = await preview(`require h11 > 10 label "large"\n${rule}`).expect(202)
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
    expect((await lead.get(path(`/previews/${body.id}`)).expect(200)).body).toEqual(done)
    await lead.get(`/api/candidates/${done.best[0].candidateKey}`).expect(200)
  })

  it('is replaced by the next one of the same account', async () => {
    const first = await preview(rule, 2000).expect(202)
    const second = await preview(rule, 10).expect(202)
    expect((await ended(first.body.id)).preview.state).toBe('replaced')
    expect((await ended(second.body.id)).preview.state).toBe('done')
    await lead.get(path(`/previews/${first.body.id}`)).expect(404)
  })

  it('is ended on request', async () => {
    const { body } = await preview(rule, 2000).expect(202)
    await lead.delete(path('/previews')).expect(204)
    expect((await ended(body.id)).preview.state).toBe('replaced')
  })

  it('is refused for a rule with an error', async () => {
    const { status, body } = await preview('score')
    expect([status, body.code]).toEqual([422, 'rule-invalid'])
    expect(body.issues.length).toBeGreaterThan(0)
  })
})
