// A server process for tests that end it: opens the databases in DATA_DIR, asks for the certificates of a shortlist of
// the given size unless that has been done, and works on them. Reports on standard output, one line each.
import { readConfig } from '../../../server/config.ts'
import { Certification } from '../../../server/entities/certification.ts'
import { createCampaign } from '../../../server/services/campaigns.ts'
import { requestCertification } from '../../../server/services/certifications.ts'
import { openServer } from '../../../server/start.ts'
import { builtWorker } from './builtWorker.ts'
import { bundledEntries, loadEntries } from './bundledSample.ts'
import { smallShortlist } from './smallShortlist.ts'
import { addAccount } from './testServer.ts'

const [size] = process.argv.slice(2)
const server = await openServer(readConfig(process.env), { jobs: { ...builtWorker, nullSize: () => 20 } })
const { context } = server
const { source, streams, jobs } = context

const send = streams.toCampaign.bind(streams)
streams.toCampaign = (campaignId, event) => {
  if (event.kind === 'certification') {
    const { state, total, waiting } = event.certification
    process.stdout.write(`${state} ${total - waiting} ${total}\n`)
  }
  send(campaignId, event)
}

await jobs.certifications.start()
if (!(await source.manager.exists(Certification))) {
  await loadEntries(
    server,
    bundledEntries('small', (id) => /^r4-00[0-4]/.test(id)),
  )
  const author = await addAccount(server, 'author')
  const { id } = await createCampaign(context, author, { name: 'Hunt', description: '' })
  const { targetVersionId, rows } = await smallShortlist(server, id, author, {
    rule: 'score log10(metric.divisor.top)',
    size: Number(size),
  })
  const candidateKeys = rows.map(({ candidateKey }) => candidateKey)
  await requestCertification(context, id, author, { targetVersionId, candidateKeys, again: false })
}

process.on('SIGTERM', () => void server.close().then(() => process.exit(0)))
