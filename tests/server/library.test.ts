import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { IsNull } from 'typeorm'
import { LibraryFile } from '../../server/entities/libraryFile.ts'
import { PolytopeRecord } from '../../server/entities/polytope.ts'
import { OBSERVABLES } from '../../scoring/observables/registry.ts'
import { polytopeNumberNames } from '../../shared/polytopeNumbers.ts'
import type { PolytopeRow } from '../../shared/polytopes.ts'
import { bundledEntries, bundledFile, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let reader: Agent

beforeAll(async () => {
  server = await openTestServer()
  reader = await server.signIn('reader')
  await loadEntries(
    server,
    bundledEntries('small', (id) => /^r[12]-/.test(id)),
  )
  await loadEntries(
    server,
    bundledEntries('large', (id) => /^w(1|101)-|^w11-491/.test(id)),
    'large.json',
  )
})
afterAll(() => server.close())

const rows = async (query: string): Promise<PolytopeRow[]> => {
  const { body } = await reader.get(`/api/polytopes?${query}`).expect(200)
  return body.rows as PolytopeRow[]
}

describe('the bundled library', () => {
  it('holds each polytope once, whatever the number of files that name it', async () => {
    const { body } = await reader.get('/api/polytopes?limit=500').expect(200)
    // 5 + 36 with h11 = 1, 2 (Kreuzer, Skarke), (101, 1), and (11, 491) of weights 1, 1, 12, 28, 42.
    expect(body.total).toBe(43)
    const quintic = (body.rows as PolytopeRow[]).filter(({ h11, h21 }) => h11 === 1 && h21 === 101)
    expect(quintic.filter(({ weights }) => weights?.join() === '1,1,1,1,1')).toHaveLength(1)
  })

  it('is filtered and sorted', async () => {
    expect((await rows('h11Min=2&h11Max=2')).every(({ h11 }) => h11 === 2)).toBe(true)
    expect(await rows('h11Min=2&h11Max=2&limit=500')).toHaveLength(36)
    // All 5 + 36 with h11 = 1, 2 are favourable (arXiv:1411.1418).
    expect(await rows('favourable=yes&h11Max=2')).toHaveLength(41)
    expect(await rows('favourable=no&h11Max=2')).toEqual([])
    const falling = (await rows('sort=h21&order=desc&limit=3')).map(({ h21 }) => h21)
    expect(falling).toEqual([...falling].sort((a, b) => b - a))
    expect(falling[0]).toBe(491)
    expect((await rows('text=w11-491')).map(({ h21 }) => h21)).toEqual([491])
    expect(await rows('text=%25')).toEqual([])
    expect((await rows('offset=40&limit=100')).length).toBe(3)
  })

  it('is filtered and sorted by every number, what is not known at the end', async () => {
    // The quintic's polytope is a simplex, and its five divisors have h2(O) = 4: none is rigid.
    const [quintic] = await rows('eulerMin=-200&eulerMax=-200&facetsMax=5&dualLatticePointsMin=126')
    const simplex = {
      edges: 10,
      faces: 10,
      edgePoints: 0,
      facePoints: 0,
      facetPoints: 0,
      rigidDivisors: 0,
      splitDivisors: 0,
    }
    expect(quintic).toMatchObject({ h11: 1, h21: 101, euler: -200, ...simplex })
    for (const row of await rows('edgesMin=11&limit=500')) expect(row.edges).toBeGreaterThanOrEqual(11)
    // Euler's relation of a four-dimensional polytope: f0 - f1 + f2 - f3 = 0.
    for (const row of await rows('limit=500'))
      expect(row.vertices - (row.edges ?? 0) + (row.faces ?? 0) - row.facets).toBe(0)
    for (const name of polytopeNumberNames) {
      for (const order of ['asc', 'desc'] as const) {
        const values = (await rows(`sort=${name}&order=${order}&limit=500`)).map((row) => row[name])
        const known = values.filter((value) => value !== null)
        expect(values.slice(0, known.length), `${name} ${order}`).toEqual(known)
        const sign = order === 'asc' ? 1 : -1
        expect(known, `${name} ${order}`).toEqual([...known].sort((a, b) => sign * (a - b)))
      }
      const lows = await rows(`${name}Min=3&limit=500`)
      expect(
        lows.every((row) => (row[name] ?? 0) >= 3),
        name,
      ).toBe(true)
    }
  })

  it('has a column or a question for every observable of the polytope', () => {
    // The one place where the rule language and the library use different words for the same number.
    const alias: Record<string, string> = { symmetry: 'symmetryOrder' }
    const known = new Set<string>([...polytopeNumberNames, 'favourable', 'rigidBasis'])
    const ofPolytopes = OBSERVABLES.filter(({ kind, stage }) => kind === 'scalar' && stage === 'polytope')
    const names = ofPolytopes.map(({ name }) => name.replace(/^polytope\./, ''))
    expect(names.length).toBeGreaterThan(20)
    expect(names.filter((name) => !known.has(alias[name] ?? name))).toEqual([])
  })

  it('is filtered by the type of a fibre and by whether rigid divisors span', async () => {
    // Weights (1,1,1,6,9): fibre of weights (1,2,3), F10. Its rigid divisor is the section alone.
    const withF10 = await rows('fibre=10&h11Max=2&limit=500')
    expect(withF10.some(({ h11, h21 }) => h11 === 2 && h21 === 272)).toBe(true)
    expect(withF10.every(({ planarSections }) => (planarSections ?? 0) > 0)).toBe(true)
    expect(withF10.length).toBeLessThan((await rows('planarSectionsMin=1&h11Max=2&limit=500')).length)
    const [elliptic] = withF10.filter(({ h21 }) => h21 === 272)
    expect(elliptic).toMatchObject({ rigidDivisors: 1, rigidRank: 1, rigidComponents: 0 })
    const spanned = await rows('rigidBasis=yes&limit=500')
    expect(spanned.length).toBeGreaterThan(0)
    expect(spanned.every(({ rigidRank, h11 }) => rigidRank === h11)).toBe(true)
    expect(await rows('rigidBasis=no&limit=500')).toHaveLength(
      (await rows('limit=500')).length - spanned.length,
    )
    expect((await reader.get('/api/polytopes?fibre=17')).status).toBe(422)
  })

  it('is searched by name, by the beginning of a key, and by weights in any order', async () => {
    const [quintic] = await rows('text=1, 1 1 1 1')
    expect(quintic).toMatchObject({ h11: 1, h21: 101, weights: [1, 1, 1, 1, 1] })
    expect(await rows('text=2 2 2 2 2')).toMatchObject([{ h11: 1 }, { h11: 101 }])
    expect(await rows('text=1 1 1 1 77')).toEqual([])
    expect(await rows('text=42 28 12 1 1')).toMatchObject([{ h11: 11, h21: 491 }])
    expect(await rows(`text=${quintic.key.slice(0, 10).toUpperCase()}`)).toMatchObject([{ key: quintic.key }])
    expect(await rows(`text=${quintic.key.slice(5, 15)}`)).toEqual([])
  })

  it('computes the numbers of polytopes stored before they were known', async () => {
    const { library, source, writes } = server.context
    const before = await rows('limit=500')
    await writes.transaction((manager) =>
      manager.update(PolytopeRecord, { h11: 2 }, { summaryVersion: null, edges: null, rigidDivisors: null }),
    )
    expect(await rows('edgesMin=1&limit=500')).toHaveLength(before.length - 36)
    await library.describe()
    expect(library.undescribed).toBe(0)
    expect(await rows('limit=500')).toEqual(before)
    expect(await source.manager.countBy(PolytopeRecord, { summaryVersion: IsNull() })).toBe(0)
  })

  it('refuses a query that makes no sense, naming the field', async () => {
    const { status, body } = await reader.get('/api/polytopes?h11Min=many')
    expect(status).toBe(422)
    expect(body).toMatchObject({ code: 'invalid-request', path: 'h11Min' })
  })

  it('is counted by Hodge numbers', async () => {
    const { body } = await reader.get('/api/polytopes/hodge').expect(200)
    expect(body.total).toBe(43)
    expect(body.loading).toBeNull()
    // P^4[5] and its quotient by Z5 stand at (1, 101) and (1, 21) (Candelas, de la Ossa, Green, Parkes 1991).
    expect(body.counts).toContainEqual({ h11: 1, h21: 101, count: 1 })
    expect(body.counts).toContainEqual({ h11: 1, h21: 21, count: 1 })
  })

  it('shows a polytope with its faces and its mirror', async () => {
    const [quintic] = await rows('h11Max=1&h21Min=101&h21Max=101')
    const { body } = await reader.get(`/api/polytopes/${quintic.key}`).expect(200)
    expect(body.pointCoordinates).toHaveLength(5)
    expect(body.facetNormals).toHaveLength(5)
    expect(body.twoFaces).toHaveLength(10)
    const mirror = await reader.get(`/api/polytopes/${body.mirrorKey}`).expect(200)
    expect(mirror.body).toMatchObject({ h11: 101, h21: 1, mirrorKey: quintic.key })
    await reader.get('/api/polytopes/00000000000000000000000000000000').expect(404)
  })

  it('goes on where an interrupted start left off, and starts a changed file again', async () => {
    const { library, source } = server.context
    const entries = bundledEntries('small', (id) => /^r3-00/.test(id))
    const place = bundledFile(server, 'later.json', entries)
    const [file] = await library.open([place])
    await server.context.writes.transaction((manager) =>
      manager.insert(LibraryFile, {
        name: file.name,
        digest: file.digest,
        loaded: 90,
        total: entries.length,
      }),
    )
    const before = await source.manager.count(PolytopeRecord)
    await library.load([file])
    expect((await source.manager.count(PolytopeRecord)) - before).toBe(entries.length - 90)
    const [changed] = await library.open([bundledFile(server, 'later.json', entries.slice(0, 95))])
    await library.load([changed])
    expect((await source.manager.count(PolytopeRecord)) - before).toBe(entries.length - 90 + 90)
  })

  it('is not believed: a file that states a wrong Hodge number stops loading', async () => {
    const [entry] = bundledEntries('small', (id) => id === 'r1-0002')
    await expect(loadEntries(server, [{ ...entry, h21: 100 }], 'wrong.json')).rejects.toThrow(
      /r1-0002: h21 is 101, the file says 100/,
    )
  })
})
