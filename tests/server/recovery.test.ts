import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openDataSource } from '../../server/data-source.ts'
import { Search } from '../../server/entities/search.ts'
import { rankedFinds } from '../../server/services/finds.ts'
import { startServerProcess } from './support/serverProcess.ts'

const budget = 240
const search = {
  polytope: 'w50-7-newton-2-2-3-3-7',
  rule: 'score log10(metric.divisor.top)\nreport volume\n',
  settings: { budget, seed: 3, islands: 2, keep: 30 },
}

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-recovery-'))
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const serve = (name: string) => startServerProcess(join(folder, name), search)

/** Evaluations that the reports of a process tell of. */
const evaluations = (lines: readonly string[]): number[] =>
  lines
    .map((line) => line.split(' '))
    .flatMap(([word, count]) => (word === 'running' || word === 'finished' ? [Number(count)] : []))

/** All that a finished search left behind. */
async function result(name: string) {
  const source = await openDataSource(join(folder, name, 'tessellary.sqlite'))
  try {
    const done = await source.manager.findOneByOrFail(Search, {})
    const finds = await rankedFinds(source.manager, [done])
    return {
      state: done.state,
      // The pace is of the clock; all else is of the search.
      progress: { ...done.progress, evaluationsPerSecond: null, secondsLeft: null },
      finds: finds.map(({ candidateKey, outcome }) => ({ candidateKey, outcome })),
    }
  } finally {
    await source.destroy()
  }
}

describe('a search whose server is killed', () => {
  it('goes on at the next start from the last committed segment, and ends as an undisturbed one', async () => {
    const whole = serve('undisturbed')
    await whole.until((lines) => lines.some((line) => line.startsWith('finished')))
    await whole.end('SIGTERM')

    // Killed twice, each time between a commit and the end.
    let committed = 0
    for (let n = 0; n < 2; n += 1) {
      const victim = serve('killed')
      await victim.until((lines) => evaluations(lines).some((count) => count > committed + 15))
      await victim.end('SIGKILL')
      const counts = evaluations(victim.lines)
      // What was committed before is not done again.
      expect(Math.min(...counts)).toBeGreaterThanOrEqual(committed)
      committed = Math.max(...counts)
      expect(committed).toBeLessThan(budget)
    }
    const heir = serve('killed')
    await heir.until((lines) => lines.some((line) => line.startsWith('finished')))
    expect(Math.min(...evaluations(heir.lines))).toBeGreaterThanOrEqual(committed)
    await heir.end('SIGTERM')

    const [undisturbed, killed] = [await result('undisturbed'), await result('killed')]
    expect(undisturbed.state).toBe('finished')
    expect(undisturbed.progress.evaluations).toBe(budget)
    expect(undisturbed.finds).toHaveLength(30)
    expect(killed).toEqual(undisturbed)
  }, 240_000)
})
