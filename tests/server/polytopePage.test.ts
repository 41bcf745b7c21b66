import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { CandidateRecord } from '../../server/entities/candidate.ts'
import { ImportedCandidate } from '../../server/entities/importedCandidate.ts'
import { createCampaign } from '../../server/services/campaigns.ts'
import type { PolytopeRow } from '../../shared/polytopes.ts'
import type { FoundPolytopes, PolytopeClasses, PolytopeStructure } from '../../shared/polytopeStructure.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { listening, OpenStream, type Listening } from './support/listening.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let http: Listening
let stream: OpenStream
let reader: Agent
let stranger: Agent
let elsewhere: string
let rows: PolytopeRow[]

beforeAll(async () => {
  server = await openTestServer()
  await loadEntries(
    server,
    bundledEntries('small', (id) => /^r[12]-/.test(id)),
  )
  reader = await server.signIn('reader')
  stranger = await server.signIn('stranger')
  const other = await createCampaign(server.context, server.accounts.stranger, {
    name: 'Another hunt',
    description: '',
  })
  elsewhere = other.id
  rows = (await reader.get('/api/polytopes?limit=500').expect(200)).body.rows as PolytopeRow[]
  http = await listening(server)
  const cookie = await http.cookie('reader')
  stream = await OpenStream.open(`${http.url}/api/events?campaign=${server.campaignId}`, cookie)
})
afterAll(async () => {
  stream.close()
  await http.close()
  await server.close()
})

const at = (h11: number, h21: number): PolytopeRow => {
  const found = rows.find((row) => row.h11 === h11 && row.h21 === h21)
  if (!found) throw new Error(`no polytope at (${h11}, ${h21})`)
  return found
}
const structureOf = async ({ key }: PolytopeRow): Promise<PolytopeStructure> =>
  (await reader.get(`/api/polytopes/${key}/structure`).expect(200)).body as PolytopeStructure
const classesOf = async (agent: Agent, key: string): Promise<PolytopeClasses> =>
  (await agent.get(`/api/polytopes/${key}/classes`).expect(200)).body as PolytopeClasses

it('the spectra of unselected candidates of a polytope are quantiles per rank, the same each time', async () => {
  const { key, points } = at(2, 86)
  const { body } = await reader.get(`/api/polytopes/${key}/null-spectra`).expect(200)
  expect(body).toMatchObject({ key, from: 1 })
  expect(body.size).toBeGreaterThan(0)
  const quantiles = body.quantiles as number[][]
  expect(quantiles).toHaveLength(points - 4)
  for (const [rank, row] of quantiles.entries()) {
    expect([...row].sort((a, b) => a - b)).toEqual(row)
    expect(row[2]).toBeGreaterThanOrEqual(quantiles[rank - 1]?.[2] ?? 0)
  }
  await reader.get('/api/polytopes/0123456789abcdef0123456789abcdef/null-spectra').expect(404)
})

describe('the structure of a polytope', () => {
  it('has the divisors of the quintic: five copies of H, with h2(O) = 4', async () => {
    const { divisors, planar, solid } = await structureOf(at(1, 101))
    // H = O(1) on the quintic: h0(2H) - ... : p_g = h0(K_H) = h0(O(1)) - 1 = 4, q = 0.
    expect(divisors).toEqual(
      Array.from({ length: 5 }, () => ({ chi: 5, h1: 0, h2: 4, components: 1, rigid: false })),
    )
    expect([planar, solid]).toEqual([[], []])
  })

  it('has the genus-one fibre of weights (1,1,1,6,9): the polygon of weights (1,2,3), over nothing three-dimensional', async () => {
    const row = at(2, 272)
    const { planar, solid } = await structureOf(row)
    // Candelas, Font, Katz, Morrison 1994: elliptic over the projective plane; no K3 fibration, as P2 has no pencil.
    expect([row.planarSections, row.solidSections, row.nestedSections]).toEqual([1, 0, 0])
    expect(planar.map(({ type }) => type)).toEqual([10])
    expect(solid).toEqual([])
  })

  it('draws each section as a reflexive polygon whose neighbours are bases', async () => {
    let drawn = 0
    for (const row of rows.filter(({ planarSections }) => (planarSections ?? 0) > 0)) {
      const { planar, solid } = await structureOf(row)
      expect(planar).toHaveLength(row.planarSections ?? 0)
      expect(solid).toHaveLength(row.solidSections ?? 0)
      expect(solid.reduce((sum, { nested }) => sum + nested.length, 0)).toBe(row.nestedSections)
      for (const { outline } of planar) {
        drawn += 1
        for (const [i, [ax, ay]] of outline.entries()) {
          const [bx, by] = outline[(i + 1) % outline.length]
          expect(ax * by - ay * bx).toBe(1)
        }
      }
    }
    expect(drawn).toBeGreaterThan(10)
  })
})

describe('the classes of a polytope', () => {
  it('are counted exactly: 39 over all polytopes with h11 = 2, 36 modulo symmetry', async () => {
    let classes = 0
    let orbits = 0
    for (const { key } of rows.filter(({ h11 }) => h11 === 2)) {
      const path = `/api/campaigns/${server.campaignId}/polytopes/${key}/count`
      const begun = (await reader.post(path).expect(202)).body as PolytopeClasses
      // Where the bound leaves but one class, nothing is left to count.
      if (begun.counting === null) expect(begun).toMatchObject({ classBound: 0, classes: 1, classOrbits: 1 })
      else await stream.event((event) => event.kind === 'class-count' && event.key === key && event.ended)
      const counted = await classesOf(reader, key)
      expect(counted.counting).toBeNull()
      expect(counted.classes).toBeLessThanOrEqual(10 ** (counted.classBound ?? NaN) * (1 + 1e-9))
      expect(counted.classDigits).toBe(String(counted.classes))
      classes += counted.classes ?? NaN
      orbits += counted.classOrbits ?? NaN
    }
    // 39: arXiv:1411.1418 (from memory, recounted by exhaustion). 36 up to automorphisms: counted twice by us.
    expect([classes, orbits]).toEqual([39, 36])
    // The counts stand in the library from now on, for everybody.
    const { body } = await stranger.get('/api/polytopes?classesMin=1&h11Min=2&limit=500').expect(200)
    expect(body.total).toBe(36)
  })

  it('are known to those whose campaigns met them, and to nobody else', async () => {
    const { key } = at(2, 272)
    const candidateKey = 'c'.repeat(32)
    await server.context.writes.transaction(async (manager) => {
      await manager.insert(CandidateRecord, { key: candidateKey, polytopeKey: key, heights: [1] })
      await manager.insert(ImportedCandidate, {
        campaignId: server.campaignId,
        candidateKey,
        name: 'one',
        source: 'a text',
        line: 1,
        authorId: server.accounts.lead,
        createdAt: new Date().toISOString(),
      })
    })
    expect(await classesOf(reader, key)).toMatchObject({
      total: 1,
      known: [{ key: candidateKey, searches: 0, shortlists: 0, imports: 1, verdicts: 0 }],
    })
    expect(await classesOf(stranger, key)).toMatchObject({ total: 0, known: [] })
    const inside = await stranger.get(`/api/polytopes/${key}/classes?campaign=${elsewhere}`).expect(200)
    expect(inside.body).toMatchObject({ total: 0, known: [] })
    await stranger.get(`/api/polytopes/${key}/classes?campaign=${server.campaignId}`).expect(404)
  })
})

describe('looking a polytope up', () => {
  const find = async (text: string, agent = reader, query = ''): Promise<FoundPolytopes> =>
    (await agent.post(`/api/polytopes/find${query}`).send({ text }).expect(200)).body as FoundPolytopes

  it('recognises it in any coordinates', async () => {
    const { key, name } = at(2, 272)
    const detail = await reader.get(`/api/polytopes/${key}`).expect(200)
    const { pointCoordinates, vertices } = detail.body as { pointCoordinates: number[][]; vertices: number }
    const sheared = pointCoordinates
      .slice(0, vertices)
      .map(([x, y, z, w]) => [x + 2 * y - 3 * z, y + z, z, w - 5 * x - 10 * y + 15 * z].join(' '))
    const { found, problems } = await find(sheared.reverse().join('\n'))
    expect(problems).toEqual([])
    expect(found).toEqual([{ line: 1, side: null, key, h11: 2, h21: 272, name }])
  })

  it('recognises weights, either side, in any order', async () => {
    const { found } = await find('9 1 6 1 1')
    expect(found).toMatchObject([
      { side: 'fan', h11: 2, h21: 272, key: at(2, 272).key, name: at(2, 272).name },
      // Its mirror is not in the sample.
      { side: 'newton', h11: 272, h21: 2, name: null },
    ])
    const refused = await find('1 1 1 1 7')
    expect(refused.found).toEqual([])
    expect(refused.problems).toHaveLength(1)
  })

  it('says what is wrong with the points, by line, and refuses what is no matrix', async () => {
    const two =
      '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -1\n\n1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n1 1 1 1\n'
    const { found, problems } = await find(two)
    expect(found).toMatchObject([{ line: 1, key: at(1, 101).key }])
    expect(problems).toMatchObject([{ line: 7, code: 'polytope.origin-not-interior' }])
    const nothing = await reader.post('/api/polytopes/find').send({ text: '   ' })
    expect(nothing.body).toMatchObject({ code: 'no-points' })
  })

  it('does not tell what another campaign has imported', async () => {
    const lead = await server.signIn('lead')
    const body = { weights: [1, 1, 1, 6, 9], side: 'newton', name: 'the mirror' }
    await lead.post(`/api/campaigns/${server.campaignId}/polytopes/weights`).send(body).expect(201)
    expect((await find('1 1 1 6 9')).found[1]).toMatchObject({ side: 'newton', name: 'the mirror' })
    expect((await find('1 1 1 6 9', stranger)).found[1]).toMatchObject({ side: 'newton', name: null })
    expect((await find('1 1 1 6 9', stranger, `?campaign=${elsewhere}`)).found[1].name).toBeNull()
  })
})
