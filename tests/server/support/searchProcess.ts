// A server process for tests that end it: opens the databases in DATA_DIR, loads a small library, makes the search
// described by its argument unless there is one, and carries it on. Reports on standard output, one line each.
import { readConfig } from '../../../server/config.ts'
import { Campaign } from '../../../server/entities/campaign.ts'
import { Search } from '../../../server/entities/search.ts'
import { createCampaign } from '../../../server/services/campaigns.ts'
import { createSearch } from '../../../server/services/searches.ts'
import { createTarget } from '../../../server/services/targets.ts'
import { listen, openServer } from '../../../server/start.ts'
import { createSearchSchema } from '../../../shared/searches.ts'
import { builtWorker } from './builtWorker.ts'
import { bundledEntries, loadEntries } from './bundledSample.ts'
import { addAccount } from './testServer.ts'

const [polytope, rule, settings, segmentMilliseconds] = process.argv.slice(2)
const server = await openServer(readConfig(process.env), {
  jobs: {
    ...builtWorker,
    nullSize: () => 50,
    ...(segmentMilliseconds ? { segmentMilliseconds: Number(segmentMilliseconds) } : {}),
  },
})
const { context } = server
const { source, streams, jobs } = context
const report = (line: string) => process.stdout.write(`${line}\n`)

const send = streams.toCampaign.bind(streams)
streams.toCampaign = (campaignId, event) => {
  if (event.kind === 'search') report(`${event.state} ${event.progress.evaluations}`)
  send(campaignId, event)
}

const sendToAll = streams.toAll.bind(streams)
streams.toAll = (event) => {
  const { trouble } = jobs.storage
  if (event.kind === 'changed' && trouble !== null) report(`held ${trouble.code}`)
  sendToAll(event)
}

await jobs.searches.start()
if (!(await source.manager.exists(Search))) {
  await loadEntries(
    { context },
    bundledEntries('large', (id) => id === polytope),
  )
  const author = await addAccount(server, 'author')
  const campaign =
    (await source.manager.findOneBy(Campaign, { name: 'Hunt' })) ??
    (await createCampaign(context, author, { name: 'Hunt', description: '' }))
  const target = await createTarget(context, campaign.id, author, { name: 'Target', text: rule })
  await createSearch(
    context,
    campaign.id,
    author,
    createSearchSchema.parse({
      ...JSON.parse(settings),
      targetVersionId: target.versions[0].version.id,
      scope: { kind: 'filter', filter: {} },
    }),
  )
}
const http = await listen(server.app, { ...context.config, port: 0 })
const place = http.address()
if (place !== null && typeof place === 'object') report(`listening ${place.port}`)

process.on('SIGTERM', () => {
  http.close()
  void server.close().then(() => process.exit(0))
})
