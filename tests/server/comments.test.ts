import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { CandidateRecord } from '../../server/entities/candidate.ts'
import { Comment } from '../../server/entities/comment.ts'
import { Comments1796500000000 } from '../../server/migrations/1796500000000-comments.ts'
import type { StreamEvent } from '../../shared/events.ts'
import type { CommentView, MentionView } from '../../shared/comments.ts'
import type { Role } from '../../shared/roles.ts'
import { storedCandidate } from '../client/candidateFixture.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'
import { schemaBefore } from './support/schemaBefore.ts'

let server: TestServer
const agents = {} as Record<Role | 'stranger', Agent>
let base: string
let key: string

beforeAll(async () => {
  server = await openTestServer()
  const weights = [1, 1, 2, 2, 2]
  const stored = storedCandidate(weights, 1, 'fan')
  key = stored.key
  await loadEntries(
    server,
    bundledEntries('small', (id) => id.startsWith('r2-')),
  )
  const { source, writes } = server.context
  const polytopes = await source.manager.query<{ key: string; coordinates: string }[]>(
    'SELECT "key", coordinates FROM polytope',
  )
  const polytope = polytopes.find(({ coordinates }) => coordinates === JSON.stringify(stored.vertices))
  await writes.transaction((manager) =>
    manager.insert(CandidateRecord, { key, polytopeKey: polytope?.key ?? '', heights: stored.heights }),
  )
  base = `/api/campaigns/${server.campaignId}`
  for (const name of ['lead', 'investigator', 'reviewer', 'reader', 'stranger'] as const)
    agents[name] = await server.signIn(name)
})
afterAll(() => server.close())

const write = (who: Agent, text: string, mentions: string[] = []) =>
  who.post(`${base}/candidates/${key}/comments`).send({ text, mentions })
const list = async (who: Agent) =>
  (await who.get(`${base}/candidates/${key}/comments`).expect(200)).body as CommentView[]
const waiting = async (who: Agent) => (await who.get(`${base}/mentions`).expect(200)).body as MentionView[]

describe('comments on a candidate', () => {
  it('are plain text, written from reviewer up and read by members, with an event for each', async () => {
    const events: StreamEvent[] = []
    const { streams } = server.context
    const before = streams.toCampaign.bind(streams)
    streams.toCampaign = (campaign, event) => {
      events.push(event)
      before(campaign, event)
    }
    const text = '<b>not bold</b> & κ = −2'
    const { body } = await write(agents.reviewer, `  ${text}\n`).expect(201)
    streams.toCampaign = before
    expect(body).toMatchObject({ author: 'Reviewer', text, mentions: [], editedAt: null, removed: null })
    expect(events).toEqual([{ kind: 'comment', candidateKey: key }])
    expect(await list(agents.reader)).toEqual([body])
    await write(agents.reader, 'no').expect(403)
    await write(agents.stranger, 'no').expect(404)
    await write(agents.lead, '   ').expect(422)
    await agents.lead
      .post(`${base}/candidates/${'0'.repeat(32)}/comments`)
      .send({ text: 'x' })
      .expect(404)
  })

  it('mention the members they name, who see it until they say so', async () => {
    const { reader, stranger, lead } = server.accounts
    const { body } = await write(agents.lead, 'Look here, @Reader, and @Stranger', [
      reader,
      stranger,
      lead,
    ]).expect(201)
    expect(body.mentions).toEqual([{ accountId: reader, name: 'Reader' }])
    expect(await waiting(agents.reader)).toMatchObject([
      { commentId: body.id, candidateKey: key, author: 'Lead', text: 'Look here, @Reader, and @Stranger' },
    ])
    expect(await waiting(agents.lead)).toEqual([])
    await agents.reader.post(`${base}/mentions/${body.id}/seen`).expect(204)
    expect(await waiting(agents.reader)).toEqual([])
    // An edit that still names them does not call again; one that names another does.
    const edit = (text: string, mentions: string[]) =>
      agents.lead.patch(`${base}/comments/${body.id}`).send({ text, mentions })
    await edit('Look once more, @Reader', [reader]).expect(200)
    expect(await waiting(agents.reader)).toEqual([])
    const changed = await edit('Rather @Reviewer', [reader, server.accounts.reviewer]).expect(200)
    expect(changed.body.mentions).toMatchObject([{ name: 'Reviewer' }])
    expect(changed.body.editedAt).not.toBeNull()
    expect(await waiting(agents.reviewer)).toHaveLength(1)
  })

  it('are changed by their author only, and removed by the author or a lead with a line left', async () => {
    const { body } = await write(agents.investigator, 'Secret, @Reviewer', [server.accounts.reviewer]).expect(
      201,
    )
    const path = `${base}/comments/${body.id}`
    const refused = await agents.lead.patch(path).send({ text: 'other' }).expect(403)
    expect(refused.body.detail).toContain('author')
    await agents.reviewer.delete(path).expect(403)
    await agents.stranger.delete(path).expect(404)
    const before = (await waiting(agents.reviewer)).length
    await agents.lead.delete(path).expect(204)
    await agents.lead.delete(path).expect(204)
    expect((await list(agents.reader)).at(-1)).toMatchObject({
      text: '',
      mentions: [],
      removed: { by: 'Lead' },
    })
    expect(await waiting(agents.reviewer)).toHaveLength(before - 1)
    const kept = await server.context.source.manager.findOneByOrFail(Comment, { id: body.id })
    expect(kept.text).toBe('')
    await agents.investigator.patch(path).send({ text: 'again' }).expect(409)
    await agents.lead.delete(`${base}/comments/nothing`).expect(404)
  })
})

it('the migration adds its tables and takes them away, the rest untouched', async () => {
  const source = await schemaBefore(Comments1796500000000)
  const runner = source.createQueryRunner()
  const insert = (statement: string) => source.query(statement)
  await insert(
    `INSERT INTO account (id, email, name, demo, createdAt) VALUES ('a', 'a@tests.example', 'A', 0, '')`,
  )
  await insert(`INSERT INTO campaign (id, name, description, createdAt) VALUES ('c', 'C', '', '')`)
  await insert(`INSERT INTO polytope ("key", name, origin, h11, h21, points, vertices, facets, latticePoints,
    dualLatticePoints, favourable, symmetryOrder, coordinates)
    VALUES ('p', 'P', 'bundled', 1, 101, 5, 5, 5, 6, 126, 1, 120, '[]')`)
  await insert(`INSERT INTO candidate ("key", polytopeKey, heights) VALUES ('k', 'p', '[0,0,0,0,0]')`)
  const step = new Comments1796500000000()
  for (let round = 0; round < 2; round += 1) {
    await step.up(runner)
    await insert(
      `INSERT INTO comment (campaignId, candidateKey, authorId, text, createdAt) VALUES ('c', 'k', 'a', 'x', '')`,
    )
    await insert(`INSERT INTO mention (commentId, accountId) VALUES (1, 'a')`)
    await step.down(runner)
  }
  expect(await source.query('SELECT "key" FROM candidate')).toEqual([{ key: 'k' }])
  expect(await source.query(`SELECT name FROM sqlite_master WHERE name IN ('comment', 'mention')`)).toEqual(
    [],
  )
  await source.destroy()
})
