import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { flip, flippableEdges } from '../../../scoring/geometry/flips.ts'
import { isRegular } from '../../../scoring/geometry/regularity.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { heightsOfCode } from '../../../scoring/search/heightsCode.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

describe('annealing where classes have few neighbours', () => {
  const rule = 'score max(d in divisors : d.cubic) + 0.01 * sum(d in divisors : abs(d.cubic))'
  const settings = { budget: 400, keep: 400, sample: 0 }
  const problem = problemOf(['w12-30-newton-5-7-7-8-9'], rule, 'annealing', settings)

  it('has tried all neighbours of the best class', () => {
    const keys = new Set<string>()
    const { state } = advance(problem, startState(problem, 1), Infinity, {
      observe: ({ classKey }) => keys.add(classKey),
    })
    const form = problem.polytopes.at(0)
    const best = fineClass(form.polytope, heightsOfCode(state.top[0].heights))
    if (best === undefined) throw new Error('kept heights are fine')
    const neighbours = flippableEdges(best)
      .map((edge) => flip(best, edge))
      .filter((cls) => cls !== undefined && isRegular(cls).regular)
      .map((cls) => cls && canonicalClass(form, cls).key)
    expect(neighbours.length).toBeGreaterThan(3)
    for (const key of neighbours) expect(keys).toContain(key)
  })

  it('ends the same however it is cut', () => {
    const whole = JSON.stringify(advance(problem, startState(problem, 2), Infinity).state)
    let state = startState(problem, 2)
    for (let cut = 0; cut < 40; cut++) {
      state = JSON.parse(JSON.stringify(advance(problem, state, 7).state)) as SearchState
    }
    expect(JSON.stringify(advance(problem, state, Infinity).state)).toBe(whole)
  })
})
