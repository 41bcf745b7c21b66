import type { JobOptions } from '../../../server/jobs/jobs.ts'
import type { SearchDetail } from '../../../shared/searches.ts'
import type { StreamEvent } from '../../../shared/events.ts'
import { bundledEntries, loadEntries } from './bundledSample.ts'
import { listening, OpenStream, type Listening } from './listening.ts'
import { openTestServer, type Agent, type TestServer } from './testServer.ts'

export const huntRule = `require favourable label "favourable"
score log10(metric.divisor.top)
report volume, smallest = min(d in divisors : d.volume)
hit log10(metric.divisor.top) > -3
`

/** Three polytopes, with h11 = 9, 10 and 20. */
export const huntScope = { kind: 'filter', filter: { h11Min: 9, h11Max: 20 } }

/** A test server with three polytopes, a target and an open event stream: what tests of searches begin with. */
export interface SmallHunt {
  readonly server: TestServer
  readonly http: Listening
  /** The campaign's events, as a reader gets them. */
  readonly stream: OpenStream
  readonly lead: Agent
  readonly targetId: string
  readonly targetVersionId: string
  /** Address below the campaign. */
  path(rest?: string): string
  /** Makes a search of 60 evaluations, unless the settings say otherwise. */
  start(settings?: object): Promise<SearchDetail>
  read(id: string): Promise<SearchDetail>
  /** Resolves with the first event of a search that fits. */
  told(id: string, fits: (event: StreamEvent & { kind: 'search' }) => boolean): Promise<StreamEvent>
  /** The search after it has finished or failed. */
  finished(id: string): Promise<SearchDetail>
  close(): Promise<void>
}

export async function openSmallHunt(jobs: JobOptions = {}): Promise<SmallHunt> {
  const server = await openTestServer({
    environment: { WORKERS: '2' },
    jobs: { nullSize: () => 60, ...jobs },
  })
  await loadEntries(
    server,
    bundledEntries('large', (id) => /^w(9-39|10-46|20-17)-newton/.test(id)),
  )
  const http = await listening(server)
  const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
  const stream = await OpenStream.open(
    `${http.url}/api/events?campaign=${server.campaignId}`,
    await http.cookie('reader'),
  )
  const lead = await server.signIn('lead')
  const { body: target } = await lead
    .post(path('/targets'))
    .send({ name: 'Long range', text: huntRule })
    .expect(201)
  const targetVersionId = target.versions[0].id as string
  const read = async (id: string) =>
    (await lead.get(path(`/searches/${id}`)).expect(200)).body as SearchDetail
  const told: SmallHunt['told'] = (id, fits) =>
    stream.event((event) => event.kind === 'search' && event.id === id && fits(event))
  return {
    server,
    http,
    stream,
    lead,
    targetId: target.id as string,
    targetVersionId,
    path,
    start: async (settings = {}) => {
      const asked = { targetVersionId, scope: huntScope, budget: 60, seed: 5, islands: 2, keep: 20 }
      const { body } = await lead
        .post(path('/searches'))
        .send({ ...asked, ...settings })
        .expect(201)
      return body as SearchDetail
    },
    read,
    told,
    finished: async (id) => {
      await told(id, ({ state }) => state === 'finished' || state === 'failed')
      return read(id)
    },
    close: async () => {
      stream.close()
      await http.close()
      await server.close()
    },
  }
}
