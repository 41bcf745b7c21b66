import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CandidateCertificates, Certification } from '../../shared/certificates.ts'
import type { StreamEvent } from '../../shared/events.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import { certificateSchema, engineVersion, scoringHash, checkRule } from '../../scoring/index.ts'
import { createCampaign } from '../../server/services/campaigns.ts'
import { builtVariant } from './support/builtWorker.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { listening, OpenStream, type Listening } from './support/listening.ts'
import { smallShortlist } from './support/smallShortlist.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

const rule = 'score log10(metric.divisor.top)\nreport volume\nhit log10(metric.divisor.top) > -3\n'

let server: TestServer
let http: Listening
let stream: OpenStream
let reviewer: Agent
let stranger: Agent
let list: ShortlistDetail

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
const keyAt = (place: number) => list.rows[place].candidateKey

beforeAll(async () => {
  server = await openTestServer({
    environment: { WORKERS: '2' },
    jobs: {
      nullSize: () => 20,
      backgroundWorker: builtVariant(new URL('./workers/failing.ts', import.meta.url)),
    },
  })
  await loadEntries(server, bundledEntries('small', (id) => /^r3-0/.test(id)).slice(0, 20))
  list = await smallShortlist(server, server.campaignId, server.accounts.lead, { rule, size: 10 })
  http = await listening(server)
  stream = await OpenStream.open(
    `${http.url}/api/events?campaign=${server.campaignId}`,
    await http.cookie('reader'),
  )
  reviewer = await server.signIn('reviewer')
  stranger = await server.signIn('stranger')
})
afterAll(async () => {
  stream.close()
  await http.close()
  await server.close()
})

type Told = Extract<StreamEvent, { kind: 'certification' }>
const told = (fits: (event: Told) => boolean) =>
  stream.event((event) => event.kind === 'certification' && fits(event)) as Promise<Told>

const ask = async (body: object): Promise<Certification> =>
  (await reviewer.post(path('/certifications')).send(body).expect(201)).body as Certification

/** Asks, and waits for the end. */
async function certify(body: object): Promise<Certification> {
  const { id } = await ask(body)
  const { certification } = await told(
    (event) => event.certification.id === id && event.certification.state === 'finished',
  )
  return certification
}

const certificatesOf = async (agent: Agent, key: string, base = path()): Promise<CandidateCertificates> =>
  (await agent.get(`${base}/candidates/${key}/certificates`).expect(200)).body as CandidateCertificates

const rows = async (): Promise<ShortlistDetail['rows']> =>
  ((await reviewer.get(path(`/shortlists/${list.id}`)).expect(200)).body as ShortlistDetail).rows

let targets = 0

/** A version of a new target of the campaign, whose scoring no other has; the remark tells the worker what to do. */
async function newTarget(remark: string): Promise<string> {
  targets += 1
  const lead = await server.signIn('lead')
  const text = `# ${remark}\nscore volume + ${targets}\n`
  const { body } = await lead.post(path('/targets')).send({ name: remark, text }).expect(201)
  return body.versions[0].id as string
}

describe('a certificate', () => {
  it('is made on request, told to the campaign, kept whole, and stands in the lists', async () => {
    const done = await certify({ targetVersionId: list.targetVersionId, candidateKeys: [keyAt(0)] })
    expect(done).toMatchObject({ total: 1, waiting: 0, passed: 1, failed: 0, broken: 0, author: 'Reviewer' })
    const { made } = await told(({ made }) => made?.candidateKey === keyAt(0))
    expect(made?.state).toBe('passed')

    const { certificates, waiting } = await certificatesOf(reviewer, keyAt(0))
    expect(waiting).toEqual([])
    const [certificate] = certificates
    expect(certificate).toMatchObject({
      id: made?.id,
      passed: true,
      engineVersion,
      author: 'Reviewer',
      scoring: { targetVersionId: list.targetVersionId, targetVersion: 1 },
    })
    const checked = checkRule(rule)
    expect(checked.ok && scoringHash(checked.rule, engineVersion)).toBe(certificate.scoring?.scoringHash)
    expect(certificate.checks.filter(({ result }) => result === 'pass').length).toBeGreaterThan(5)
    expect(certificate.checks.filter(({ result }) => result === 'fail')).toEqual([])

    const download = await reviewer
      .get(`/api/candidates/${keyAt(0)}/certificates/${certificate.id}`)
      .expect(200)
    expect(download.headers['content-disposition']).toMatch(/attachment; filename=certificate-/)
    const whole = certificateSchema.parse(download.body)
    expect(whole).toMatchObject({
      candidateKey: keyAt(0),
      rule,
      scoringHash: certificate.scoring?.scoringHash,
    })
    expect(whole.checks.map(({ id }) => id)).toEqual(certificate.checks.map(({ id }) => id))

    const [first, second] = await rows()
    expect(first.certificate).toEqual({ state: 'passed', id: certificate.id })
    expect(second.certificate).toEqual({ state: 'none', id: null })
  })

  it('carries "verified" without an override, and only for its own scoring', async () => {
    const give = (targetVersionId: string, reason = '') =>
      reviewer
        .post(path(`/candidates/${keyAt(0)}/verdicts`))
        .send({ targetVersionId, value: 'verified', reason })
    const { id } = (await certificatesOf(reviewer, keyAt(0))).certificates[0]
    const verdict = await give(list.targetVersionId).expect(201)
    expect(verdict.body).toMatchObject({ value: 'verified', override: false, certificateId: id, reason: '' })
    const other = await newTarget('another')
    const refused = await give(other)
    expect([refused.status, refused.body.code]).toEqual([422, 'reason-required'])
    const override = await give(other, 'by hand').expect(201)
    expect(override.body).toMatchObject({ value: 'verified', override: true, certificateId: null })
  })

  it('of the geometry alone may be read by everybody who may see the candidate, without names', async () => {
    await certify({ targetVersionId: null, candidateKeys: [keyAt(1)] })
    const { certificates } = (await stranger.get(`/api/candidates/${keyAt(1)}/certificates`).expect(200))
      .body as CandidateCertificates
    expect(certificates).toHaveLength(1)
    expect(certificates[0]).toMatchObject({ passed: true, scoring: null, author: null })
    const address = `/api/candidates/${keyAt(1)}/certificates/${certificates[0].id}`
    expect(certificateSchema.parse((await stranger.get(address).expect(200)).body).rule).toBeNull()
    // It certifies no scoring.
    const bare = await reviewer
      .post(path(`/candidates/${keyAt(1)}/verdicts`))
      .send({ targetVersionId: list.targetVersionId, value: 'verified' })
    expect(bare.status).toBe(422)
    expect((await rows())[1].certificate.state).toBe('none')
  })

  it('with a scoring is unknown to every other campaign, the same rule there or not', async () => {
    const { id: elsewhere } = await createCampaign(server.context, server.accounts.stranger, {
      name: 'Elsewhere',
      description: '',
    })
    const base = `/api/campaigns/${elsewhere}`
    const target = await stranger.post(`${base}/targets`).send({ name: 'Same', text: rule }).expect(201)
    const targetVersionId = target.body.versions[0].id as string
    expect(await certificatesOf(stranger, keyAt(0), base)).toEqual({ certificates: [], waiting: [] })
    expect((await stranger.get(`/api/candidates/${keyAt(0)}/certificates`)).body.certificates).toEqual([])
    const { id } = (await certificatesOf(reviewer, keyAt(0))).certificates[0]
    await stranger.get(`/api/candidates/${keyAt(0)}/certificates/${id}`).expect(404)
    const bare = await stranger
      .post(`${base}/candidates/${keyAt(0)}/verdicts`)
      .send({ targetVersionId, value: 'verified' })
    expect([bare.status, bare.body.code]).toEqual([422, 'reason-required'])
    expect((await stranger.get(`${base}/certifications`)).body).toEqual([])
    // Nor may it ask with a target version of this campaign, or end what runs here.
    const foreign = await stranger
      .post(`${base}/certifications`)
      .send({ targetVersionId: list.targetVersionId, candidateKeys: [keyAt(0)] })
    expect(foreign.status).toBe(404)
    const [mine] = (await reviewer.get(path('/certifications'))).body as Certification[]
    await stranger.post(`${base}/certifications/${mine.id}/cancel`).expect(404)
  })
})

describe('a request for many', () => {
  it('leaves out what is certified or waits, and works off the rest in order', async () => {
    const keys = list.rows.map(({ candidateKey }) => candidateKey)
    const body = { targetVersionId: list.targetVersionId, candidateKeys: keys }
    const done = await certify(body)
    expect(done).toMatchObject({ total: keys.length - 1, passed: keys.length - 1, waiting: 0 })
    expect((await rows()).map(({ certificate }) => certificate.state)).toEqual(keys.map(() => 'passed'))
    const again = await reviewer.post(path('/certifications')).send(body)
    expect([again.status, again.body.code]).toEqual([409, 'nothing-to-certify'])
    const forced = await certify({ ...body, candidateKeys: [keyAt(0)], again: true })
    expect(forced).toMatchObject({ total: 1, passed: 1 })
    expect((await certificatesOf(reviewer, keyAt(0))).certificates).toHaveLength(2)
  })

  it('refuses candidates that are not there', async () => {
    const missing = await reviewer
      .post(path('/certifications'))
      .send({ targetVersionId: list.targetVersionId, candidateKeys: [keyAt(0), '0'.repeat(32)] })
    expect([missing.status, missing.body.code]).toEqual([422, 'no-such-candidate'])
  })

  it('is cancelled at once: what is in hand is abandoned, and its thread serves others', async () => {
    const targetVersionId = await newTarget('the certifier never ends')
    const { id } = await ask({ targetVersionId, candidateKeys: [keyAt(0), keyAt(1), keyAt(2)] })
    await told((event) => event.certification.id === id && event.certification.state === 'running')
    const { waiting } = await certificatesOf(reviewer, keyAt(2))
    expect(waiting).toEqual([{ certificationId: id, targetVersionId, before: 2 }])
    const { body } = await reviewer.post(path(`/certifications/${id}/cancel`)).expect(200)
    expect(body).toMatchObject({ state: 'cancelled', waiting: 3, passed: 0 })
    expect((await certificatesOf(reviewer, keyAt(2))).waiting).toEqual([])
    // Both threads had been taken; both are free again.
    await certify({ targetVersionId: null, candidateKeys: [keyAt(2), keyAt(3)] })
    await reviewer.post(path(`/certifications/${id}/cancel`)).expect(409)
  })
})

describe('when it goes wrong', () => {
  it('a failed certificate counts until a later one passes, and cannot carry "verified"', async () => {
    const targetVersionId = await newTarget('the certificate fails')
    const done = await certify({ targetVersionId, candidateKeys: [keyAt(4)] })
    expect(done).toMatchObject({ passed: 0, failed: 1, broken: 0 })
    const { certificates } = await certificatesOf(reviewer, keyAt(4))
    const failed = certificates.find(({ scoring }) => scoring?.targetVersionId === targetVersionId)
    expect(failed?.passed).toBe(false)
    const bare = await reviewer
      .post(path(`/candidates/${keyAt(4)}/verdicts`))
      .send({ targetVersionId, value: 'verified' })
    expect([bare.status, bare.body.code]).toEqual([422, 'reason-required'])
    expect(bare.body.detail).toMatch(/did not pass/)
  })

  it.each(['throws', 'dies'])('a certifier that %s breaks its candidate only, and says so', async (how) => {
    const targetVersionId = await newTarget(`the certifier ${how}`)
    const done = await certify({ targetVersionId, candidateKeys: [keyAt(5), keyAt(6)] })
    expect(done).toMatchObject({ state: 'finished', total: 2, broken: 2, passed: 0, failed: 0 })
    expect(done.problems.map(({ candidateKey }) => candidateKey).sort()).toEqual([keyAt(5), keyAt(6)].sort())
    expect(done.problems[0].message).toMatch(how === 'dies' ? /thread ended/ : /purpose/)
  })
})
