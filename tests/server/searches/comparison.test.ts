import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Comparison } from '../../../shared/comparisons.ts'
import { overlap, sharedCandidates } from '../../../server/services/comparisons.ts'
import { openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

describe('what lists of the best have in common', () => {
  const list = fc.uniqueArray(fc.nat(30), { maxLength: 20 }).map((keys) => keys.map(String))
  const ranksOf = (keys: readonly string[]) => new Map(keys.map((key, place) => [key, place + 1]))

  it('is counted among as many of the best', () => {
    fc.assert(
      fc.property(
        fc.array(list, { minLength: 2, maxLength: 4 }),
        fc.integer({ min: 1, max: 25 }),
        (lists, best) => {
          const matrix = overlap(lists.map(ranksOf), best)
          for (const [a, keys] of lists.entries())
            for (const [b, others] of lists.entries()) {
              const tops = [keys, others].map((all) => new Set(all.slice(0, best)))
              expect(matrix[a][b]).toBe([...tops[0]].filter((key) => tops[1].has(key)).length)
            }
        },
      ),
      { numRuns: 40 },
    )
  })

  it('is listed with the rank in every list, by the best rank', () => {
    fc.assert(
      fc.property(fc.array(list, { minLength: 2, maxLength: 4 }), (lists) => {
        const shared = sharedCandidates(lists.map(ranksOf))
        const twice = [...new Set(lists.flat())].filter(
          (key) => lists.filter((all) => all.includes(key)).length > 1,
        )
        expect(shared.map(({ candidateKey }) => candidateKey).sort()).toEqual(twice.sort())
        for (const { candidateKey, ranks } of shared)
          expect(ranks).toEqual(
            lists.map((all) => (all.includes(candidateKey) ? all.indexOf(candidateKey) + 1 : null)),
          )
        const bests = shared.map(({ ranks }) => Math.min(...ranks.map((rank) => rank ?? Infinity)))
        expect(bests).toEqual([...bests].sort((a, b) => a - b))
      }),
      { numRuns: 40 },
    )
  })
})

describe('searches side by side', () => {
  let hunt: SmallHunt
  let ids: string[]
  const compare = (list: readonly string[]) => hunt.lead.get(hunt.path(`/comparisons?with=${list.join(',')}`))

  beforeAll(async () => {
    hunt = await openSmallHunt()
    const begun = [
      await hunt.start({ seed: 41 }),
      await hunt.start({ seed: 41 }),
      await hunt.start({ seed: 42 }),
    ]
    for (const { id } of begun) await hunt.finished(id)
    ids = begun.map(({ id }) => id)
  })
  afterAll(() => hunt.close())

  it('say what they share, in the order asked for', async () => {
    const { body } = await compare([ids[2], ids[0], ids[1]]).expect(200)
    const { searches, sameScoring, sameNull, overlaps, shared, sharedTotal } = body as Comparison
    expect(searches.map(({ id }) => id)).toEqual([ids[2], ids[0], ids[1]])
    expect([sameScoring, sameNull]).toEqual([true, true])
    expect(searches[1].progress.curve).toEqual(searches[2].progress.curve)
    const [ten, fifty] = overlaps
    // Two searches of one seed keep the same 20 candidates at the same ranks.
    expect([ten.best, ten.shared[1][2], ten.shared[0][0]]).toEqual([10, 10, 10])
    expect([fifty.best, fifty.shared[1][2], fifty.shared[0][0]]).toEqual([50, 20, 20])
    expect(ten.shared[0][1]).toBe(ten.shared[1][0])
    expect(sharedTotal).toBe(shared.length)
    expect(shared.length).toBeGreaterThanOrEqual(20)
    expect(shared.slice(0, 5).every(({ ranks }) => ranks[1] === ranks[2])).toBe(true)
    const first = await hunt.read(ids[0])
    const leader = shared.find(({ ranks }) => ranks[1] === 1)
    expect(leader).toMatchObject({ candidateKey: first.top[0].candidateKey, outcome: { score: first.best } })
  })

  it('of different rules share candidates, but no scores', async () => {
    const { body: target } = await hunt.lead
      .post(hunt.path('/targets'))
      .send({ name: 'Otherwise', text: 'score -volume' })
      .expect(201)
    const { id } = await hunt.start({ targetVersionId: target.versions[0].id, seed: 41 })
    await hunt.finished(id)
    const { body } = await compare([ids[0], id]).expect(200)
    expect(body).toMatchObject({ sameScoring: false, sameNull: false })
    for (const { outcome } of (body as Comparison).shared) expect(outcome).toBeNull()
  })

  it('are two to four of the campaign', async () => {
    for (const list of [[], [ids[0]], [ids[0], ids[0]], [...ids, 'a', 'b']]) {
      const { status, body } = await compare(list)
      expect([status, body.code, body.path]).toEqual([422, 'invalid-request', 'with'])
    }
    await compare([ids[0], 'none']).expect(404)
    const stranger = await hunt.server.signIn('stranger')
    const own = await stranger.post('/api/campaigns').send({ name: 'Elsewhere' }).expect(201)
    await stranger.get(`/api/campaigns/${own.body.id}/comparisons?with=${ids[0]},${ids[1]}`).expect(404)
  })
})
