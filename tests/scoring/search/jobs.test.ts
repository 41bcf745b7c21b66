import { describe, expect, it } from 'vitest'
import { mergeIslands } from '../../../scoring/search/islands.ts'
import {
  type JobError,
  JobSession,
  previewChunk,
  segmentJob,
  type PreviewRow,
} from '../../../scoring/search/jobs.ts'
import { nullSample } from '../../../scoring/search/nullSample.ts'
import { polytopeSource } from '../../../scoring/search/polytopeSource.ts'
import { stateLimitBytes } from '../../../scoring/search/settings.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { expectedBest } from '../../../scoring/search/statistics.ts'
import { bundledEntry, ruleOf } from './problems.ts'

const polytopes = ['w10-64-fan-1-2-4-5-5', 'w12-30-newton-5-7-7-8-9'].map(bundledEntry)
const ruleText =
  'require h11 > 10 let reach = log10(metric.divisor.top) score reach report reach hit reach > -4'
const job = { polytopes, ruleText, method: 'annealing', seed: 5, island: 0, state: null, evaluations: 20 }

type Succeeded<T> = Exclude<T, { readonly error: JobError }>

/** The output of a job that has to succeed. */
function done<T extends object>(output: T): Succeeded<T> {
  if ('error' in output) throw new Error(JSON.stringify(output.error))
  return output as Succeeded<T>
}

function asMessage<T>(value: T): T {
  return JSON.parse(JSON.stringify(value)) as T
}

describe('segment job', () => {
  const settings = { budget: 60, islands: 2, keep: 5 }

  it('gives the same state with and without a session, and through messages', () => {
    const session = new JobSession()
    let [warm, cold]: (SearchState | null)[] = [null, null]
    for (let n = 0; n < 2; n++) {
      warm = done(segmentJob({ ...job, settings, state: warm }, session)).state
      cold = asMessage(done(segmentJob(asMessage({ ...job, settings, state: cold })))).state
    }
    expect(asMessage(warm)).toEqual(cold)
    expect(cold?.evaluations).toBe(30)
  })

  it('merges islands into one list without doubles and a curve that climbs', () => {
    const states = [1, 0].map(
      (island) => done(segmentJob({ ...job, settings, island, evaluations: 100 })).state,
    )
    const { top, progress } = mergeIslands(states, 5)
    expect(progress).toMatchObject({ evaluations: 60, done: true, budget: 60 })
    expect(progress.islands.map(({ island }) => island)).toEqual([0, 1])
    const keys = states.flatMap((state) => state.top.map(({ classKey }) => classKey))
    expect(top.length).toBe(5)
    expect(new Set(top.map(({ classKey }) => classKey)).size).toBe(5)
    expect(top.every(({ classKey }) => keys.includes(classKey))).toBe(true)
    const scores = progress.curve.map(([, score]) => score)
    expect(scores).toEqual([...new Set(scores)].sort((a, b) => a - b))
    expect(scores.at(-1)).toBe(progress.best)
    expect(progress.best).toBe(Math.max(...states.map(({ curve }) => curve[curve.length - 1][1])))
  })

  it('answers with a code for what is wrong', () => {
    const codeOf = (changes: object): string => {
      const output = segmentJob({ ...job, settings, ...changes })
      return 'error' in output ? output.error.code : 'none'
    }
    expect(codeOf({ ruleText: 'score volum' })).toBe('rule.unknown-name')
    expect(codeOf({ method: 'luck' })).toBe('search.method')
    expect(codeOf({ settings: { budget: 0 } })).toBe('search.settings')
    expect(codeOf({ polytopes: [] })).toBe('scope.empty')
    expect(codeOf({ polytopes: [polytopes[0], polytopes[0]] })).toBe('scope.twice')
    expect(codeOf({ polytopes: [{ ...polytopes[0], key: '0'.repeat(32) }] })).toBe('polytope.key')
    expect(codeOf({ state: { schema: 'other' } })).toBe('state.damaged')
    const { state } = done(segmentJob({ ...job, settings }))
    expect(codeOf({ state, method: 'random' })).toBe('state.other-problem')
  })

  it('keeps a state below its limit on the largest polytope', () => {
    const largest = bundledEntry('w491-11-newton-1-1-12-28-42')
    const output = segmentJob({
      ...job,
      polytopes: [largest],
      ruleText: 'score max(c in divisors : c.c2)',
      settings: { budget: 1_000_000, keep: 500 },
      evaluations: 30,
    })
    const { state } = done(output)
    const perFind = JSON.stringify(state.top[0]).length
    expect(JSON.stringify(state).length + (500 - state.top.length) * perFind).toBeLessThan(stateLimitBytes)
  })
})

describe('preview', () => {
  it('is the null sample, portion by portion, with the cost of each stage', () => {
    let time = 0
    const clock = (): number => time++
    const rows: PreviewRow[] = []
    let state: SearchState | null = null
    let output
    for (let n = 0; n < 4; n++) {
      output = done(
        previewChunk({ polytopes, ruleText, size: 40, seed: 9, state, count: 10 }, new JobSession(), clock),
      )
      state = output.state
      rows.push(...output.rows)
    }
    const rule = ruleOf(ruleText)
    const { summary, state: whole } = nullSample({ polytopes: polytopeSource(polytopes), rule }, 9, 40)
    expect(output?.summary).toEqual(summary)
    expect(asMessage(state)).toEqual(asMessage(whole))
    expect(new Set(rows.map(({ classKey }) => classKey)).size).toBe(40)
    for (const { outcome, h11, costs } of rows) {
      expect(outcome.kind).toBe(h11 > 10 ? 'feasible' : 'infeasible')
      expect(Object.keys(costs)).toEqual(h11 > 10 ? ['topology', 'cone', 'metric'] : [])
    }
  })
})

describe('null summary', () => {
  const rule = ruleOf(ruleText)
  const { summary, state } = nullSample({ polytopes: polytopeSource(polytopes), rule }, 9, 200)
  const scores = state.sample.rows.map(({ value }) => value).filter((value) => value < -1)
  scores.sort((a, b) => a - b)

  it('counts every distinct candidate once, those refused included', () => {
    expect(summary).toMatchObject({ size: 200, evaluated: 200, complete: true, undefined: 0 })
    expect(summary.feasible + summary.infeasible).toBe(200)
    expect(summary.feasible).toBe(scores.length)
    expect(new Set(state.sample.rows.map(({ classKey }) => classKey)).size).toBe(200)
    expect(summary.histogram?.counts.reduce((a, b) => a + b)).toBe(summary.feasible)
    expect(summary.law).toContain('quadratic-noise/')
  })

  it('takes the hit rate from the rule, and without its `hit` from the quantile', () => {
    expect(summary.hitLine).toBe('rule')
    expect(summary.hit?.hits).toBe(scores.filter((score) => score > -4).length)
    const plain = ruleOf(ruleText.replace(/ hit .*/, ''))
    const other = nullSample({ polytopes: polytopeSource(polytopes), rule: plain }, 9, 200).summary
    expect(other.hitLine).toBe('quantile')
    expect(other.hit?.hits).toBe(2)
  })

  it('expects the best of one candidate to be the mean, of all to be the best', () => {
    expect(summary.best).toBe(scores.at(-1))
    expect(summary.expectedBest.at(-1)).toEqual([200, summary.best])
    const mean = scores.reduce((a, b) => a + b) / scores.length
    expect(expectedBest(scores, scores.length, 1)).toBeCloseTo(mean, 12)
    const climbing = summary.expectedBest.map(([, score]) => score)
    expect(climbing).toEqual([...climbing].sort((a, b) => a - b))
  })
})
