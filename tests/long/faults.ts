/**
 * Kills a server process at 20 moments of a search, chosen by a seed, and lets it run on a disk that gets full; both
 * must end as an undisturbed run does, to the bit, with a sound database. Takes some minutes. By hand:
 *
 *     nice node --import tsx tests/long/faults.ts [--kills N] [--budget N] [--seed N]
 *
 * The full disk is a file system in memory, which only root may mount; without that the part is left out. Ends with
 * status 1 when a result differs.
 */
import { execFileSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, rmSync, statfsSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { isDeepStrictEqual, parseArgs } from 'node:util'
import { RandomStream, seededState } from '../../scoring/search/randomStream.ts'
import { leftBehind } from '../server/support/leftBehind.ts'
import { startServerProcess, type ServerProcess } from '../server/support/serverProcess.ts'

const { values } = parseArgs({
  options: {
    kills: { type: 'string', default: '20' },
    budget: { type: 'string', default: '20000' },
    seed: { type: 'string', default: '1' },
  },
})
const [kills, budget, seed] = [values.kills, values.budget, values.seed].map(Number)

const folder = mkdtempSync(join(tmpdir(), 'tessellary-faults-'))
const start = (place: string) =>
  startServerProcess(place, {
    polytope: 'w50-7-newton-2-2-3-3-7',
    rule: 'score log10(metric.divisor.top)\nreport volume\n',
    settings: { budget, seed, islands: 4, keep: 100 },
    segmentMilliseconds: 300,
  })
const ended = (lines: readonly string[]) => lines.some((line) => line.startsWith('finished'))
const evaluations = ({ lines }: ServerProcess) =>
  lines.flatMap((line) => (/^(running|finished) \d/.test(line) ? [Number(line.split(' ')[1])] : []))

let failed = false
function compare(what: string, one: object, other: object): void {
  const same = isDeepStrictEqual(one, other)
  if (!same) failed = true
  process.stdout.write(`${what}: ${same ? 'the same result' : 'ANOTHER RESULT'}\n`)
  if (same) return
  for (const [key, value] of Object.entries(one)) {
    const wanted = (other as Record<string, unknown>)[key]
    if (isDeepStrictEqual(value, wanted)) continue
    process.stdout.write(`${key}: ${JSON.stringify(value)}\n  in place of ${JSON.stringify(wanted)}\n`)
  }
}

try {
  const whole = start(join(folder, 'undisturbed'))
  await whole.until(ended)
  await whole.end('SIGTERM')
  const undisturbed = await leftBehind(join(folder, 'undisturbed'))
  process.stdout.write(`undisturbed: ${undisturbed.state}, ${undisturbed.progress.evaluations} evaluations\n`)

  const random = new RandomStream(seededState(seed))
  let committed = 0
  let made = 0
  while (made < kills) {
    const victim = start(join(folder, 'killed'))
    // Counted in reports, so that a busy machine gets as far as a quiet one; then somewhere in the next piece.
    const reports = 1 + Math.floor(12 * random.uniform())
    const reported = (line: string) => /^(running|finished)/.test(line)
    await victim.until((lines) => ended(lines) || lines.filter(reported).length >= reports)
    const pause = Math.floor(400 * random.uniform())
    await new Promise((resolve) => setTimeout(resolve, pause))
    if (ended(victim.lines)) {
      await victim.end('SIGTERM')
      break
    }
    await victim.end('SIGKILL')
    made += 1
    const counts = evaluations(victim)
    if (Math.min(...counts) < committed) {
      failed = true
      process.stdout.write(`LOST: ${committed} were committed, then ${Math.min(...counts)}\n`)
    }
    committed = Math.max(...counts)
    process.stdout.write(`killed ${pause} ms after report ${reports}, at ${committed} evaluations\n`)
  }
  const heir = start(join(folder, 'killed'))
  await heir.until(ended)
  await heir.end('SIGTERM')
  compare(`killed ${made} times`, await leftBehind(join(folder, 'killed')), undisturbed)
  if (made < kills) process.stdout.write(`the search ended before ${kills} kills: take a larger budget\n`)

  const disk = join(folder, 'disk')
  mkdirSync(disk)
  if (mounted(disk)) {
    try {
      await onFullDisk(disk)
      compare('a full disk', await leftBehind(disk), undisturbed)
    } finally {
      execFileSync('umount', [disk])
    }
  } else process.stdout.write('a full disk: left out, nothing may be mounted here\n')
} finally {
  rmSync(folder, { recursive: true, force: true })
}
process.exit(failed ? 1 : 0)

function mounted(place: string): boolean {
  try {
    execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=24m', 'tmpfs', place], { stdio: 'ignore' })
    return true
  } catch {
    return false
  }
}

async function onFullDisk(disk: string): Promise<void> {
  const server = start(disk)
  await server.until((lines) => lines.some((line) => /^running [1-9]/.test(line)))
  const { bavail, bsize } = statfsSync(disk)
  const filler = join(disk, 'filler')
  writeFileSync(filler, Buffer.alloc(bavail * bsize))
  await server.until((lines) => lines.some((line) => line === 'held storage-full'))
  const at = Math.max(...evaluations(server))
  process.stdout.write(`the disk is full at ${at} evaluations; the server holds the search\n`)
  await new Promise((resolve) => setTimeout(resolve, 3_000))
  rmSync(filler)
  await server.until(ended)
  await server.end('SIGTERM')
}
