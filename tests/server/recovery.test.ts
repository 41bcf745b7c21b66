import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openDataSource } from '../../server/data-source.ts'
import { CertificateRecord } from '../../server/entities/certificate.ts'
import { Certification } from '../../server/entities/certification.ts'
import { CertificationTask } from '../../server/entities/certificationTask.ts'
import { leftBehind } from './support/leftBehind.ts'
import { startProcess, startServerProcess } from './support/serverProcess.ts'

const budget = 120
const search = {
  polytope: 'w50-7-newton-2-2-3-3-7',
  rule: 'score log10(metric.divisor.top)\nreport volume\n',
  settings: { budget, seed: 3, islands: 2, keep: 30 },
  segmentMilliseconds: 40,
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
const result = (name: string) => leftBehind(join(folder, name))

describe('a search whose server is killed', () => {
  it('goes on at the next start from the last committed segment, and ends as an undisturbed one', async () => {
    const whole = serve('undisturbed')
    await whole.until((lines) => lines.some((line) => line.startsWith('finished')))
    await whole.end('SIGTERM')

    // Killed twice: between commits, and past the middle.
    let committed = 0
    for (const further of [5, 40]) {
      const victim = serve('killed')
      await victim.until((lines) => evaluations(lines).some((count) => count > committed + further))
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
    expect(undisturbed).toMatchObject({ state: 'finished', integrity: 'ok' })
    expect(undisturbed.progress.evaluations).toBe(budget)
    expect(undisturbed.finds).toHaveLength(30)
    expect(killed).toEqual(undisturbed)
  }, 240_000)
})

describe('a request for many certificates whose server is killed', () => {
  it('goes on at the next start with those that were left, and makes none twice', async () => {
    const size = 16
    const place = join(folder, 'certificates')
    const work = () => startProcess(place, 'certificationProcess.ts', [String(size)])
    const done = (lines: readonly string[]) =>
      lines.map((line) => line.split(' ')).map(([, made]) => Number(made))
    const read = async () => {
      const source = await openDataSource(join(place, 'tessellary.sqlite'))
      try {
        const [request] = await source.manager.find(Certification)
        return {
          request,
          certificates: await source.manager.find(CertificateRecord),
          tasks: await source.manager.find(CertificationTask, { order: { place: 'ASC' } }),
        }
      } finally {
        await source.destroy()
      }
    }

    const victim = work()
    await victim.until((lines) => done(lines).some((made) => made >= 3))
    await victim.end('SIGKILL')
    const before = await read()
    expect(before.request.state).toBe('running')
    expect(before.certificates.length).toBeGreaterThanOrEqual(3)
    expect(before.certificates.length).toBeLessThan(size)

    const heir = work()
    await heir.until((lines) => lines.some((line) => line.startsWith('finished')))
    expect(Math.min(...done(heir.lines))).toBeGreaterThanOrEqual(before.certificates.length)
    await heir.end('SIGTERM')
    const after = await read()
    expect(after.request).toMatchObject({ state: 'finished', leaseOwner: null })
    expect(after.tasks.map(({ state }) => state)).toEqual(Array.from({ length: size }, () => 'passed'))
    expect(new Set(after.certificates.map(({ candidateKey }) => candidateKey)).size).toBe(size)
    expect(after.certificates).toHaveLength(size)
    const kept = new Set(after.certificates.map(({ id }) => id))
    expect(before.certificates.every(({ id }) => kept.has(id))).toBe(true)
  }, 240_000)
})
