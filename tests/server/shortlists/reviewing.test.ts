import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CampaignDetail } from '../../../shared/campaigns.ts'
import type { ShortlistDetail } from '../../../shared/shortlists.ts'
import type { Verdict, VerdictsGiven } from '../../../shared/verdicts.ts'
import type { Role } from '../../../shared/roles.ts'
import { bundledEntries, loadEntries } from '../support/bundledSample.ts'
import { smallShortlist } from '../support/smallShortlist.ts'
import { openTestServer, type Agent, type TestServer } from '../support/testServer.ts'

let server: TestServer
let list: ShortlistDetail
const agents = {} as Record<Role, Agent>

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
const key = (place: number) => list.rows[place].candidateKey
const read = async (id = list.id): Promise<ShortlistDetail> =>
  (await agents.reader.get(path(`/shortlists/${id}`)).expect(200)).body as ShortlistDetail
const row = async (place: number) => (await read()).rows[place]

const give = (who: Role, body: object) =>
  agents[who].post(path('/verdicts')).send({ targetVersionId: list.targetVersionId, ...body })
const given = async (who: Role, value: string, places: readonly number[], reason = 'by hand') =>
  (await give(who, { value, reason, candidateKeys: places.map(key) }).expect(200)).body as VerdictsGiven
const undo = async (who: Role, ids: readonly string[]) =>
  (await agents[who].post(path('/verdicts/undo')).send({ ids }).expect(200)).body as VerdictsGiven
const idsOf = ({ given }: VerdictsGiven) => given.map(({ verdict }) => verdict.id)
const history = async (place: number): Promise<Verdict[]> =>
  (await agents.reader.get(path(`/candidates/${key(place)}`)).expect(200)).body.verdicts as Verdict[]
const askForTwo = (secondReader: boolean) => agents.lead.patch(path()).send({ secondReader }).expect(200)

beforeAll(async () => {
  server = await openTestServer({ jobs: { nullSize: () => 10 } })
  await loadEntries(server, bundledEntries('small', (id) => /^r3-0/.test(id)).slice(0, 12))
  list = await smallShortlist(server, server.campaignId, server.accounts.lead, {
    rule: 'score log10(metric.divisor.top)\n',
    size: 10,
  })
  for (const role of ['lead', 'investigator', 'reviewer', 'reader'] as const) {
    agents[role] = await server.signIn(role)
  }
})
afterAll(() => server.close())

describe('verdicts in bulk', () => {
  it('decide each candidate by itself, and say which were refused and why', async () => {
    const stranger = 'f'.repeat(32)
    const { body } = await give('reviewer', {
      value: 'rejected',
      candidateKeys: [key(0), key(1), stranger, key(0)],
    }).expect(200)
    const { given: done, refused } = body as VerdictsGiven
    expect(done.map(({ candidateKey }) => candidateKey)).toEqual([key(0), key(1)])
    expect(refused).toEqual([
      { candidateKey: stranger, code: 'not-found', message: 'There is no such candidate.' },
    ])
    expect(await read()).toMatchObject({ rejected: 2, undecided: 8 })
    const bare = await given('reviewer', 'verified', [0, 1], '')
    expect(bare.given).toEqual([])
    expect(bare.refused.map(({ code }) => code)).toEqual(['reason-required', 'reason-required'])
  })

  it('are taken back one after the other, by who gave them; the history keeps all', async () => {
    const rejected = await given('reviewer', 'rejected', [2, 3])
    const verified = await given('reviewer', 'verified', [2])
    const strange = await undo('investigator', idsOf(verified))
    expect(strange.refused).toMatchObject([{ candidateKey: key(2), code: 'not-yours' }])
    const early = await undo('reviewer', idsOf(rejected))
    expect(early.refused).toMatchObject([{ candidateKey: key(2), code: 'overtaken' }])
    expect(early.given).toMatchObject([{ candidateKey: key(3), verdict: { value: 'undecided' } }])
    const back = await undo('reviewer', idsOf(verified))
    expect(back.given[0]?.verdict).toMatchObject({ value: 'rejected', undoneBy: 'Reviewer' })
    await undo('reviewer', idsOf(rejected).slice(0, 1))
    expect((await row(2)).verdict?.value).toBe('undecided')
    expect((await undo('reviewer', idsOf(rejected).slice(0, 1))).refused).toMatchObject([
      { code: 'overtaken' },
    ])
    const entries = await history(2)
    expect(entries.map(({ value, undoneBy }) => [value, undoneBy])).toEqual([
      ['undecided', 'Reviewer'],
      ['rejected', 'Reviewer'],
      ['verified', null],
      ['rejected', null],
    ])
    expect((await undo('reviewer', [entries[0].id])).refused).toMatchObject([{ code: 'is-an-undo' }])
  })

  it('taken back by another than the author of what stands again, name that author', async () => {
    await given('investigator', 'rejected', [4])
    const verified = await given('reviewer', 'verified', [4])
    await undo('reviewer', idsOf(verified))
    expect((await row(4)).verdict).toMatchObject({
      value: 'rejected',
      author: 'Investigator',
      undoneBy: 'Reviewer',
    })
  })
})

describe('a campaign that asks for two readers', () => {
  it('takes two different people for "verified", one for "rejected"', async () => {
    const before = await given('reviewer', 'verified', [5])
    expect(before.given[0]?.verdict.readers).toBeNull()
    await askForTwo(true)
    const verified = (await read()).verified
    expect((await row(5)).verdict).toMatchObject({ value: 'verified', readers: null })

    await given('reviewer', 'verified', [6])
    expect((await row(6)).verdict?.readers?.map(({ name }) => name)).toEqual(['Reviewer'])
    expect(await read()).toMatchObject({ verified, oneReader: 1 })
    await given('reviewer', 'verified', [6])
    expect(await read()).toMatchObject({ verified, oneReader: 1 })
    const second = await given('investigator', 'verified', [6])
    expect((await row(6)).verdict?.readers?.map(({ name }) => name)).toEqual(['Reviewer', 'Investigator'])
    expect(await read()).toMatchObject({ verified: verified + 1, oneReader: 0 })

    await undo('investigator', idsOf(second))
    expect((await row(6)).verdict).toMatchObject({ author: 'Reviewer', undoneBy: 'Investigator' })
    expect(await read()).toMatchObject({ verified, oneReader: 1 })
    await given('lead', 'verified', [6])
    expect((await row(6)).verdict?.readers?.map(({ name }) => name)).toEqual(['Reviewer', 'Lead'])

    await given('investigator', 'rejected', [6])
    expect((await row(6)).verdict).toMatchObject({ value: 'rejected', readers: null })
    const table = await agents.reader.get(path(`/shortlists/${list.id}/export.csv`)).expect(200)
    expect(table.text).not.toContain('by one reader by')
    await given('lead', 'verified', [7])
    const after = await agents.reader.get(path(`/shortlists/${list.id}/export.csv`)).expect(200)
    expect(after.text).toContain('verified by one reader by override')
    await askForTwo(false)
    const { body } = await agents.reader.get('/api/campaigns').expect(200)
    expect(body[0].secondReader).toBe(false)
  })

  it('is a lead’s setting', async () => {
    await agents.reviewer.patch(path()).send({ secondReader: true }).expect(403)
  })
})

describe('assignment', () => {
  const assign = (who: Role, accountId: string | null, places: readonly number[]) =>
    agents[who]
      .post(path('/assignments'))
      .send({ targetId: list.targetId, candidateKeys: places.map(key), accountId })

  it('hands rows to a member who gives verdicts, and counts what is open', async () => {
    const { reviewer, investigator, reader } = server.accounts
    await assign('investigator', reviewer, [7, 8, 9]).expect(200)
    await assign('reviewer', investigator, [9]).expect(200)
    expect((await row(8)).assignee).toEqual({ id: reviewer, name: 'Reviewer' })
    const waiting = async () => {
      const { body } = await agents.reader.get(path()).expect(200)
      return (body as CampaignDetail).shortlistList[0].waiting
    }
    expect(await waiting()).toEqual([
      { id: reviewer, name: 'Reviewer', open: 2 },
      { id: investigator, name: 'Investigator', open: 1 },
    ])
    await given('reviewer', 'rejected', [8])
    expect((await waiting()).map(({ open }) => open)).toEqual([1, 1])
    const refused = await assign('lead', reader, [8])
    expect([refused.status, refused.body.code]).toEqual([422, 'gives-no-verdicts'])
    await assign('lead', null, [9]).expect(200)
    expect((await row(9)).assignee).toBeNull()
  })

  it('goes back to nobody when the person gives no verdicts any more', async () => {
    const member = path(`/members/${server.accounts.investigator}`)
    await assign('lead', server.accounts.investigator, [9]).expect(200)
    await agents.lead.patch(member).send({ role: 'reader' }).expect(204)
    expect((await row(9)).assignee).toBeNull()
    await agents.lead.patch(member).send({ role: 'investigator' }).expect(204)
  })
})

describe('views under names', () => {
  const views = path
  it('are read by all members, and changed by their author or a lead', async () => {
    const body = { name: 'Open hits', address: 'verdict=undecided&hits=yes', shortlistId: list.id }
    const saved = await agents.reviewer.post(views('/shortlist-views')).send(body).expect(201)
    expect(saved.body).toMatchObject({ ...body, author: 'Reviewer' })
    await agents.lead
      .post(views('/shortlist-views'))
      .send({ name: 'Mine', address: 'reviewer=me', shortlistId: null })
      .expect(201)
    const listed = await agents.reader.get(views(`/shortlist-views?shortlist=${list.id}`)).expect(200)
    expect(listed.body.map(({ name }: { name: string }) => name)).toEqual(['Mine', 'Open hits'])
    const elsewhere = await agents.reader.get(views('/shortlist-views?shortlist=other')).expect(200)
    expect(elsewhere.body).toHaveLength(1)
    const one = views(`/shortlist-views/${saved.body.id}`)
    await agents.investigator.patch(one).send({ name: 'X' }).expect(403)
    await agents.reviewer.patch(one).send({ address: 'hits=yes' }).expect(200)
    const renamed = await agents.lead.patch(one).send({ name: 'Hits' }).expect(200)
    expect(renamed.body).toMatchObject({ name: 'Hits', address: 'hits=yes', author: 'Reviewer' })
    await agents.lead.delete(one).expect(204)
    await agents.lead.delete(one).expect(404)
    const nowhere = await agents.reviewer.post(views('/shortlist-views')).send({ ...body, shortlistId: 'x' })
    expect([nowhere.status, nowhere.body.code]).toEqual([422, 'no-such-shortlist'])
  })
})

describe('a newer issue', () => {
  const reissue = (id: string, body: object) =>
    agents.investigator.post(path(`/shortlists/${id}/reissues`)).send(body)

  it('leaves rows out, says what changed, and leaves the earlier one as it was', async () => {
    const before = await read()
    const without = [key(0), key(3)]
    const { body } = await reissue(list.id, {
      name: 'Second issue',
      how: { kind: 'rows', without },
    }).expect(201)
    const next = await read(body.shortlistId as string)
    expect(next).toMatchObject({ issue: 2, size: 8, reissueOf: { id: list.id, issue: 1, size: 10 } })
    expect(next.reissueOf?.left.map(({ rank, candidateKey }) => [rank, candidateKey])).toEqual([
      [1, key(0)],
      [4, key(3)],
    ])
    expect(next.rows[0]).toMatchObject({ candidateKey: key(1), rank: 1, previous: { rank: 2 } })
    expect(next.rows.map(({ outcome }) => outcome)).toEqual(
      before.rows.filter(({ candidateKey }) => !without.includes(candidateKey)).map(({ outcome }) => outcome),
    )
    expect(next.rows[0].verdict).toEqual(before.rows[1].verdict)
    expect(next.provenance?.takenOut).toBe(2)
    const { reissues, ...after } = await read()
    expect(reissues).toEqual([{ id: next.id, name: 'Second issue', issue: 2 }])
    expect({ ...after, reissues: [] }).toEqual(before)
    const gone = await reissue(next.id, { name: 'X', how: { kind: 'rows', without: [key(0)] } })
    expect([gone.status, gone.body.code]).toEqual([422, 'no-such-row'])
  })

  it('is drawn again by the same choices', async () => {
    const { body: same } = await reissue(list.id, { name: 'As it is', how: { kind: 'drawn' } }).expect(201)
    const again = await read(same.shortlistId as string)
    expect(again.rows.map(({ candidateKey }) => candidateKey)).toEqual(
      list.rows.map((_, place) => key(place)),
    )
    expect(again.rows.every(({ rank, previous }) => previous?.rank === rank)).toBe(true)
    expect(again.reissueOf?.left).toEqual([])
  })
})
