import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { caution } from '../../../shared/caution.ts'
import type { CandidateGeometry, ClassPicture } from '../../../shared/candidates.ts'
import type { ShortlistDetail } from '../../../shared/shortlists.ts'
import { openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
beforeAll(async () => {
  hunt = await openSmallHunt()
})
afterAll(() => hunt.close())

describe('a shortlist', () => {
  let shortlist: ShortlistDetail
  let searchId: string

  beforeAll(async () => {
    searchId = (await hunt.finished((await hunt.start({ seed: 21 })).id)).id
    const { body } = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: '=First look', searchIds: [searchId], size: 12 })
      .expect(201)
    shortlist = body as ShortlistDetail
  })

  it('freezes the best of its searches in their order', async () => {
    const search = await hunt.read(searchId)
    expect(shortlist).toMatchObject({ size: 12, undecided: 12, verified: 0, columns: ['volume', 'smallest'] })
    expect(shortlist.rows.map(({ rank }) => rank)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12])
    expect(shortlist.rows.map(({ candidateKey }) => candidateKey)).toEqual(
      search.top.slice(0, 12).map(({ candidateKey }) => candidateKey),
    )
    expect(search.shortlists).toEqual([{ id: shortlist.id, name: '=First look' }])
  })

  it('merges several searches without repeating a candidate', async () => {
    const other = await hunt.finished((await hunt.start({ seed: 22 })).id)
    const { body } = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: 'Both', searchIds: [searchId, other.id], size: 500 })
      .expect(201)
    const keys = (body as ShortlistDetail).rows.map(({ candidateKey }) => candidateKey)
    expect(new Set(keys).size).toBe(keys.length)
    expect(keys.length).toBeGreaterThan(20)
  })

  it('refuses searches that are not there or do not go together', async () => {
    const missing = await hunt.lead.post(hunt.path('/shortlists')).send({ name: 'x', searchIds: ['nothing'] })
    expect([missing.status, missing.body.code]).toEqual([422, 'no-such-search'])
    const target = await hunt.lead
      .post(hunt.path('/targets'))
      .send({ name: 'Other', text: 'score -volume' })
      .expect(201)
    const other = await hunt.finished((await hunt.start({ targetVersionId: target.body.versions[0].id })).id)
    const mixed = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: 'x', searchIds: [searchId, other.id] })
    expect([mixed.status, mixed.body.code]).toEqual([422, 'mixed-targets'])
  })

  it('opens the dossier of its candidates, computed from the stored heights', async () => {
    const { candidateKey, polytopeKey, outcome } = shortlist.rows[0]
    const stranger = await hunt.server.signIn('stranger')
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
    const stranger = await hunt.server.signIn('stranger')
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
    const { headers } = await hunt.lead.get(address).expect(200)
    expect(headers['cache-control']).toBe('private, no-cache')
    await hunt.lead.get(address).set('If-None-Match', headers.etag).expect(304)
    await request(hunt.server.app).get(address).set('If-None-Match', headers.etag).expect(401)
  })

  it('takes verdicts, keeps their history and counts the latest', async () => {
    const reviewer = await hunt.server.signIn('reviewer')
    const { candidateKey } = shortlist.rows[1]
    const place = hunt.path(`/candidates/${candidateKey}`)
    const give = (value: string, reason?: string) =>
      reviewer.post(`${place}/verdicts`).send({ targetVersionId: hunt.targetVersionId, value, reason })
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
    const after = await reviewer.get(hunt.path(`/shortlists/${shortlist.id}`)).expect(200)
    expect(after.body).toMatchObject({ undecided: 11, verified: 0, rejected: 1 })
    expect(after.body.rows[1].verdict).toMatchObject({ value: 'rejected', override: false })
    const campaign = await reviewer.get(hunt.path()).expect(200)
    expect(campaign.body.shortlistList.find(({ id }: { id: string }) => id === shortlist.id).rejected).toBe(1)
    await give('undecided').expect(201)
    const back = await reviewer.get(hunt.path(`/shortlists/${shortlist.id}`)).expect(200)
    expect(back.body).toMatchObject({ undecided: 12, rejected: 0 })
  })

  it('is exported with caution, units, conventions and schema version', async () => {
    const table = await hunt.lead.get(hunt.path(`/shortlists/${shortlist.id}/export.csv`)).expect(200)
    expect(table.headers['content-type']).toMatch(/^text\/csv/)
    expect(table.headers['content-disposition']).toMatch(/shortlist-first-look\.csv/)
    const lines = table.text.trimEnd().split('\r\n')
    const remarks = lines.filter((line) => line.startsWith('#'))
    expect(remarks).toContain(`# ${caution}`)
    expect(remarks.join('\n')).toMatch(/schema tessellary\.shortlist-table\/2/)
    expect(remarks.join('\n')).toMatch(/Units: .*h11: count/)
    expect(remarks.join('\n')).toMatch(/score log10\(metric\.divisor\.top\)/)
    const rows = lines.slice(remarks.length)
    expect(rows[0]).toMatch(/^rank,candidate,polytope,.*,report: volume,report: smallest$/)
    expect(rows).toHaveLength(13)
    expect(rows[1].split(',').slice(0, 2)).toEqual(['1', shortlist.rows[0].candidateKey])
    const document = await hunt.lead.get(hunt.path(`/shortlists/${shortlist.id}/export.json`)).expect(200)
    expect(document.body).toMatchObject({
      schema: 'tessellary.shortlist/2',
      caution,
      units: { h11: 'count' },
    })
    expect(document.body.conventions.join(' ')).toMatch(/Einstein-frame/)
    expect(document.body.shortlist.rows).toHaveLength(12)
  })
})
