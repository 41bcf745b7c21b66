import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** The built application as people run it, in a process of its own with an empty data folder. */
export interface Application {
  readonly address: string
  /** What the start printed on standard output. */
  readonly greeting: string
  stop(): Promise<void>
}

async function freePort(): Promise<number> {
  const probe = createServer()
  probe.listen(0, '127.0.0.1')
  await once(probe, 'listening')
  const address = probe.address()
  probe.close()
  if (address === null || typeof address === 'string') throw new Error('no port')
  return address.port
}

/** Resolves when the health endpoint answers; rejects when the process ends first. */
async function answering(address: string, child: ChildProcess): Promise<void> {
  const ended = once(child, 'exit').then(([code]) => {
    throw new Error(`the application ended with status ${String(code)} before it answered`)
  })
  const healthy = (async () => {
    for (;;) {
      const answer = await fetch(`${address}/api/health`).catch(() => null)
      if (answer?.ok) return
      await new Promise((resolve) => setTimeout(resolve, 100))
    }
  })()
  await Promise.race([healthy, ended])
}

export async function startApplication(environment: Record<string, string> = {}): Promise<Application> {
  const data = mkdtempSync(join(tmpdir(), 'tessellary-browser-'))
  const port = await freePort()
  const address = `http://127.0.0.1:${port}`
  const child = spawn(process.execPath, ['--enable-source-maps', 'dist/node/server/index.js'], {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'development', DATA_DIR: data, PORT: String(port), ...environment },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let greeting = ''
  let complaints = ''
  child.stdout.on('data', (chunk: Buffer) => (greeting += chunk.toString()))
  child.stderr.on('data', (chunk: Buffer) => (complaints += chunk.toString()))
  try {
    await answering(address, child)
  } catch (error) {
    throw new Error(`${String(error)}\n${greeting}\n${complaints}`, { cause: error })
  }
  return {
    address,
    get greeting() {
      return greeting
    },
    async stop() {
      if (child.exitCode === null) {
        child.kill('SIGTERM')
        await once(child, 'exit')
      }
      rmSync(data, { recursive: true, force: true })
    },
  }
}
