import { mkdtempSync, readdirSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SearchDetail } from '../../../shared/searches.ts'
import { bundledEntries, loadEntries } from '../support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from '../support/testServer.ts'

/** Far above what a piece takes on a busy machine: only the thread that hangs comes up to it. */
const pieceLimitMilliseconds = 20_000

let server: TestServer
let lead: Agent
let folder: string

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-threads-'))
  server = await openTestServer({
    environment: { WORKERS: '2' },
    jobs: {
      backgroundWorker: new URL('../workers/failing.ts', import.meta.url),
      heapMegabytes: 128,
      segmentMilliseconds: 20,
      pieceLimitMilliseconds,
      nullSize: () => 20,
    },
  })
  await loadEntries(
    server,
    bundledEntries('large', (id) => id.startsWith('w20-17-newton')),
  )
  lead = await server.signIn('lead')
})
afterAll(async () => {
  await server.close()
  rmSync(folder, { recursive: true, force: true })
})

const path = (rest: string) => `/api/campaigns/${server.campaignId}${rest}`

const start = async (remark: string, settings: object = {}): Promise<string> => {
  const text = `# ${remark}\nscore log10(metric.divisor.top)\nreport volume\n`
  const target = await lead.post(path('/targets')).send({ name: 'Target', text }).expect(201)
  const { body } = await lead
    .post(path('/searches'))
    .send({
      targetVersionId: target.body.versions[0].id,
      scope: { kind: 'filter', filter: {} },
      budget: 40,
      seed: 1,
      islands: 1,
      ...settings,
    })
    .expect(201)
  return body.id as string
}

const read = async (id: string): Promise<SearchDetail> =>
  (await lead.get(path(`/searches/${id}`)).expect(200)).body as SearchDetail

const ended = async (id: string): Promise<SearchDetail> => {
  const over = async () => ['failed', 'finished'].includes((await read(id)).state)
  await expect.poll(over, { timeout: 100_000, interval: 100 }).toBe(true)
  return read(id)
}

describe('a worker thread', () => {
  it.each([
    ['throws', 'worker-died', /thrown on purpose/],
    ['dies', 'worker-died', /exited with code: 3/],
    ['runs out of memory', 'worker-died', /memory/i],
    ['an observable throws', 'worker-threw', /a bug in an observable/],
  ])(
    'that has a search in which it %s fails that search with the reason; the last state is kept and others go on',
    async (remark, code, message) => {
      const other = await start('all well', { seed: 2 })
      const failed = await ended(await start(remark))
      expect(failed).toMatchObject({
        state: 'failed',
        failure: { code, message: expect.stringMatching(message) },
      })
      // The first segment, of at most two evaluations, was committed.
      expect([1, 2]).toContain(failed.evaluations)
      expect(failed.top.length).toBe(failed.evaluations)
      await lead.get('/api/health').expect(200)
      expect(await ended(other)).toMatchObject({ state: 'finished', evaluations: 40 })
    },
    120_000,
  )

  it('that does not return is ended after the limit, tried once more, and fails its search', async () => {
    const failed = await ended(await start('never returns'))
    expect(failed).toMatchObject({
      state: 'failed',
      failure: { code: 'worker-stuck', message: 'The computation did not end within 20 seconds.' },
    })
    expect(await ended(await start('all well', { seed: 3 }))).toMatchObject({ state: 'finished' })
  }, 240_000)

  it('that failed a search leaves it to be resumed', async () => {
    const id = await start('dies')
    const { evaluations } = await ended(id)
    const { body } = await lead.post(path(`/searches/${id}/resume`)).expect(200)
    expect(body.failure).toBeNull()
    expect(await ended(id)).toMatchObject({ state: 'failed', evaluations })
  }, 120_000)

  it('may die now and then: its segments begin once more, and the end is the same', async () => {
    const settings = { budget: 120, islands: 2, seed: 8 }
    const undisturbed = await ended(await start('all well', settings))
    const disturbed = await ended(await start(`dies now and then ${folder}`, settings))
    // At least in the second segment of either island.
    expect(readdirSync(folder)).toEqual(expect.arrayContaining(['0-0', '1-0']))
    expect(disturbed.state).toBe('finished')
    expect(disturbed.top).toEqual(undisturbed.top)
    expect(disturbed.progress.curve).toEqual(undisturbed.progress.curve)
  }, 120_000)
})
