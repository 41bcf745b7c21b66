import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { crossings } from '../../../scoring/search/crossover.ts'
import { commonTriangles } from '../../../scoring/search/likeness.ts'
import { OutcomeMemo } from '../../../scoring/search/memo.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const id = 'w20-17-newton-4-4-5-5-7'
const polytope = problemOf([id], 'score h11', 'random', { budget: 1 }).polytopes.at(0).polytope

describe.each([...crossings.keys()])('crossing %i', (kind) => {
  it('gives children of both parents, with heights that show them to be regular', () => {
    let mixed = 0
    let regular = 0
    fc.assert(
      fc.property(fc.nat(), (seed) => {
        const stream = new RandomStream(seededState(seed))
        const [one, other] = [drawNull(polytope, stream), drawNull(polytope, stream)]
        const child = crossings[kind](one, other, stream)
        const heights = child?.heights()
        if (child === undefined || heights === undefined) return
        regular++
        expect(isGeneric(child.class, heights)).toBe(true)
        if (kind === 0) return
        // Every 2-face is one of the parents'.
        const all = polytope.twoFaces.map((_, f) =>
          [one.class, other.class, child.class].map((cls) => onFace(cls, f)),
        )
        for (const [mine, theirs, childs] of all) expect([mine, theirs]).toContain(childs)
        if (all.some(([mine, , childs]) => mine !== childs)) mixed++
      }),
      { numRuns: 40 },
    )
    expect(regular).toBeGreaterThan(20)
    if (kind === 1) expect(mixed).toBeGreaterThan(10)
  })

  const onFace = (
    { triangles, faceOf }: { triangles: Int32Array; faceOf: Int32Array },
    face: number,
  ): string =>
    [...faceOf.keys()]
      .filter((t) => faceOf[t] === face)
      .map((t) => triangles.subarray(3 * t, 3 * t + 3).join())
      .join(' ')
})

describe('likeness', () => {
  it('counts common triangles', () => {
    const stream = new RandomStream(seededState(4))
    const [one, other] = [drawNull(polytope, stream).class, drawNull(polytope, stream).class]
    const names = ({ triangles, faceOf }: typeof one): string[] =>
      [...faceOf.keys()].map((t) => triangles.subarray(3 * t, 3 * t + 3).join())
    const mine = new Set(names(one))
    expect(commonTriangles(one, other)).toBe(names(other).filter((name) => mine.has(name)).length)
    expect(commonTriangles(one, one)).toBe(one.faceOf.length)
  })
})

describe('genetic search', () => {
  const memo = new OutcomeMemo()
  const settings = { budget: 610, keep: 10 }
  const rule = 'score log10(metric.divisor.top)'
  const problem = problemOf([id], rule, 'genetic', settings)
  const run = (seed: number): SearchState =>
    advance(problem, startState(problem, seed), Infinity, { memo }).state

  interface Chain {
    readonly populations: readonly (readonly { readonly key: string; readonly value: number }[])[]
    readonly migrations: number
  }

  it('beats as many random candidates, keeps its best and holds each class once in a population', () => {
    const random = problemOf([id], rule, 'random', settings)
    const best = (state: SearchState): number => state.curve[state.curve.length - 1][1]
    const state = run(1)
    expect(best(state)).toBeGreaterThan(
      best(advance(random, startState(random, 1), Infinity, { memo }).state),
    )
    const { populations, migrations } = state.chain as unknown as Chain
    expect(populations.length).toBe(2)
    expect(migrations).toBe(5)
    for (const members of populations)
      expect(new Set(members.map(({ key }) => key)).size).toBe(members.length)
    expect(Math.max(...populations.flat().map(({ value }) => value))).toBe(best(state))
  })
})
