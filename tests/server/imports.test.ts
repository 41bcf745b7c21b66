import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { dualPolytope, polytopeFromWeights, type Polytope } from '../../scoring/index.ts'
import type { ImportReport, PolytopeRow } from '../../shared/polytopes.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let investigator: Agent

beforeAll(async () => {
  server = await openTestServer()
  investigator = await server.signIn('investigator')
  await loadEntries(
    server,
    bundledEntries('small', (id) => id.startsWith('r1-')),
  )
})
afterAll(() => server.close())

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
const matrix = (vertices: readonly (readonly number[])[]) => vertices.map((row) => row.join(' ')).join('\n')

const quintic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -1'
/** Weights 1, 1, 2, 2, 2: h = (2, 86) (Candelas, de la Ossa, Font, Katz, Morrison 1993). */
const octic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-2 -2 -2 -1'

const paste = async (text: string, name?: string): Promise<ImportReport> => {
  const { body } = await investigator.post(path('/polytopes')).send({ text, name }).expect(201)
  return body as ImportReport
}

describe('pasted points', () => {
  it('become a polytope of the campaign, which strangers do not see', async () => {
    const { imported, problems } = await paste(octic, 'octic')
    expect(problems).toEqual([])
    expect(imported).toEqual([
      expect.objectContaining({ name: 'octic', h11: 2, h21: 86, known: false, line: 1 }),
    ])
    const [{ key }] = imported
    const reader = await server.signIn('reader')
    const stranger = await server.signIn('stranger')
    expect((await reader.get(`/api/polytopes/${key}`).expect(200)).body).toMatchObject({ origin: 'imported' })
    await stranger.get(`/api/polytopes/${key}`).expect(404)
    const listed = async (agent: Agent, query: string) => {
      const { body } = await agent.get(`/api/polytopes?${query}`).expect(200)
      return (body.rows as PolytopeRow[]).map((row) => row.key)
    }
    expect(await listed(reader, '')).toContain(key)
    expect(await listed(reader, `campaign=${server.campaignId}&text=octic`)).toEqual([key])
    expect(await listed(stranger, '')).not.toContain(key)
    await stranger.get(`/api/polytopes?campaign=${server.campaignId}`).expect(404)
  })

  it('are recognised in other coordinates, when imported and when bundled', async () => {
    // The octic, sheared; and the quintic, which is bundled.
    const sheared = '1 0 0 0\n3 1 0 0\n0 0 1 0\n0 0 0 1\n-8 -2 -2 -1'
    const again = await paste(`${sheared}\n\n${quintic}`)
    expect(again.imported.map(({ known, line }) => [known, line])).toEqual([
      [true, 1],
      [true, 7],
    ])
    expect(again.imported[0].name).toBe('octic')
  })

  it('may hold wrong blocks between good ones: each is reported with its line', async () => {
    const { imported, problems } = await paste(
      [octic, '', '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -3', '', quintic, '', '1 2 x 4'].join('\n'),
    )
    expect(imported).toHaveLength(2)
    expect(problems.map(({ line, code }) => [line, code])).toEqual([
      [7, 'polytope.facet-distance'],
      [19, 'blocks.not-integers'],
    ])
    expect(problems[0].message).toMatch(/facet/i)
  })

  it.each([
    ['1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1', 'polytope.too-few-points'],
    ['1 0 0 0\n0 1 0 0\n0 0 1 0\n-1 -1 -1 0\n1 1 1 0', 'polytope.not-four-dimensional'],
    ['1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n1 1 1 1', 'polytope.origin-not-interior'],
    ['1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -3', 'polytope.facet-distance'],
    ['1 0 0\n0 1 0\n0 0 1', 'blocks.wrong-shape'],
  ])('%j are refused with a code of their own', async (text, code) => {
    const { imported, problems } = await paste(text)
    expect(imported).toEqual([])
    expect(problems.map((problem) => problem.code)).toEqual([code])
  })

  it('must be there', async () => {
    const { status, body } = await investigator.post(path('/polytopes')).send({ text: '   \n' })
    expect(status).toBe(422)
    expect(body.code).toBe('no-points')
  })

  it('are limited to 2 MB', async () => {
    const { status, body } = await investigator
      .post(path('/polytopes'))
      .send({ text: '1 '.repeat(1_000_001) })
    expect(status).toBe(422)
    expect(body).toMatchObject({ path: 'text' })
    expect(body.detail).toMatch(/2000000/)
  })
})

describe('an uploaded file', () => {
  it('with 500 good and 3 bad blocks imports 500 and lists the 3 with their lines', async () => {
    const good = bundledEntries('small', (id) => id.startsWith('r4-'))
      .slice(0, 500)
      .map((entry) => matrix(entry.vertices))
    const bad = ['1 0 0 0\n0 1 0 0', '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -3', '1 2 three 4']
    const blocks = [
      ...good.slice(0, 100),
      bad[0],
      ...good.slice(100, 300),
      bad[1],
      ...good.slice(300),
      bad[2],
    ]
    const text = blocks.join('\n\n')
    const lineOf = (block: string) => text.slice(0, text.indexOf(block)).split('\n').length
    const { body } = await investigator
      .post(path('/polytopes/upload'))
      .attach('file', Buffer.from(text), 'points.txt')
      .expect(201)
    const report = body as ImportReport
    expect(report.imported).toHaveLength(500)
    expect(report.problems.map(({ line }) => line)).toEqual([
      lineOf(`${bad[0]}\n\n`),
      lineOf(bad[1]),
      lineOf(bad[2]),
    ])
    const { body: page } = await investigator
      .get(`/api/polytopes?campaign=${server.campaignId}&origin=imported`)
      .expect(200)
    expect(page.total).toBe(501)
  })

  it('is needed, in its field', async () => {
    const none = await investigator.post(path('/polytopes/upload')).field('note', 'nothing')
    expect([none.status, none.body.code]).toEqual([422, 'no-file'])
    const elsewhere = await investigator
      .post(path('/polytopes/upload'))
      .attach('document', Buffer.from(quintic), 'a')
    expect([elsewhere.status, elsewhere.body.code]).toEqual([422, 'invalid-upload'])
  })

  it('must be text, of at most 20 MB', async () => {
    const binary = await investigator
      .post(path('/polytopes/upload'))
      .attach('file', Buffer.from([0xff, 0xfe, 0x00, 0xd8]), 'a.bin')
    expect([binary.status, binary.body.code]).toEqual([422, 'not-text'])
    const large = await investigator
      .post(path('/polytopes/upload'))
      .attach('file', Buffer.alloc(20_000_001, 32), 'large.txt')
    expect([large.status, large.body.code]).toEqual([413, 'too-large'])
    expect(large.body.detail).toMatch(/20 MB/)
  })
})

describe('weights', () => {
  const add = (weights: number[], side: string) =>
    investigator.post(path('/polytopes/weights')).send({ weights, side })

  it('give the polytope of either side', async () => {
    // h = (11, 491) and its mirror (Kreuzer, Skarke).
    const fan = (await add([1, 1, 12, 28, 42], 'fan').expect(201)).body as ImportReport
    expect(fan.imported[0]).toMatchObject({ h11: 11, h21: 491, line: null })
    const newton = (await add([1, 1, 12, 28, 42], 'newton').expect(201)).body as ImportReport
    expect(newton.imported[0]).toMatchObject({ h11: 491, h21: 11 })
    const { body } = await investigator.get(`/api/polytopes/${newton.imported[0].key}`).expect(200)
    expect(body).toMatchObject({
      points: 495,
      latticePoints: 680,
      weights: [1, 1, 12, 28, 42],
      side: 'newton',
    })
    expect(body.mirrorKey).toBe(fan.imported[0].key)
  })

  it('of a mirror pair are recognised on both sides when their points are pasted in other coordinates', async () => {
    const given = [1, 1, 2, 2, 6]
    // h = (2, 128) (Candelas, de la Ossa, Font, Katz, Morrison 1993) and (128, 2).
    for (const side of ['fan', 'newton'] as const) {
      await investigator.post(path('/polytopes/weights')).send({ weights: given, side }).expect(201)
    }
    const fan = polytopeFromWeights(given, 'fan')
    const mirror = dualPolytope(fan)
    const sheared = ({ points, vertexCount }: Polytope) =>
      Array.from({ length: vertexCount }, (_, v) => {
        const [x, y, z, w] = points.subarray(4 * v, 4 * v + 4)
        return [x + 2 * y, y - 3 * w, x + 2 * y + z, w]
      }).reverse()
    const { imported } = await paste(`${matrix(sheared(fan))}\n\n${matrix(sheared(mirror))}`)
    expect(imported.map(({ h11, h21, known, name }) => [h11, h21, known, name])).toEqual([
      [2, 128, true, '1 1 2 2 6 fan'],
      [128, 2, true, '1 1 2 2 6 newton'],
    ])
    const { body } = await investigator.get(`/api/polytopes/${imported[0].key}`).expect(200)
    expect(body.mirrorKey).toBe(imported[1].key)
  })

  it('that give none are refused with the reason', async () => {
    const { status, body } = await add([1, 1, 1, 1, 100], 'fan')
    expect(status).toBe(422)
    expect(body.code).toMatch(/^weights\./)
  })
})

describe('a scope', () => {
  const summarise = (scope: object) => investigator.post(path('/scope')).send(scope)

  it('says how many polytopes it holds, and how large they are', async () => {
    const { body } = await summarise({ kind: 'filter', filter: { h11Max: 1 } }).expect(200)
    expect(body).toMatchObject({ count: 5, h11Min: 1, h11Max: 1 })
    const none = await summarise({ kind: 'filter', filter: { h11Min: 999 } }).expect(200)
    expect(none.body).toEqual({ count: 0, h11Min: null, h11Max: null, pointsMax: null })
  })
})
