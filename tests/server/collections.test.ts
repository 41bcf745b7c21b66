import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { Membership } from '../../server/entities/membership.ts'
import { createCampaign } from '../../server/services/campaigns.ts'
import type { CollectionView } from '../../shared/collections.ts'
import type { PolytopeRow } from '../../shared/polytopes.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let lead: Agent
let investigator: Agent
let reader: Agent
let stranger: Agent
/** A campaign of the stranger's own. */
let elsewhere: string
let base: string

/** Vertices of the Newton polytope of the weights (3,4,5,6,7), (h11, h21) = (24, 9): not in the sample. */
const pasted =
  '-2 2 1 -1\n-1 -1 0 -1\n0 -1 -1 -1\n0 -1 -1 2\n0 -1 0 -1\n0 -1 0 0\n0 0 -1 1\n0 0 0 1\n0 0 1 -1\n0 1 -1 -1\n0 1 1 -1\n1 0 -2 -1\n1 0 -2 0\n1 0 1 -1\n1 0 1 0'

beforeAll(async () => {
  server = await openTestServer()
  await loadEntries(
    server,
    bundledEntries('small', (id) => /^r[12]-/.test(id)),
  )
  lead = await server.signIn('lead')
  investigator = await server.signIn('investigator')
  reader = await server.signIn('reader')
  stranger = await server.signIn('stranger')
  const other = await createCampaign(server.context, server.accounts.stranger, {
    name: 'Another hunt',
    description: '',
  })
  elsewhere = other.id
  base = `/api/campaigns/${server.campaignId}/collections`
})
afterAll(() => server.close())

const make = async (body: object, agent = investigator): Promise<CollectionView> =>
  (await agent.post(base).send(body).expect(201)).body as CollectionView
const rows = async (agent: Agent, query: string): Promise<PolytopeRow[]> =>
  (await agent.get(`/api/polytopes?limit=500&${query}`).expect(200)).body.rows as PolytopeRow[]
const listed = async (agent: Agent, campaign?: string): Promise<CollectionView[]> =>
  (await agent.get(`/api/collections${campaign ? `?campaign=${campaign}` : ''}`).expect(200))
    .body as CollectionView[]

describe('collections', () => {
  it('hold what a filter matches, are filtered by, and are searched in', async () => {
    const two = await make({ name: 'two moduli', scope: { kind: 'filter', filter: { h11Min: 2 } } })
    // 36 reflexive polytopes with h11 = 2 (Kreuzer, Skarke).
    expect(two).toMatchObject({ polytopes: 36, own: true, publishedAt: null, authorName: 'Investigator' })
    expect(await rows(reader, `collection=${two.id}`)).toHaveLength(36)
    expect(await rows(reader, `collection=${two.id}&favourable=yes`)).toHaveLength(36)
    expect(await rows(reader, `collection=${two.id}&h11Max=1`)).toEqual([])
    const scope = { kind: 'collection', collection: two.id }
    const summary = await reader.post(`/api/campaigns/${server.campaignId}/scope`).send(scope).expect(200)
    expect(summary.body).toMatchObject({ count: 36, h11Min: 2, h11Max: 2 })
  })

  it('take polytopes in and let them go, each once', async () => {
    const { id } = await make({ name: 'by hand' })
    const keys = (await rows(reader, 'h11Max=1')).map(({ key }) => key)
    const send = (word: string, some: string[]) =>
      investigator.post(`${base}/${id}/${word}`).send({ scope: { kind: 'polytopes', keys: some } })
    expect((await send('add', keys.slice(0, 3)).expect(200)).body).toMatchObject({ changed: 3 })
    expect((await send('add', keys).expect(200)).body).toMatchObject({
      changed: 2,
      collection: { polytopes: 5 },
    })
    expect((await send('remove', keys.slice(1)).expect(200)).body).toMatchObject({ changed: 4 })
    expect((await rows(reader, `collection=${id}`)).map(({ key }) => key)).toEqual([keys[0]])
    const unknown = await send('add', ['0'.repeat(32)])
    expect(unknown.status).toBe(422)
    expect(unknown.body).toMatchObject({ code: 'no-such-polytope' })
  })

  it('are renamed and deleted by those who may, and the polytopes stay', async () => {
    const { id } = await make({ name: 'first name', scope: { kind: 'filter', filter: { h11Max: 1 } } })
    const renamed = await investigator.patch(`${base}/${id}`).send({ name: ' second name ' }).expect(200)
    expect(renamed.body).toMatchObject({ name: 'second name', polytopes: 5 })
    await reader.delete(`${base}/${id}`).expect(403)
    await investigator.delete(`${base}/${id}`).expect(204)
    await investigator.delete(`${base}/${id}`).expect(404)
    expect(await rows(reader, 'h11Max=1')).toHaveLength(5)
    expect(await rows(reader, `collection=${id}`)).toEqual([])
  })

  it('are nothing to other campaigns until a lead publishes them, imports and all', async () => {
    const imported = await investigator
      .post(`/api/campaigns/${server.campaignId}/polytopes`)
      .send({ text: pasted, name: 'seven weights' })
      .expect(201)
    const { key } = imported.body.imported[0] as { key: string }
    const { id } = await make({ name: 'with an import', scope: { kind: 'polytopes', keys: [key] } })
    const asked = { kind: 'collection', collection: id }
    const unseen = async () => {
      expect((await listed(stranger)).some((one) => one.id === id)).toBe(false)
      expect(await rows(stranger, `collection=${id}`)).toEqual([])
      expect(await rows(stranger, 'text=seven')).toEqual([])
      await stranger.get(`/api/polytopes/${key}`).expect(404)
      const scope = await stranger.post(`/api/campaigns/${elsewhere}/scope`).send(asked)
      expect(scope.body).toMatchObject({ code: 'no-such-collection' })
    }
    await unseen()

    await investigator.post(`${base}/${id}/publish`).expect(403)
    const published = await lead.post(`${base}/${id}/publish`).expect(200)
    expect(published.body.publishedAt).not.toBeNull()
    expect((await listed(stranger, elsewhere)).find((one) => one.id === id)).toMatchObject({
      own: false,
      campaignName: 'Test hunt',
      polytopes: 1,
    })
    expect(await rows(stranger, `collection=${id}`)).toMatchObject([{ key, name: 'seven weights', h11: 24 }])
    expect(await rows(stranger, `campaign=${elsewhere}&text=seven`)).toMatchObject([{ key }])
    await stranger.get(`/api/polytopes/${key}`).expect(200)
    const scope = await stranger.post(`/api/campaigns/${elsewhere}/scope`).send(asked).expect(200)
    expect(scope.body).toMatchObject({ count: 1 })

    // Published, it is read-only: for other campaigns altogether, for its own but for the lead.
    await stranger.delete(`/api/campaigns/${elsewhere}/collections/${id}`).expect(404)
    await stranger
      .post(`/api/campaigns/${elsewhere}/collections/${id}/add`)
      .send({ scope: asked })
      .expect(404)
    await investigator.patch(`${base}/${id}`).send({ name: 'mine' }).expect(403)
    await lead.patch(`${base}/${id}`).send({ description: 'for everybody' }).expect(200)

    // Passing it on publishes nobody else's import.
    const copy = await stranger
      .post(`/api/campaigns/${elsewhere}/collections`)
      .send({ name: 'a copy', scope: asked })
      .expect(201)
    await stranger.post(`/api/campaigns/${elsewhere}/collections/${copy.body.id}/publish`).expect(200)

    await lead.post(`${base}/${id}/withdraw`).expect(200)
    await unseen()
    expect(await rows(reader, `collection=${copy.body.id}`)).toMatchObject([{ key }])
  })

  it('end with the role: who leaves a campaign sees its collections no more', async () => {
    const { id } = await make({ name: 'for members' })
    await server.context.writes.transaction((manager) =>
      manager.insert(Membership, {
        campaignId: server.campaignId,
        accountId: server.accounts.stranger,
        role: 'reader',
      }),
    )
    expect((await listed(stranger)).some((one) => one.id === id && one.own)).toBe(true)
    await server.context.writes.transaction((manager) =>
      manager.delete(Membership, { campaignId: server.campaignId, accountId: server.accounts.stranger }),
    )
    expect((await listed(stranger)).some((one) => one.id === id)).toBe(false)
    await stranger.get(`/api/collections?campaign=${server.campaignId}`).expect(404)
  })
})
