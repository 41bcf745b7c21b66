import { mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { readConfig } from '../../server/config.ts'
import { announce, runDemoSearch, seedDemo } from '../../server/library/demo.ts'
import { demoSearch } from '../../server/library/demoTeam.ts'
import { openServer } from '../../server/start.ts'
import { builtWorker } from '../server/support/builtWorker.ts'
import { bundledEntries, loadEntries } from '../server/support/bundledSample.ts'
import type { Application } from './application.ts'

/**
 * The application with its demo team and the demo's search and shortlist, all computed, over a part of the bundled
 * library: for tests of pages, which need not wait until thousands of polytopes are described. Served from this
 * process, answers checked against their schemas.
 */
export async function openDemoApplication(): Promise<Application> {
  const folder = mkdtempSync(join(tmpdir(), 'tessellary-demo-'))
  const config = readConfig({
    DATA_DIR: folder,
    LOG_LEVEL: 'silent',
    NODE_ENV: 'development',
    WORKERS: '2',
  })
  const server = await openServer(config, { inMemory: true, checkAnswers: true, jobs: builtWorker })
  const { context, app, close } = server
  const demo = await seedDemo(context)
  if (demo === null) throw new Error('nothing was seeded')
  await loadEntries(server, [
    ...bundledEntries('small', (id) => /^r[123]-/.test(id)),
    ...bundledEntries('large', (id) => id === demoSearch.polytopeName || id.startsWith('w9-39-newton')),
  ])
  const http = createServer(app)
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve))
  await Promise.all([context.library.describe(), runDemoSearch(context, demo)])
  const address = `http://127.0.0.1:${(http.address() as AddressInfo).port}`
  return {
    address,
    greeting: announce(address, true),
    stop: async () => {
      const closed = new Promise((resolve) => http.close(resolve))
      http.closeAllConnections()
      await closed
      await close()
      rmSync(folder, { recursive: true, force: true })
    },
  }
}
