import { spawn } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync, watch, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, describe, expect, it } from 'vitest'
import { caution } from '../../../scoring/caution.ts'
import { runCommand } from '../../../scoring/cli/command.ts'

const cli = fileURLToPath(new URL('../../../scoring/cli.ts', import.meta.url))
const folder = mkdtempSync(join(tmpdir(), 'tessellary-cli-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

interface Ended {
  readonly status: number | null
  readonly output: string
  readonly errors: string[]
}

function start(args: string[]) {
  return spawn(process.execPath, ['--import', 'tsx', cli, ...args], { stdio: ['pipe', 'pipe', 'pipe'] })
}

async function ended(child: ReturnType<typeof start>, input = ''): Promise<Ended> {
  let output = ''
  let errors = ''
  child.stdout.setEncoding('utf8').on('data', (text: string) => (output += text))
  child.stderr.setEncoding('utf8').on('data', (text: string) => (errors += text))
  child.stdin.on('error', () => undefined)
  child.stdin.end(input)
  const status = await new Promise<number | null>((resolve) => child.on('close', resolve))
  return { status, output, errors: errors.split('\n').filter((line) => line !== '') }
}

/** The command without a process of its own. */
async function run(...args: string[]): Promise<Ended> {
  let output = ''
  const errors: string[] = []
  const status = await runCommand(args, {
    out: (line) => (output += `${line}\n`),
    err: (line) => errors.push(line),
  })
  return { status, output, errors }
}

function inFile(name: string, content: unknown): string {
  const file = join(folder, name)
  writeFileSync(file, JSON.stringify(content))
  return file
}

interface Line {
  readonly kind: string
  readonly [field: string]: unknown
}

const linesOf = (output: string): Line[] =>
  output
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as Line)

describe('evaluate', () => {
  const quintic = { weights: [1, 1, 1, 1, 1], side: 'fan', show: ['c2'] }

  it('prints one evaluation for one input, from standard input too', async () => {
    const { status, output, errors } = await ended(start(['evaluate', '-']), JSON.stringify(quintic))
    expect([status, errors]).toEqual([0, []])
    expect(JSON.parse(output)).toMatchObject({
      schema: 'tessellary.evaluation/1',
      hodge: { h11: 1, h21: 101, euler: -200 },
      c2: [50, 50, 50, 50, 50],
      caution,
    })
  })

  it('puts an error in the place of a bad element and ends with status 2', async () => {
    const file = inFile('list.json', [quintic, { vertices: [[1, 2]] }, quintic])
    const { status, output, errors } = await run('evaluate', file)
    expect(status).toBe(2)
    const list = JSON.parse(output) as { error?: unknown; classKey?: string }[]
    expect(list.length).toBe(3)
    expect(list[0]).toEqual(list[2])
    expect(list[1]).toMatchObject({ error: { code: 'polytope.wrong-shape', path: '[1].vertices[0]' } })
    expect(errors).toEqual([expect.stringMatching(/^polytope\.wrong-shape \[1\]\.vertices\[0\]: Point 1 /)])
  })

  it('prints nothing but one line per error for bad input', async () => {
    const bad = [
      [['evaluate', inFile('bad.json', { ...quintic, rule: 'score\nvolum' })], /^rule\.\S+ rule: line 2, /],
      [['evaluate', join(folder, 'none.json')], /^input\.unreadable: /],
      [['evaluate'], /^usage: /],
      [['frobnicate'], /^usage: /],
    ] as const
    for (const [args, line] of bad) {
      const { status, output, errors } = await run(...args)
      expect([status, output]).toEqual([2, ''])
      expect(errors).toEqual([expect.stringMatching(line)])
    }
    const broken = join(folder, 'broken.json')
    writeFileSync(broken, '{')
    const { status, errors } = await run('evaluate', broken)
    expect(status).toBe(2)
    expect(errors).toEqual([expect.stringMatching(/^input\.not-json: /)])
  })
})

describe('certify', () => {
  const input = { weights: [1, 1, 1, 6, 9], side: 'fan', rule: 'score log10(metric.divisor.top)' }

  it('makes a certificate, re-checks it, and tells a failure from a file that is none', async () => {
    const made = await run('certify', inFile('quick.json', input), '--make')
    expect([made.status, made.errors]).toEqual([0, []])
    const certificate = JSON.parse(made.output) as { passed: boolean; numbers: { c2: number[] } }
    expect(certificate).toMatchObject({ schema: 'tessellary.certificate/1', passed: true, caution })
    const again = await run('certify', inFile('certificate.json', certificate))
    expect([again.status, again.errors]).toEqual([0, []])
    expect(JSON.parse(again.output)).toMatchObject({
      schema: 'tessellary.recheck/1',
      passed: true,
      problems: [],
    })

    certificate.numbers.c2[0] += 12
    const forged = await run('certify', inFile('forged.json', certificate))
    expect([forged.status, (JSON.parse(forged.output) as { passed: boolean }).passed]).toEqual([1, false])
    const other = await run('certify', inFile('uncertified.json', input))
    expect(other.status).toBe(2)
    const truncated = join(folder, 'truncated.json')
    writeFileSync(truncated, made.output.slice(0, 3000))
    const cut = await run('certify', truncated)
    expect([cut.status, cut.output]).toEqual([2, ''])
    expect(cut.errors).toEqual([expect.stringMatching(/^input\.not-json: /)])
    const unfine = { ...input, heights: { points: [[1, 0, 0, 0]], values: [0] } }
    const bad = await run('certify', inFile('unfine.json', unfine), '--make')
    expect([bad.status, bad.output, bad.errors.length]).toEqual([2, '', 1])
  })
})

describe('search', () => {
  const spec = {
    schema: 'tessellary.search/1',
    scope: {
      polytopes: [
        { weights: [7, 7, 9, 10, 11], side: 'newton' },
        { weights: [1, 2, 4, 5, 5], side: 'fan' },
      ],
    },
    rule: 'require min(d in divisors : d.volume) > 0.1 score log10(metric.divisor.top)',
    budget: 60,
    seed: 3,
    islands: 2,
    keep: 5,
    null: { size: 30 },
  }
  const file = inFile('spec.json', spec)

  it('ends with the same final line whatever the number of threads and however it is interrupted', async () => {
    const state = join(folder, 'state.json')
    const interrupted = start(['search', file, '--threads', '1', '--state', state])
    // Killed as soon as a state was committed, with no chance to tidy up.
    const watcher = watch(folder, () => {
      if (existsSync(state)) interrupted.kill('SIGKILL')
    })
    const first = await ended(interrupted)
    watcher.close()
    const one = await run('search', file, '--threads', '1')
    const three = await run('search', file, '--threads', '3')
    expect([one.status, one.errors, three.status, three.errors]).toEqual([0, [], 0, []])
    const lines = linesOf(one.output)
    expect(new Set(lines.map(({ kind }) => kind))).toEqual(new Set(['start', 'progress', 'find', 'final']))
    const final = lines.at(-1)
    expect(linesOf(three.output).at(-1)).toEqual(final)

    expect(first.status).toBeNull()
    expect(readFileSync(state, 'utf8')).toContain('tessellary.run/1')
    const resumed = await run('search', file, '--threads', '2', '--state', state)
    expect(linesOf(resumed.output).at(-1)).toEqual(final)

    expect(final).toMatchObject({
      kind: 'final',
      caution,
      method: 'annealing',
      progress: { evaluations: 60, done: true },
      statistics: { law: null, exact: false, hitLine: 'quantile', easy: false },
      null: { size: 30, evaluated: 30, complete: true },
    })
    const top = final?.top as { classKey: string; score: { value: number } }[]
    expect(top.length).toBe(5)
    expect(new Set(top.map(({ classKey }) => classKey)).size).toBe(5)
    const scores = top.map(({ score }) => score.value)
    expect(scores).toEqual([...scores].sort((a, b) => b - a))
  })

  it('refuses a state of another search and a wrong specification', async () => {
    const state = join(folder, 'other.json')
    const small = { ...spec, budget: 4, islands: 1, null: undefined }
    await run('search', inFile('small.json', small), '--state', state)
    const other = await run('search', inFile('longer.json', { ...small, keep: 6 }), '--state', state)
    expect(other.status).toBe(2)
    expect(other.errors).toEqual([expect.stringMatching(/^state\.other-problem: /)])
    const seeded = await run('search', inFile('seeded.json', { ...small, seed: 4 }), '--state', state)
    expect(seeded.errors).toEqual([expect.stringMatching(/^state\.other-problem --state: .*seed 3/)])
    const method = await run('search', inFile('method.json', { ...spec, method: 'luck' }))
    expect([method.status, method.output]).toEqual([2, ''])
    expect(method.errors).toEqual([
      expect.stringMatching(/^search\.method method: .*auto, annealing, .*random/),
    ])
    const polytope = { ...spec, scope: { polytopes: [{ weights: [1, 1, 1, 1, 1] }] } }
    const scope = await run('search', inFile('scope.json', polytope))
    expect(scope.errors).toEqual([expect.stringMatching(/^input\.no-side scope\.polytopes\[0\]\.side: /)])
  })
})
