import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SearchDetail } from '../../shared/searches.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

let server: TestServer
let lead: Agent

beforeAll(async () => {
  server = await openTestServer({
    environment: { WORKERS: '2' },
    jobs: {
      backgroundWorker: new URL('./workers/failing.ts', import.meta.url),
      heapMegabytes: 256,
      nullSize: () => 20,
    },
  })
  await loadEntries(
    server,
    bundledEntries('large', (id) => id === 'w50-7-newton-2-2-3-3-7'),
  )
  lead = await server.signIn('lead')
})
afterAll(() => server.close())

const path = (rest: string) => `/api/campaigns/${server.campaignId}${rest}`

const start = async (remark: string): Promise<string> => {
  const text = `# ${remark}\nscore log10(metric.divisor.top)\n`
  const target = await lead.post(path('/targets')).send({ name: remark, text }).expect(201)
  const { body } = await lead
    .post(path('/searches'))
    .send({
      targetVersionId: target.body.versions[0].id,
      scope: { kind: 'filter', filter: {} },
      budget: 40,
      seed: 1,
      islands: 1,
    })
    .expect(201)
  return body.id as string
}

const read = async (id: string): Promise<SearchDetail> =>
  (await lead.get(path(`/searches/${id}`)).expect(200)).body as SearchDetail

const ended = async (id: string): Promise<SearchDetail> => {
  const over = async () => ['failed', 'finished'].includes((await read(id)).state)
  await expect.poll(over, { timeout: 50_000, interval: 100 }).toBe(true)
  return read(id)
}

describe('a worker thread', () => {
  it.each([
    ['throws', 'worker-died', /thrown on purpose/],
    ['dies', 'worker-died', /exited with code: 3/],
    ['runs out of memory', 'worker-died', /memory/i],
  ])(
    'that %s fails its search with the reason, and the last state is kept',
    async (remark, code, message) => {
      const failed = await ended(await start(remark))
      expect(failed).toMatchObject({
        state: 'failed',
        failure: { code, message: expect.stringMatching(message) },
      })
      // The first segment, of two evaluations, was committed.
      expect(failed.evaluations).toBe(2)
      expect(failed.top.length).toBe(2)
      await lead.get('/api/health').expect(200)
    },
  )

  it('is replaced: the next search runs', async () => {
    expect(await ended(await start('all well'))).toMatchObject({ state: 'finished', evaluations: 40 })
  })

  it('that failed a search leaves it to be resumed', async () => {
    const id = await start('dies')
    await ended(id)
    const { body } = await lead.post(path(`/searches/${id}/resume`)).expect(200)
    expect(body.failure).toBeNull()
    expect(await ended(id)).toMatchObject({ state: 'failed', evaluations: 2 })
  })
})
