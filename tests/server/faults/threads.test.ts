import { mkdtempSync, readdirSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { JobOptions } from '../../../server/jobs/jobs.ts'
import type { SearchDetail } from '../../../shared/searches.ts'
import { builtVariant } from '../support/builtWorker.ts'
import { bundledEntries, loadEntries } from '../support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from '../support/testServer.ts'

let server: TestServer
let lead: Agent
let folder: string

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-threads-'))
  server = await open({ heapMegabytes: 128, segmentMilliseconds: 20 })
  lead = await server.signIn('lead')
})
afterAll(async () => {
  await server.close()
  rmSync(folder, { recursive: true, force: true })
})

async function open(jobs: JobOptions): Promise<TestServer> {
  const opened = await openTestServer({
    environment: { WORKERS: '2' },
    jobs: {
      backgroundWorker: builtVariant(new URL('../workers/failing.ts', import.meta.url)),
      nullSize: () => 20,
      ...jobs,
    },
  })
  await loadEntries(
    opened,
    bundledEntries('large', (id) => id.startsWith('w20-17-newton')),
  )
  return opened
}

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
  await expect.poll(over, { timeout: 200_000, interval: 100 }).toBe(true)
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
    240_000,
  )

  it('that failed a search leaves it to be resumed', async () => {
    const id = await start('dies')
    const { evaluations } = await ended(id)
    const { body } = await lead.post(path(`/searches/${id}/resume`)).expect(200)
    expect(body.failure).toBeNull()
    expect(await ended(id)).toMatchObject({ state: 'failed', evaluations })
  }, 240_000)

  it('may die now and then: its segments begin once more, and the end is the same', async () => {
    const settings = { budget: 60, islands: 2, seed: 8 }
    const undisturbed = await ended(await start('all well', settings))
    const disturbed = await ended(await start(`dies now and then ${folder}`, settings))
    expect(readdirSync(folder).length).toBeGreaterThan(0)
    expect(disturbed.state).toBe('finished')
    expect(disturbed.top).toEqual(undisturbed.top)
    expect(disturbed.progress.curve).toEqual(undisturbed.progress.curve)
  }, 240_000)
})

describe('a worker thread that does not return', () => {
  it('is ended after the limit, its segment tried once more, and its search fails', async () => {
    // On a busy machine even a sound segment may take longer: then it is the first one that is tried twice.
    const impatient = await open({ pieceLimitMilliseconds: 3_000 })
    const [before, leadBefore] = [server, lead]
    try {
      server = impatient
      lead = await impatient.signIn('lead')
      expect(await ended(await start('never returns'))).toMatchObject({
        state: 'failed',
        failure: { code: 'worker-stuck', message: 'The computation did not end within 3 seconds.' },
      })
      await lead.get('/api/health').expect(200)
    } finally {
      ;[server, lead] = [before, leadBefore]
      await impatient.close()
    }
  }, 240_000)
})
