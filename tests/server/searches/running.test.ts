import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { runCommand } from '../../../scoring/cli/command.ts'
import { startless } from '../../../shared/searches.ts'
import { methodNames, usesStarts } from '../../../scoring/index.ts'
import { openSmallHunt, huntScope, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
let folder: string
beforeAll(async () => {
  hunt = await openSmallHunt()
  folder = mkdtempSync(join(tmpdir(), 'tessellary-running-'))
})
afterAll(async () => {
  await hunt.close()
  rmSync(folder, { recursive: true, force: true })
})

interface Line {
  readonly kind: string
  readonly [field: string]: unknown
}

/** The lines of the headless search of a specification. */
async function headless(specification: unknown): Promise<Line[]> {
  const file = join(folder, 'spec.json')
  writeFileSync(file, JSON.stringify(specification))
  const lines: Line[] = []
  const status = await runCommand(['search', file, '--threads', '1'], {
    out: (line) => lines.push(JSON.parse(line) as Line),
    err: (line) => {
      throw new Error(line)
    },
  })
  expect(status).toBe(0)
  return lines
}

const specificationOf = async (id: string): Promise<Record<string, unknown>> =>
  (await hunt.lead.get(hunt.path(`/searches/${id}/spec.json`)).expect(200)).body

const ofKind = (lines: readonly Line[], kind: string): Line => {
  const found = lines.find((line) => line.kind === kind)
  if (!found) throw new Error(`no line of kind ${kind}`)
  return found
}

interface Final extends Line {
  readonly progress: Record<string, unknown>
  readonly top: { classKey: string; heights: number[]; score: { value?: number } }[]
}

describe('methods that begin from given candidates', () => {
  it('are those of the engine', () => {
    expect([...startless].sort()).toEqual(methodNames.filter((name) => !usesStarts(name)).sort())
  })
})

describe('a search that is extended', () => {
  it('goes on to the same end as one that was extended otherwise, and as its specification run headless', async () => {
    const first = await hunt.finished((await hunt.start({ budget: 30, seed: 21 })).id)
    const extended = await hunt.lead
      .post(hunt.path(`/searches/${first.id}/extend`))
      .send({ evaluations: 15 })
      .expect(200)
    expect(extended.body).toMatchObject({ budget: 45, extensions: [15], finishedAt: null })
    await hunt.told(first.id, ({ state, progress }) => state === 'finished' && progress.evaluations === 45)
    const done = await hunt.read(first.id)
    expect(done).toMatchObject({ state: 'finished', evaluations: 45, progress: { budget: 45 } })
    expect(done.events.map(({ kind }) => kind)).toContain('extended')

    // The same, asked for while it is paused.
    const other = await hunt.start({ budget: 30, seed: 21 })
    await hunt.lead.post(hunt.path(`/searches/${other.id}/pause`)).expect(200)
    await hunt.lead
      .post(hunt.path(`/searches/${other.id}/extend`))
      .send({ evaluations: 15 })
      .expect(200)
    await hunt.lead.post(hunt.path(`/searches/${other.id}/resume`)).expect(200)
    await hunt.told(other.id, ({ state, progress }) => state === 'finished' && progress.evaluations === 45)
    const again = await hunt.read(other.id)
    expect(again.top).toEqual(done.top)
    expect(again.progress.curve).toEqual(done.progress.curve)

    const specification = await specificationOf(first.id)
    expect(specification).toMatchObject({ budget: 30, extensions: [15], seed: 21, islands: 2, keep: 20 })
    const final = ofKind(await headless(specification), 'final') as Final
    expect(final.top.map(({ classKey, score }) => [classKey, score.value])).toEqual(
      done.top.map(({ candidateKey, outcome }) => [
        candidateKey,
        outcome.kind === 'feasible' ? outcome.score : null,
      ]),
    )
    const { curve, evaluations, proposals, accepted, feasible, best, bestKey } = done.progress
    expect(final.progress).toMatchObject({ curve, evaluations, proposals, accepted, feasible, best, bestKey })
  })

  it('is refused where it would change nothing', async () => {
    const few = { kind: 'filter', filter: { h11Min: 9, h11Max: 10 } }
    const { id } = await hunt.start({ method: 'exhaustive', scope: few, budget: 50 })
    await hunt.finished(id)
    const answer = await hunt.lead.post(hunt.path(`/searches/${id}/extend`)).send({ evaluations: 10 })
    expect(answer.status).toBe(409)
    expect(answer.body.code).toBe('nothing-left')
  })
})

describe('a search that begins from candidates', () => {
  it('takes the best of another one, scores them first, and runs headless to the same end', async () => {
    const first = await hunt.finished((await hunt.start({ budget: 40, seed: 3 })).id)
    const starts = { kind: 'search', id: first.id, size: 5 }
    const summary = await hunt.lead.post(hunt.path('/search-starts')).send({ starts }).expect(200)
    expect(summary.body).toMatchObject({ count: 5, name: first.name })
    const created = await hunt.start({ budget: 40, seed: 4, starts, settings: { descents: 2 } })
    expect(created).toMatchObject({
      settings: { descents: 2 },
      starts: { kind: 'search', id: first.id, count: 5, used: true },
    })
    const done = await hunt.finished(created.id)
    expect(done.progress.given).toBeGreaterThanOrEqual(5)
    expect(Number(done.best)).toBeGreaterThanOrEqual(Number(first.best))
    const lines = await headless(await specificationOf(created.id))
    expect(ofKind(lines, 'start').starts).toEqual({ given: 5, used: true })
    const final = ofKind(lines, 'final') as Final
    expect(final.top.map(({ classKey }) => classKey)).toEqual(
      done.top.map(({ candidateKey }) => candidateKey),
    )
    expect(final.progress).toMatchObject({ curve: done.progress.curve, given: done.progress.given })
    const same = await hunt.lead
      .post(hunt.path('/search-starts'))
      .send({ starts: { kind: 'same', id: created.id } })
      .expect(200)
    expect(same.body.count).toBe(5)
  })

  it('is refused when they lie outside its scope, or are not on the list', async () => {
    const first = await hunt.finished((await hunt.start({ budget: 20, seed: 8 })).id)
    const settings = { targetVersionId: hunt.targetVersionId, scope: huntScope, budget: 30, seed: 1 }
    const key = first.top.find(({ h11 }) => h11 !== 9)?.polytopeKey ?? ''
    const elsewhere = await hunt.lead.post(hunt.path('/searches')).send({
      ...settings,
      scope: { kind: 'filter', filter: { h11Min: 9, h11Max: 9 } },
      starts: { kind: 'search', id: first.id, size: 20 },
    })
    expect(key).not.toBe('')
    expect([elsewhere.status, elsewhere.body.code]).toEqual([422, 'start-outside-scope'])
    const none = await hunt.lead
      .post(hunt.path('/searches'))
      .send({ ...settings, starts: { kind: 'imported', candidateKeys: [first.top[0].candidateKey] } })
    expect([none.status, none.body.code]).toEqual([422, 'no-such-start'])
  })
})

describe('the cost of a search', () => {
  it('is timed on candidates of its scope, and kept', async () => {
    const asked = { targetVersionId: hunt.targetVersionId, scope: huntScope, method: 'auto' }
    const { body } = await hunt.lead.post(hunt.path('/search-costs')).send(asked).expect(200)
    expect(body.millisecondsEach).toBeGreaterThan(0)
    expect(body.timed).toBeGreaterThan(0)
    expect(body.threads).toBe(2)
    const again = await hunt.lead.post(hunt.path('/search-costs')).send(asked).expect(200)
    expect(again.body.millisecondsEach).toBe(body.millisecondsEach)
  })
})

describe('a result that was run elsewhere', () => {
  const specification = {
    schema: 'tessellary.search/1',
    scope: {
      polytopes: [
        { weights: [1, 1, 1, 1, 2], side: 'newton' },
        { weights: [4, 4, 5, 5, 7], side: 'newton' },
      ],
    },
    rule: 'score volume hit volume > 0',
    budget: 20,
    seed: 2,
    islands: 1,
    keep: 5,
    null: { size: 30, seed: 7 },
  }
  let lines: Line[]
  beforeAll(async () => {
    lines = (await headless(specification)).filter(({ kind }) => kind === 'start' || kind === 'final')
  })
  const send = (rows: readonly unknown[]) =>
    hunt.lead
      .post(hunt.path('/search-results'))
      .send({ text: rows.map((row) => JSON.stringify(row)).join('\n'), source: 'cluster.jsonl' })

  it('is imported as a search, with its candidates found again and its counts as reported', async () => {
    const { body } = await send(lines).expect(201)
    const final = ofKind(lines, 'final') as Final
    expect(body).toMatchObject({
      state: 'finished',
      isImported: true,
      evaluations: 20,
      imported: { source: 'cluster.jsonl', checked: 5 },
      targetName: 'Rule of cluster.jsonl',
      null: { size: 30, seed: 7 },
      polytopes: 2,
    })
    expect(body.top.map(({ candidateKey }: { candidateKey: string }) => candidateKey)).toEqual(
      final.top.map(({ classKey }) => classKey),
    )
    expect(body.progress.curve).toEqual(final.progress.curve)
    expect(body.progress.islands[0]).toMatchObject({ evaluations: 20 })
    // Its specification is that of the file, and runs to the same lines.
    const again = (await headless(await specificationOf(body.id))).filter(({ kind }) => kind === 'final')
    expect(again[0]).toEqual(final)
    const refused = await hunt.lead.post(hunt.path(`/searches/${body.id}/extend`)).send({ evaluations: 10 })
    expect(refused.body.code).toBe('imported-result')
  })

  it('is refused where a line does not say what comes out here', async () => {
    const [start] = lines
    const final = ofKind(lines, 'final') as Final
    const [first, ...others] = final.top
    const wrong = async (change: Record<string, unknown>) => {
      const { status, body } = await send([start, { ...final, ...change }])
      expect(status).toBe(422)
      return body as { code: string; detail: string }
    }
    const score = await wrong({ top: [{ ...first, score: { ...first.score, value: 1 } }, ...others] })
    expect(score.code).toBe('result.other-score')
    expect(score.detail).toMatch(
      /^Line 2, candidate 1 of "top": found the score .*"value":1.*, expected .*"value"/,
    )
    const address = await wrong({ top: [{ ...first, classKey: others[0].classKey }, ...others] })
    expect(address.code).toBe('result.other-key')
    const heights = await wrong({ top: [{ ...first, heights: first.heights.map(() => 0) }, ...others] })
    expect(heights.code).toBe('result.heights')
    const counts = await wrong({ progress: { ...final.progress, evaluations: 19 } })
    expect(counts.code).toBe('result.counts')
    const best = await wrong({ top: others })
    expect(best.code).toBe('result.other-best')
    const engine = await send([{ ...start, engineVersion: '0' }, final])
    expect(engine.body.code).toBe('result.other-engine')
    const alone = await send([final])
    expect(alone.body.code).toBe('result.incomplete')
    const noise = await hunt.lead.post(hunt.path('/search-results')).send({ text: '{"kind":' })
    expect(noise.body.code).toBe('result.not-json')
  })
})
