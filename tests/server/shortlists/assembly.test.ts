import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { classFromHeights, normalForm, polytopeFromPoints, trianglesApart } from '../../../scoring/index.ts'
import type { Rescoring } from '../../../shared/rescorings.ts'
import type { ShortlistDetail, ShortlistDraft, ShortlistRow } from '../../../shared/shortlists.ts'
import { CandidateRecord } from '../../../server/entities/candidate.ts'
import { CandidateInvariants } from '../../../server/entities/candidateInvariants.ts'
import { CandidateValue } from '../../../server/entities/candidateValue.ts'
import { huntRule, openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
let searchIds: string[]

beforeAll(async () => {
  hunt = await openSmallHunt()
  const started = [await hunt.start({ seed: 41 }), await hunt.start({ seed: 42 })]
  searchIds = started.map(({ id }) => id)
  for (const id of searchIds) await hunt.finished(id)
})
afterAll(() => hunt.close())

const make = async (settings: object): Promise<ShortlistDetail> => {
  const body = { name: 'A list', searchIds, size: 500, ...settings }
  return (await hunt.lead.post(hunt.path('/shortlists')).send(body).expect(201)).body as ShortlistDetail
}
const draft = async (settings: object): Promise<ShortlistDraft> => {
  const body = { searchIds, size: 500, ...settings }
  return (await hunt.lead.post(hunt.path('/shortlists/draft')).send(body).expect(200)).body as ShortlistDraft
}
const keysOf = (rows: readonly { readonly candidateKey: string }[]) => rows.map((row) => row.candidateKey)
const sum = (counts: object) => Object.values(counts).reduce((a: number, b: number) => a + b, 0)

describe('a list of several searches', () => {
  it('limits candidates of equal invariants once these are known', async () => {
    const before = await draft({ perInvariants: 1 })
    expect(before.counts).toMatchObject({ withoutInvariants: before.distinct, leftOut: { invariants: 0 } })
    expect(before.size).toBe(before.distinct)
    // The draft asked for them.
    await hunt.server.context.jobs.invariants.idle()
    const after = await draft({ perInvariants: 1 })
    expect(after.counts?.withoutInvariants).toBe(0)
    expect(after.size + sum(after.counts!.leftOut)).toBe(after.distinct)
    const { manager } = hunt.server.context.source
    const keys = await manager.find(CandidateInvariants)
    expect(after.size).toBe(new Set(keys.map(({ wallKey }) => wallKey)).size)
  })

  it('says beforehand what it will be, and is frozen with what it was made from', async () => {
    const settings = { size: 12, perPolytope: 5 }
    const expected = await draft(settings)
    const list = await make(settings)
    expect(expected).toMatchObject({ size: list.size, columns: ['volume', 'smallest'] })
    expect(expected.scored).toBe(expected.distinct)
    expect(expected.counts).toEqual(list.provenance?.counts)
    expect(keysOf(expected.best)).toEqual(keysOf(list.rows))
    const { counts, assembly, searches, from } = list.provenance!
    expect(counts.finds).toBe(40)
    expect(list.size + sum(counts.leftOut)).toBe(counts.distinct)
    expect(assembly).toEqual({
      size: 12,
      feasibleOnly: false,
      pareto: null,
      perPolytope: 5,
      apart: null,
      perInvariants: null,
    })
    expect(from).toBeNull()
    expect(searches.map(({ id, seed }) => [id, seed])).toEqual([
      [searchIds[0], 41],
      [searchIds[1], 42],
    ])
    expect(searches[0]).toMatchObject({
      evaluations: 60,
      budget: 60,
      state: 'finished',
      targetVersion: 1,
      rule: null,
      scoringHash: list.scoringHash,
    })
    const search = await hunt.read(searchIds[0])
    expect(searches[0].null).toMatchObject({ seed: search.null?.seed, size: search.null?.size })
    const perPolytope = new Map<string, number>()
    for (const { polytopeKey } of list.rows) {
      perPolytope.set(polytopeKey, (perPolytope.get(polytopeKey) ?? 0) + 1)
    }
    expect(Math.max(...perPolytope.values())).toBeLessThanOrEqual(5)
  })

  it('keeps classes on a polytope apart by the triangles they differ in', async () => {
    const apart = 8
    const all = await make({})
    const list = await make({ apart })
    expect(list.size).toBeLessThan(all.size)
    expect(list.provenance?.counts.leftOut.near).toBe(all.size - list.size)
    expect(keysOf((await draft({ apart })).best)).toEqual(keysOf(list.rows.slice(0, 20)))
    const near = await pairsNearerThan(apart, list.rows)
    expect(near).toEqual([])
    // Each one that was left out is near to a better one of the list.
    const taken = new Set(keysOf(list.rows))
    for (const left of all.rows.filter(({ candidateKey }) => !taken.has(candidateKey))) {
      const better = list.rows.filter(
        (row) => all.rows.findIndex((one) => one.candidateKey === row.candidateKey) < left.rank - 1,
      )
      expect((await pairsNearerThan(apart, [left, ...better])).length).toBeGreaterThan(0)
    }
  })

  it('is ranked by Pareto fronts of report columns', async () => {
    const pareto = [
      { column: 'score', direction: 'max' },
      { column: 'report:volume', direction: 'min' },
    ]
    const list = await make({ pareto, feasibleOnly: true })
    const value = ({ outcome }: ShortlistRow): [number, number] => {
      if (outcome.kind !== 'feasible') throw new Error('an infeasible candidate lies on no front')
      return [outcome.score, -(outcome.report.volume as number)]
    }
    const dominates = (a: ShortlistRow, b: ShortlistRow) => {
      const [[x, y], [u, v]] = [value(a), value(b)]
      return x >= u && y >= v && (x > u || y > v)
    }
    const fronts = list.rows.map(({ front }) => front ?? 0)
    expect(fronts).toEqual([...fronts].sort((a, b) => a - b))
    for (const row of list.rows) {
      expect(list.rows.some((other) => dominates(other, row))).toBe(row.front !== 1)
    }
    expect(list.provenance?.counts.firstFront).toBe(fronts.filter((front) => front === 1).length)
    const wrong = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: 'x', searchIds, pareto: [pareto[0], { column: 'report:none', direction: 'max' }] })
    expect([wrong.status, wrong.body.code, wrong.body.path]).toEqual([
      422,
      'no-such-column',
      'pareto.1.column',
    ])
    const twice = await hunt.lead
      .post(hunt.path('/shortlists'))
      .send({ name: 'x', searchIds, pareto: [pareto[0], pareto[0]] })
    expect([twice.status, twice.body.code]).toEqual([422, 'invalid-request'])
  })
})

/** Pairs with the first of which every one is compared when one is given, else all pairs; on one polytope each. */
async function pairsNearerThan(least: number, rows: readonly ShortlistRow[]): Promise<string[]> {
  const { manager } = hunt.server.context.source
  const near: string[] = []
  const stored = new Map<string, CandidateRecord>()
  for (const { candidateKey } of rows) {
    const where = { key: candidateKey }
    stored.set(
      candidateKey,
      await manager.findOneOrFail(CandidateRecord, { where, relations: { polytope: true } }),
    )
  }
  for (const polytopeKey of new Set(rows.map((row) => row.polytopeKey))) {
    const here = rows.filter((row) => row.polytopeKey === polytopeKey)
    const form = normalForm(polytopeFromPoints(stored.get(here[0].candidateKey)!.polytope!.coordinates))
    const classes = here.map(({ candidateKey }) => {
      const outcome = classFromHeights(form.polytope, stored.get(candidateKey)!.heights)
      if (!outcome.fine) throw new Error('stored heights are fine')
      return outcome.class
    })
    for (let a = 0; a < classes.length; a++) {
      for (let b = a + 1; b < classes.length; b++) {
        if (trianglesApart(form, classes[a], classes[b], least - 1) !== null) {
          near.push(`${here[a].candidateKey} ${here[b].candidateKey}`)
        }
      }
    }
  }
  return near
}

describe('a list scored anew', () => {
  const other = huntRule.replace('score log10(metric.divisor.top)', 'score -volume')
  let versionId: string
  let list: ShortlistDetail

  beforeAll(async () => {
    const target = hunt.path(`/targets/${hunt.targetId}`)
    const { body } = await hunt.lead.post(`${target}/versions`).send({ text: other }).expect(201)
    versionId = body.versions[0].id as string
    list = await make({ size: 15 })
    await hunt.lead
      .post(hunt.path(`/candidates/${list.rows[2].candidateKey}/verdicts`))
      .send({ targetVersionId: list.targetVersionId, value: 'rejected', reason: 'too small' })
      .expect(201)
  })

  const rescore = async (body: object): Promise<Rescoring> => {
    const asked = { name: 'Anew', targetVersionId: versionId, ...body }
    const { id } = (await hunt.lead.post(hunt.path('/rescorings')).send(asked).expect(201)).body as Rescoring
    return ended(id)
  }
  const ended = async (id: string): Promise<Rescoring> => {
    const event = await hunt.stream.event(
      (told) =>
        told.kind === 'rescoring' &&
        told.rescoring.id === id &&
        !['queued', 'running'].includes(told.rescoring.state),
    )
    if (event.kind !== 'rescoring') throw new Error('another event')
    return event.rescoring
  }
  const read = async (id: string | null): Promise<ShortlistDetail> =>
    (await hunt.lead.get(hunt.path(`/shortlists/${id}`)).expect(200)).body as ShortlistDetail

  it('may be a newer issue with finds of other searches, which are scored first', async () => {
    const more = await hunt.start({ targetVersionId: versionId, method: 'random', seed: 77, keep: 40 })
    await hunt.finished(more.id)
    const { body } = await hunt.lead
      .post(hunt.path(`/shortlists/${list.id}/reissues`))
      .send({ name: 'Issue 2', how: { kind: 'drawn', moreSearchIds: [more.id] } })
      .expect(201)
    expect(body).toMatchObject({ shortlistId: null, rescoring: { fromId: list.id } })
    const done = await ended(body.rescoring.id as string)
    const next = await read(done.shortlistId)
    expect(next).toMatchObject({ issue: 2, size: 15, reissueOf: { id: list.id }, provenance: { from: null } })
    const before = new Map(list.rows.map(({ candidateKey, rank }) => [candidateKey, rank]))
    for (const { candidateKey, previous } of next.rows) {
      expect(previous?.rank).toBe(before.get(candidateKey))
    }
    const stayed = next.rows.filter(({ previous }) => previous !== null).length
    expect(next.reissueOf?.left).toHaveLength(15 - stayed)
  })

  it('is a new list with the change of every rank, and verdicts with the version they were given for', async () => {
    const done = await rescore({ from: { shortlistId: list.id } })
    expect(done).toMatchObject({ state: 'finished', total: 15, scored: 15, broken: 0, fromId: list.id })
    const anew = await read(done.shortlistId)
    expect(anew).toMatchObject({ name: 'Anew', targetVersion: 2, size: 15, rejected: 1, rule: other })
    expect(anew.provenance?.from).toMatchObject({
      id: list.id,
      targetVersion: 1,
      size: 15,
      rule: huntRule,
      scoringHash: list.scoringHash,
    })
    expect(anew.provenance?.searches.map(({ rule }) => rule)).toEqual([huntRule, huntRule])
    const scores = anew.rows.map(({ outcome }) => (outcome.kind === 'feasible' ? outcome.score : -Infinity))
    expect(scores).toEqual([...scores].sort((a, b) => b - a))
    for (const row of anew.rows) {
      const before = list.rows.find(({ candidateKey }) => candidateKey === row.candidateKey)!
      const score = before.outcome.kind === 'feasible' ? before.outcome.score : null
      expect(row.previous).toEqual({ rank: before.rank, kind: before.outcome.kind, score })
      expect(row.searchId).toBe(before.searchId)
      const { outcome } = row
      if (outcome.kind === 'feasible') expect(outcome.score).toBe(-(outcome.report.volume as number))
    }
    const judged = anew.rows.find(({ verdict }) => verdict !== null)
    expect(judged).toMatchObject({
      candidateKey: list.rows[2].candidateKey,
      verdict: { value: 'rejected', targetVersion: 1 },
      certificate: { state: 'none' },
    })
    const again = await read(list.id)
    expect(again.rescored).toEqual([
      { id: anew.id, name: 'Anew', targetName: 'Long range', targetVersion: 2 },
    ])
    expect(again.rows.map(({ rank, outcome }) => ({ rank, outcome }))).toEqual(
      list.rows.map(({ rank, outcome }) => ({ rank, outcome })),
    )
  })

  it('can be made of the finds of searches, and then needs no scoring any more', async () => {
    const before = await draft({ targetVersionId: versionId })
    expect(before.scored).toBeLessThan(before.distinct)
    expect(before).toMatchObject({ counts: null, best: [] })
    const body = { name: 'x', searchIds, targetVersionId: versionId }
    const refused = await hunt.lead.post(hunt.path('/shortlists')).send(body)
    expect([refused.status, refused.body.code]).toEqual([409, 'needs-scoring'])

    const done = await rescore({ from: { searchIds }, assembly: { size: 9, perPolytope: 3 } })
    const anew = await read(done.shortlistId)
    expect(done).toMatchObject({ total: before.distinct, scored: before.distinct, fromId: null })
    expect(anew.rows.every(({ previous }) => previous === null)).toBe(true)
    expect(anew.provenance).toMatchObject({ from: null, assembly: { size: 9, perPolytope: 3 } })
    const direct = await make({ size: 9, perPolytope: 3, targetVersionId: versionId })
    expect(keysOf(direct.rows)).toEqual(keysOf(anew.rows))
    expect(direct.scoringHash).toBe(anew.scoringHash)
  })

  it('goes on after a restart, with nothing scored twice', async () => {
    const { context } = hunt.server
    const { body } = await hunt.lead
      .post(hunt.path('/targets'))
      .send({ name: 'Restarted', text: 'score -volume - 1\n' })
      .expect(201)
    const { id: targetVersionId, scoringHash } = body.versions[0] as { id: string; scoringHash: string }
    const key = list.rows[4].candidateKey
    // As if it had been scored before the server went down.
    const outcome = { kind: 'feasible', score: 12345, hit: null, report: {} } as const
    await context.writes.transaction((manager) =>
      manager.insert(CandidateValue, { candidateKey: key, scoringHash, outcome }),
    )
    context.jobs.rescorings.enqueue = () => undefined // the server goes down before it begins
    const asked = { name: 'Later', targetVersionId, from: { shortlistId: list.id } }
    const { id } = (await hunt.lead.post(hunt.path('/rescorings')).send(asked).expect(201)).body as Rescoring
    Reflect.deleteProperty(context.jobs.rescorings, 'enqueue')
    await context.jobs.rescorings.start()
    await hunt.stream.event(
      (told) => told.kind === 'rescoring' && told.rescoring.id === id && told.rescoring.state === 'finished',
    )
    const { body: all } = await hunt.lead.get(hunt.path('/rescorings')).expect(200)
    const done = (all as Rescoring[]).find((one) => one.id === id)
    const anew = await read(done!.shortlistId)
    expect(anew.rows[0]).toMatchObject({ candidateKey: key, outcome: { score: 12345 } })
    expect(anew.size).toBe(15)
  })

  it('can be cancelled, by those who may ask for it, and refuses what is not there', async () => {
    const { context } = hunt.server
    context.jobs.rescorings.enqueue = () => undefined
    const asked = { name: 'Never', targetVersionId: versionId, from: { shortlistId: list.id } }
    const { id } = (await hunt.lead.post(hunt.path('/rescorings')).send(asked).expect(201)).body as Rescoring
    Reflect.deleteProperty(context.jobs.rescorings, 'enqueue')
    const cancel = () => hunt.lead.post(hunt.path(`/rescorings/${id}/cancel`))
    expect((await cancel().expect(200)).body).toMatchObject({ state: 'cancelled', shortlistId: null })
    expect((await cancel()).body.code).toBe('wrong-state')
    const ask = (body: object) => hunt.lead.post(hunt.path('/rescorings')).send({ ...asked, ...body })
    expect((await ask({ from: { shortlistId: 'none' } })).status).toBe(404)
    expect((await ask({ targetVersionId: 'none' })).status).toBe(404)
    expect((await ask({ from: {} })).status).toBe(422)
  })
})
