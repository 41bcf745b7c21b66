import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { assemble, type AssemblyRule } from '../../../scoring/ranking/assemble.ts'
import { compareContenders, type Contender } from '../../../scoring/ranking/rankOrder.ts'
import type { Outcome } from '../../../scoring/rules/outcome.ts'

const feasible = (score: number): Outcome => ({ kind: 'feasible', score, hit: null, report: {} })
const infeasible: Outcome = { kind: 'infeasible', stage: 'cone', shortfall: 1, failed: [] }

const of = (key: string, score: number, polytopeKey = 'p', more: Partial<Contender> = {}): Contender => ({
  key,
  polytopeKey,
  outcome: feasible(score),
  ...more,
})
const all: AssemblyRule = { size: 100, feasibleOnly: false }
const keys = (contenders: readonly Contender[], rule: AssemblyRule) =>
  assemble(contenders, rule).chosen.map(({ contender }) => contender.key)

const outcome: fc.Arbitrary<Outcome> = fc.oneof(
  { weight: 5, arbitrary: fc.integer({ min: -3, max: 3 }).map(feasible) },
  { weight: 1, arbitrary: fc.constant(infeasible) },
  { weight: 1, arbitrary: fc.constant<Outcome>({ kind: 'undefined', reason: 'log of zero', stage: 'cone' }) },
)
const column = fc.option(fc.integer({ min: -2, max: 2 }), { freq: 10 })
/** A key always has the same polytope, outcome, invariants and columns, as candidates have. */
const merged: fc.Arbitrary<Contender[]> = fc
  .uniqueArray(
    fc.record({
      key: fc.integer({ min: 0, max: 60 }).map((n) => `k${n}`),
      polytopeKey: fc.constantFrom('p', 'q', 'r'),
      outcome,
      invariantKey: fc.constantFrom('i', 'j', undefined),
      columns: fc.tuple(column, column),
    }),
    { selector: ({ key }) => key, maxLength: 30 },
  )
  .chain((distinct) =>
    distinct.length === 0
      ? fc.constant([])
      : fc
          .array(fc.nat(distinct.length - 1), { maxLength: 20 })
          .map((again) => [...distinct, ...again.map((at) => distinct[at])]),
  )
const near = (key: string, other: string) => Math.abs(Number(key.slice(1)) - Number(other.slice(1))) < 3
const options = fc.record({
  size: fc.integer({ min: 1, max: 12 }),
  feasibleOnly: fc.boolean(),
  perPolytope: fc.option(fc.integer({ min: 1, max: 3 }), { nil: undefined }),
  perInvariants: fc.option(fc.integer({ min: 1, max: 3 }), { nil: undefined }),
  pareto: fc.option(fc.tuple(fc.constantFrom('max', 'min'), fc.constantFrom('max', 'min')), {
    nil: undefined,
  }),
  apart: fc.boolean(),
})
type Options = typeof options extends fc.Arbitrary<infer T> ? T : never

/** A rule of its own for each call: `admit` remembers what it has taken. */
function ruleOf({ apart, ...rest }: Options): AssemblyRule {
  if (!apart) return rest
  const taken: string[] = []
  return {
    ...rest,
    admit: (key) => {
      if (taken.some((other) => near(key, other))) return false
      taken.push(key)
      return true
    },
  }
}

describe('a list assembled from merged runs', () => {
  it('holds each candidate once, best first, equal scores by key', () => {
    expect(keys([of('c', 1), of('a', 1), of('d', 2), of('a', 1), of('b', 0)], all)).toEqual([
      'd',
      'a',
      'c',
      'b',
    ])
    expect(keys([of('c', 1), of('a', 1), of('d', 2), of('b', 0)], { ...all, size: 2 })).toEqual(['d', 'a'])
  })

  it('leaves out infeasible candidates when asked, else puts them last', () => {
    const two = [of('a', 0, 'p', { outcome: infeasible }), of('b', -9)]
    expect(keys(two, all)).toEqual(['b', 'a'])
    const { chosen, leftOut } = assemble(two, { ...all, feasibleOnly: true })
    expect(chosen.map(({ contender }) => contender.key)).toEqual(['b'])
    expect(leftOut).toEqual({
      infeasible: 1,
      withoutValue: 0,
      polytope: 0,
      invariants: 0,
      near: 0,
      beyond: 0,
    })
  })

  it('takes at most so many of one polytope, and of one invariant key where it is known', () => {
    const list = [
      of('a', 5, 'p', { invariantKey: 'i' }),
      of('b', 4, 'p', { invariantKey: 'i' }),
      of('c', 3, 'q', { invariantKey: 'i' }),
      of('d', 2, 'p'),
      of('e', 1, 'r'),
    ]
    expect(keys(list, { ...all, perPolytope: 1 })).toEqual(['a', 'c', 'e'])
    expect(keys(list, { ...all, perInvariants: 1 })).toEqual(['a', 'd', 'e'])
    const both = assemble(list, { ...all, perPolytope: 1, perInvariants: 1 })
    expect(both.chosen.map(({ contender }) => contender.key)).toEqual(['a', 'e'])
    expect(both.leftOut).toMatchObject({ polytope: 2, invariants: 1 })
    expect(both.withoutInvariants).toBe(2)
  })

  it('ranks by fronts and cuts the last one by score', () => {
    const list = [
      of('a', 9, 'p', { columns: [0, 0] }),
      of('b', 1, 'p', { columns: [2, 1] }),
      of('c', 2, 'p', { columns: [1, 2] }),
      of('d', 3, 'p', { columns: [1, null] }),
      of('e', 4, 'p', { columns: [1, 1] }),
    ]
    const { chosen, leftOut, firstFront } = assemble(list, { ...all, size: 3, pareto: ['max', 'max'] })
    expect(chosen.map(({ contender, front }) => [contender.key, front])).toEqual([
      ['c', 1],
      ['b', 1],
      ['e', 2],
    ])
    expect(leftOut).toMatchObject({ withoutValue: 1, beyond: 1 })
    expect(firstFront).toBe(2)
    expect(keys(list, { ...all, size: 1, pareto: ['min', 'min'] })).toEqual(['a'])
    expect(keys(list, { ...all, size: 2, pareto: ['max', 'min'] })).toEqual(['a', 'b'])
  })

  it('depends on the set alone, keeps the best, and accounts for everyone', () => {
    fc.assert(
      fc.property(merged, options, fc.func(fc.nat()), (list, chosen, die) => {
        const result = assemble(list, ruleOf(chosen))
        const shuffled = list.map((one, at) => ({ one, die: die(at) })).sort((a, b) => a.die - b.die)
        const again = assemble(
          shuffled.map(({ one }) => one),
          ruleOf(chosen),
        )
        expect(again.chosen.map(({ contender }) => contender.key)).toEqual(
          result.chosen.map(({ contender }) => contender.key),
        )
        expect(again.leftOut).toEqual(result.leftOut)
        const left = Object.values(result.leftOut).reduce((sum, count) => sum + count, 0)
        expect(left + result.chosen.length).toBe(result.distinct)
        expect(result.distinct).toBe(new Set(list.map(({ key }) => key)).size)
        expect(result.chosen.length).toBeLessThanOrEqual(chosen.size)
        const ofPolytopes = result.chosen.map(({ contender }) => contender.polytopeKey)
        for (const key of ofPolytopes) {
          const count = ofPolytopes.filter((other) => other === key).length
          expect(count).toBeLessThanOrEqual(chosen.perPolytope ?? Infinity)
        }
      }),
    )
  })

  it('leaves a candidate out only for better ones, by the rule it is counted under', () => {
    fc.assert(
      fc.property(merged, options, (list, chosen) => {
        const { apart, perPolytope, perInvariants, size, pareto } = chosen
        if (pareto !== undefined) return
        const result = assemble(list, ruleOf(chosen))
        const taken = result.chosen.map(({ contender }) => contender)
        for (const one of list) {
          if (taken.some(({ key }) => key === one.key)) continue
          if (chosen.feasibleOnly && one.outcome.kind !== 'feasible') continue
          const better = taken.filter((other) => compareContenders(other, one) < 0)
          const alike = better.filter(({ invariantKey }) => invariantKey === one.invariantKey)
          expect(
            better.length >= size ||
              better.filter(({ polytopeKey }) => polytopeKey === one.polytopeKey).length >=
                (perPolytope ?? Infinity) ||
              (one.invariantKey !== undefined && alike.length >= (perInvariants ?? Infinity)) ||
              (apart && better.some(({ key }) => near(key, one.key))),
          ).toBe(true)
        }
      }),
    )
  })

  it('has no dominated member on its first front, nor an undefined one anywhere', () => {
    fc.assert(
      fc.property(merged, options, (list, chosen) => {
        if (chosen.pareto === undefined) return
        const signs = chosen.pareto.map((direction) => (direction === 'max' ? 1 : -1))
        const considered = list.filter(
          ({ outcome, columns }) =>
            columns!.every((value) => value !== null) &&
            (!chosen.feasibleOnly || outcome.kind === 'feasible'),
        )
        const value = ({ columns }: Contender, axis: number) => signs[axis] * columns![axis]!
        const dominates = (a: Contender, b: Contender) =>
          signs.every((_, axis) => value(a, axis) >= value(b, axis)) &&
          signs.some((_, axis) => value(a, axis) > value(b, axis))
        for (const { contender, front } of assemble(list, ruleOf(chosen)).chosen) {
          expect(contender.columns).not.toContain(null)
          const dominated = considered.some((other) => dominates(other, contender))
          expect(dominated).toBe(front !== 1)
        }
      }),
    )
  })
})
