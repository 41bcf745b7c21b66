import { spawn, type ChildProcess } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createInterface } from 'node:readline'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openDataSource } from '../../server/data-source.ts'
import { Search } from '../../server/entities/search.ts'
import { rankedFinds } from '../../server/services/finds.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))
const rule = 'score log10(metric.divisor.top)\nreport volume\n'
const settings = JSON.stringify({ budget: 240, seed: 3, islands: 2, keep: 30 })

let folder: string
const children = new Set<ChildProcess>()
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-recovery-'))
})
afterAll(() => {
  for (const child of children) child.kill('SIGKILL')
  rmSync(folder, { recursive: true, force: true })
})

/** Starts a server process on a data folder; the lines it reports come through `next`. */
function serve(name: string) {
  const child = spawn(
    process.execPath,
    ['--import', 'tsx', 'tests/server/support/searchProcess.ts', 'w50-7-newton-2-2-3-3-7', rule, settings],
    {
      cwd: root,
      env: {
        PATH: process.env.PATH,
        DATA_DIR: join(folder, name),
        WORKERS: '2',
        LOG_LEVEL: 'silent',
        NODE_ENV: 'test',
      },
      stdio: ['ignore', 'pipe', 'inherit'],
    },
  )
  children.add(child)
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
    async until(fits: () => boolean): Promise<void> {
      while (!fits()) {
        await Promise.race([
          new Promise<void>((resolve) => waiting.add(resolve)),
          gone.then(() => {
            throw new Error(`The process ended early, after: ${lines.join(', ')}`)
          }),
        ])
      }
    },
    async end(signal: 'SIGKILL' | 'SIGTERM'): Promise<void> {
      child.kill(signal)
      await gone
      children.delete(child)
    },
  }
}

const evaluationsOf = (line: string) => Number(line.split(' ')[1])

/** All that a finished search left behind. */
async function result(name: string) {
  const source = await openDataSource(join(folder, name, 'tessellary.sqlite'))
  try {
    const search = await source.manager.findOneByOrFail(Search, {})
    const { evaluationsPerSecond, secondsLeft, ...progress } = search.progress
    void [evaluationsPerSecond, secondsLeft]
    const finds = await rankedFinds(source.manager, [search])
    return {
      state: search.state,
      progress,
      finds: finds.map(({ candidateKey, outcome }) => ({ candidateKey, outcome })),
    }
  } finally {
    await source.destroy()
  }
}

describe('a search whose server is killed', () => {
  it('goes on at the next start from the last committed segment, and ends as an undisturbed one', async () => {
    const whole = serve('undisturbed')
    await whole.until(() => whole.lines.some((line) => line.startsWith('finished')))
    await whole.end('SIGTERM')

    // Killed twice, each time between a commit and the end.
    let committed = 0
    for (let n = 0; n < 2; n += 1) {
      const victim = serve('killed')
      await victim.until(() => victim.lines.some((line) => evaluationsOf(line) > committed + 15))
      await victim.end('SIGKILL')
      const first = victim.lines.find((line) => line.startsWith('running')) ?? ''
      // What was committed before is not done again.
      expect(evaluationsOf(first)).toBeGreaterThanOrEqual(committed)
      committed = Math.max(...victim.lines.map(evaluationsOf))
      expect(committed).toBeLessThan(240)
    }
    const heir = serve('killed')
    await heir.until(() => heir.lines.some((line) => line.startsWith('finished')))
    expect(evaluationsOf(heir.lines[0])).toBeGreaterThanOrEqual(committed)
    await heir.end('SIGTERM')

    const [undisturbed, killed] = [await result('undisturbed'), await result('killed')]
    expect(undisturbed.state).toBe('finished')
    expect(undisturbed.progress.evaluations).toBe(240)
    expect(killed).toEqual(undisturbed)
  }, 240_000)
})
