import { spawn } from 'node:child_process'
import { createInterface } from 'node:readline'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../../..', import.meta.url))

/** A server in a process of its own, with the lines it reports. */
export interface ServerProcess {
  readonly lines: readonly string[]
  /** Resolves when the lines fit; rejects when the process ends first. */
  until(fits: (lines: readonly string[]) => boolean): Promise<void>
  end(signal: 'SIGKILL' | 'SIGTERM'): Promise<void>
}

export interface SearchSettings {
  readonly budget: number
  readonly seed: number
  readonly islands: number
  readonly keep: number
}

export function startServerProcess(
  folder: string,
  search: {
    readonly polytope: string
    readonly rule: string
    readonly settings: SearchSettings
    /** Shorter than usual gives more moments between commits. */
    readonly segmentMilliseconds?: number
  },
): ServerProcess {
  const { polytope, rule, settings, segmentMilliseconds } = search
  const length = segmentMilliseconds === undefined ? [] : [String(segmentMilliseconds)]
  return startProcess(folder, 'searchProcess.ts', [polytope, rule, JSON.stringify(settings), ...length])
}

/** Runs a script of this folder as a server process. */
export function startProcess(folder: string, script: string, words: readonly string[]): ServerProcess {
  const child = spawn(process.execPath, ['--import', 'tsx', `tests/server/support/${script}`, ...words], {
    cwd: root,
    env: { PATH: process.env.PATH, DATA_DIR: folder, WORKERS: '2', LOG_LEVEL: 'silent', NODE_ENV: 'test' },
    stdio: ['ignore', 'pipe', 'inherit'],
  })
  // Also when the test that started it fails.
  const kill = () => child.kill('SIGKILL')
  process.once('exit', kill)
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()))
  const lines: string[] = []
  const waiting = new Set<() => void>()
  createInterface({ input: child.stdout }).on('line', (line) => {
    lines.push(line)
    waiting.forEach((resolve) => resolve())
    waiting.clear()
  })
  return {
    lines,
    async until(fits) {
      while (!fits(lines)) {
        const next = new Promise<'line'>((resolve) => waiting.add(() => resolve('line')))
        const first = await Promise.race([next, gone.then(() => 'gone' as const)])
        if (first === 'gone') throw new Error(`The process ended early, after: ${lines.join(', ')}`)
      }
    },
    async end(signal) {
      child.kill(signal)
      await gone
      process.off('exit', kill)
    },
  }
}
