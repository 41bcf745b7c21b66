import { describe, expect, it } from 'vitest'
import { searchSpec, specOf } from '../../../scoring/cli/searchSpec.ts'
import { InputError } from '../../../scoring/errors.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { nullLawNames, nullLaws } from '../../../scoring/search/nullLaws.ts'
import { nullSample } from '../../../scoring/search/nullSample.ts'
import { problemDigest } from '../../../scoring/search/problem.ts'
import { searchStatistics } from '../../../scoring/search/searchStatistics.ts'
import { problemOf } from './problems.ts'

const scope = ['w20-17-newton-4-4-5-5-7']
const rule = 'score count(p in pairs : p.aab == -1)'

describe('laws of null samples', () => {
  const problem = problemOf(scope, rule, 'random', { budget: 30 })

  it('draw different candidates, and each summary says by which law', () => {
    const keys = nullLawNames.map((law) => {
      const { state, summary } = nullSample(problem, 1, 30, {}, law)
      expect(summary.law).toBe(`${nullLaws[law].name}: ${nullLaws[law].description}`)
      expect(summary.evaluated).toBe(30)
      return state.top.map(({ classKey }) => classKey)
    })
    expect(keys[0].filter((key) => keys[1].includes(key)).length).toBeLessThan(10)
  })

  it('are a setting of the method random, whose usual value leaves a problem what it was', () => {
    const withLaw = (law: 'quadratic' | 'potentials') => problemOf(scope, rule, 'random', { budget: 30, law })
    expect(problemDigest(withLaw('quadratic'))).toBe(problemDigest(problem))
    expect(problemDigest(withLaw('potentials'))).not.toBe(problemDigest(problem))
    const other = withLaw('potentials')
    const { state } = advance(other, startState(other, 1), 5)
    expect(searchStatistics([state], null, other.rule).law).toContain('facet-potentials/1: ')
    const usual = advance(problem, startState(problem, 1), 5).state
    expect(searchStatistics([usual], null, problem.rule).law).toContain('quadratic-noise/1: ')
  })

  it('are named in a specification of a search', () => {
    const spec = (law: string) => ({
      schema: 'tessellary.search/1',
      scope: { polytopes: [{ weights: [1, 1, 1, 6, 9], side: 'fan' }] },
      rule: 'score h11',
      budget: 5,
      null: { size: 10, seed: 3, law },
    })
    const read = searchSpec(spec('potentials'))
    expect(read.null).toEqual({ size: 10, seed: 3, law: 'potentials' })
    expect(searchSpec(specOf(read))).toEqual(read)
    expect(() => searchSpec(spec('uniform'))).toThrow(InputError)
  })
})
