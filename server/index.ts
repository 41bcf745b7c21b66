import { readConfig, StartError } from './config.ts'
import { announce, hasDemo, seedDemo, runDemoSearch } from './library/demo.ts'
import { firstFiles, laterFiles } from './library/bundled.ts'
import { listen, openServer, refuseExposedDemo } from './start.ts'

async function main(): Promise<void> {
  const config = readConfig(process.env)
  const { context, app, close } = await openServer(config)
  const { log, library, jobs } = context
  const demo = await seedDemo(context)
  await refuseExposedDemo(context)
  const server = await listen(app, config)
  process.stdout.write(announce(config.baseUrl, await hasDemo(context)))

  let closing = false
  const shutDown = (signal: string) => {
    if (closing) return
    closing = true
    log.info({ signal }, 'shutting down')
    server.close()
    close()
      .catch((error: unknown) => log.error({ err: error }, 'the shutdown was not clean'))
      .finally(() => {
        server.closeAllConnections()
        process.exit(0)
      })
  }
  process.on('SIGINT', () => shutDown('SIGINT'))
  process.on('SIGTERM', () => shutDown('SIGTERM'))

  // From here on nothing ends the server: what fails is logged, and the web side goes on.
  try {
    const first = await library.open(firstFiles)
    const later = await library.open(laterFiles)
    await jobs.searches.start()
    await jobs.certifications.start()
    await jobs.rescorings.start()
    jobs.invariants.wake()
    await library.load(first)
    await Promise.all([
      library.load(later),
      library.describe(),
      demo === null ? null : runDemoSearch(context, demo),
    ])
  } catch (error) {
    if (!closing) log.error({ err: error }, 'the background work of the start failed')
  }
}

main().catch((error: unknown) => {
  const message =
    error instanceof StartError ? error.message : error instanceof Error ? error.stack : String(error)
  process.stderr.write(`Tessellary could not start.\n${message}\n`)
  process.exit(1)
})
