import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CandidateRelatives } from '../../shared/relatives.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import { wallVersion } from '../../scoring/index.ts'
import { CandidateInvariants } from '../../server/entities/candidateInvariants.ts'
import { createCampaign } from '../../server/services/campaigns.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let lead: Agent
let stranger: Agent
let elsewhere: string

/** Three polytopes with h11 = 2, the first two of which give the same threefold; and one polytope with many classes. */
const wanted = /^(r2-0025|r2-0026|r2-0028|w20-17-newton.*)$/

beforeAll(async () => {
  server = await openTestServer({ jobs: { nullSize: () => 20 } })
  const entries = (['small', 'large'] as const).flatMap((file) =>
    bundledEntries(file, (id) => wanted.test(id)),
  )
  await loadEntries(server, entries)
  lead = await server.signIn('lead')
  stranger = await server.signIn('stranger')
  const campaign = await createCampaign(server.context, server.accounts.stranger, {
    name: 'Elsewhere',
    description: '',
  })
  elsewhere = campaign.id
})
afterAll(() => server.close())

/** Searches everything in the library at random and lists what was found. */
async function shortlistIn(
  agent: Agent,
  campaignId: string,
  h11: number,
  size = 10,
): Promise<ShortlistDetail> {
  const { jobs } = server.context
  const path = `/api/campaigns/${campaignId}`
  const target = await agent.post(`${path}/targets`).send({ name: `T${h11}`, text: 'score 0 - h21' })
  const targetVersionId = target.body.versions[0].id as string
  const filter = { h11Min: h11, h11Max: h11 }
  const search = await agent
    .post(`${path}/searches`)
    .send({ targetVersionId, scope: { kind: 'filter', filter }, budget: 40, seed: 3, islands: 1, keep: 100 })
    .expect(201)
  await jobs.searches.ended(search.body.id as string)
  const { body } = await agent
    .post(`${path}/shortlists`)
    .send({ name: `L${h11}`, searchIds: [search.body.id], size })
    .expect(201)
  await jobs.invariants.idle()
  return body as ShortlistDetail
}

async function relativesOf(agent: Agent, key: string, campaign?: string): Promise<CandidateRelatives> {
  const query = campaign === undefined ? '' : `?campaign=${campaign}`
  return (await agent.get(`/api/candidates/${key}/relatives${query}`).expect(200)).body as CandidateRelatives
}

describe('relatives of a candidate', () => {
  let list: ShortlistDetail
  let onOne: string
  let onOther: string
  let nearPair: [pair: string, triangles: number]

  beforeAll(async () => {
    list = await shortlistIn(lead, server.campaignId, 2)
    onOne = list.rows.find(({ polytopeName }) => polytopeName === 'r2-0025')?.candidateKey ?? ''
  })

  it('are found on another polytope by equal invariants, and only there', async () => {
    const relatives = await relativesOf(lead, onOne, server.campaignId)
    expect(relatives.invariants).toMatchObject({
      h11: 2,
      version: wallVersion,
      triple: 1,
      products: ['7'],
    })
    const others = relatives.equivalents.filter(({ samePolytope }) => !samePolytope)
    expect(others.map(({ polytopeName }) => polytopeName)).toContain('r2-0026')
    expect(relatives.equivalentsTotal).toBe(relatives.equivalents.length)
    expect(relatives.waiting).toBe(0)
    expect(relatives.compared).toBeGreaterThanOrEqual(relatives.equivalentsTotal)
    onOther = others[0].key
    const back = await relativesOf(lead, onOther)
    expect(back.invariants.key).toBe(relatives.invariants.key)
    expect(back.equivalents.map(({ key }) => key)).toContain(onOne)
    const unlike = list.rows.find(
      ({ candidateKey }) =>
        candidateKey !== onOne && relatives.equivalents.every(({ key }) => key !== candidateKey),
    )
    expect((await relativesOf(lead, unlike?.candidateKey ?? '')).invariants.key).not.toBe(
      relatives.invariants.key,
    )
  })

  it("carry the verdicts of the reader's campaigns, the latest per target", async () => {
    const give = (value: string, reason: string) =>
      lead
        .post(`/api/campaigns/${server.campaignId}/candidates/${onOther}/verdicts`)
        .send({ targetVersionId: list.targetVersionId, value, reason })
        .expect(201)
    await give('undecided', '')
    await give('rejected', 'no section')
    const { equivalents } = await relativesOf(lead, onOne)
    expect(equivalents.find(({ key }) => key === onOther)?.verdicts).toEqual([
      expect.objectContaining({
        value: 'rejected',
        campaignId: server.campaignId,
        campaignName: 'Test hunt',
      }),
    ])
  })

  it('stay inside the campaigns that know of them', async () => {
    const before = await relativesOf(stranger, onOne)
    expect(before).toMatchObject({ equivalents: [], equivalentsTotal: 0, compared: 0, nearTotal: 0 })
    await stranger.get(`/api/candidates/${onOne}/relatives?campaign=${server.campaignId}`).expect(404)
    await lead.get(`/api/candidates/${onOne}/relatives?campaign=${elsewhere}`).expect(404)
    // Found by the other campaign as well, the same candidates show without the first one's verdicts.
    await shortlistIn(stranger, elsewhere, 2)
    const after = await relativesOf(stranger, onOne, elsewhere)
    expect(after.equivalents.map(({ key }) => key)).toContain(onOther)
    expect(after.equivalents.flatMap(({ verdicts }) => verdicts)).toEqual([])
  })

  it('on one polytope are near duplicates, with the number of triangles by which they differ', async () => {
    const { rows: entries } = await shortlistIn(lead, server.campaignId, 20, 40)
    expect(entries.length).toBeGreaterThan(5)
    const relatives: CandidateRelatives[] = []
    for (const { candidateKey } of entries.slice(0, 15)) relatives.push(await relativesOf(lead, candidateKey))
    const distance = new Map<string, number>()
    for (const { key, nearDuplicates, nearCompared, nearTotal } of relatives) {
      expect([nearCompared, nearTotal]).toEqual([entries.length - 1, entries.length - 1])
      for (const near of nearDuplicates) {
        expect(near.triangles).toBeGreaterThan(0)
        expect(near.triangles).toBeLessThanOrEqual(8)
        expect(near.flips).toBe(Math.ceil(near.triangles / 2))
        distance.set(`${key} ${near.key}`, near.triangles)
      }
    }
    expect(distance.size).toBeGreaterThan(0)
    ;[nearPair] = distance
    const asked = new Set(relatives.map(({ key }) => key))
    for (const [pair, triangles] of distance) {
      const [key, other] = pair.split(' ')
      if (asked.has(other)) expect(distance.get(`${other} ${key}`)).toBe(triangles)
    }
  })

  it('are laid on each other by a symmetry of the polytope, and cut by a plane', async () => {
    const [pair, apart] = nearPair
    const [one, two] = pair.split(' ')
    const { body } = await lead.get(`/api/candidates/${one}/alignment/${two}`).expect(200)
    const { image, triangles } = body.points as { image: number[]; triangles: number }
    expect(triangles).toBe(apart)
    expect([...image].sort((a, b) => a - b)).toEqual(image.map((_, point) => point))
    const elsewhereOn = await lead.get(`/api/candidates/${one}/alignment/${onOne}`).expect(200)
    expect(elsewhereOn.body).toMatchObject({ key: one, other: onOne, points: null })
    await lead.get(`/api/candidates/${one}/alignment/0123456789abcdef0123456789abcdef`).expect(404)
    const cut = await lead.get(`/api/candidates/${one}/slice?first=ray&second=wall-0`).expect(200)
    expect(cut.body.walls.length).toBeGreaterThan(1)
    expect(cut.body.directions[0]).toEqual([1, 0])
    const parallel = await lead.get(`/api/candidates/${one}/slice?first=ray&second=ray`).expect(422)
    expect(parallel.body.code).toBe('slice.parallel')
    await lead.get(`/api/candidates/${one}/slice?first=somewhere&second=ray`).expect(422)
  })

  it('are asked for with a key that exists', async () => {
    await lead.get('/api/candidates/0123456789abcdef0123456789abcdef/relatives').expect(404)
  })

  it('are computed anew under another version of the invariants', async () => {
    const { source, writes, jobs } = server.context
    const ofOne = { candidateKey: onOne }
    await writes.transaction((manager) =>
      manager.update(CandidateInvariants, ofOne, { version: wallVersion - 1, wallKey: 'old' }),
    )
    // Asking is enough to have them computed.
    expect(await relativesOf(lead, onOther)).toMatchObject({ waiting: 1 })
    await jobs.invariants.idle()
    expect(await source.manager.findOneBy(CandidateInvariants, ofOne)).toMatchObject({ version: wallVersion })
    expect(await relativesOf(lead, onOther)).toMatchObject({ waiting: 0 })
  })
})
