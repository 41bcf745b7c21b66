import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { transportClass } from '../../../scoring/geometry/transport.ts'
import type { TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { walkLine } from '../../../scoring/geometry/walkLine.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { evaluateRule } from '../../../scoring/rules/evaluate.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import { witnessHeights } from '../../../scoring/search/witness.ts'
import { problemOf } from './problems.ts'

const rule = 'score metric.divisor.top report metric.basis.top, volume, m = min(d in divisors : d.volume)'

describe.each(['w20-76-fan-1-3-3-7-10', 'w50-7-newton-2-2-3-3-7'])('the value of a class on %s', (id) => {
  const problem = problemOf([id], rule, 'random', { budget: 1 })
  const form = problem.polytopes.at(0)
  const valueOf = (cls: TwoFaceClass): string => {
    const { class: canonical, key } = canonicalClass(form, cls)
    return key + JSON.stringify(evaluateRule(problem.rule, buildCandidate(form, canonical, key)))
  }

  it('is the same to the bit along twenty paths and through equivalent classes', () => {
    const stream = new RandomStream(seededState(1))
    const target = drawNull(form.polytope, stream)
    const inside = witnessHeights(target.class, target.heights)
    const values = new Set<string>([valueOf(target.class)])
    let walked = 0
    for (let path = 0; path < 20; path++) {
      // Walk from elsewhere straight at the target's heights and beyond; the class is met on the way, if not passed.
      let start = drawNull(form.polytope, stream)
      while (start.class.triangles.join() === target.class.triangles.join()) {
        start = drawNull(form.polytope, stream)
      }
      const from = witnessHeights(start.class, start.heights)
      const direction = Float64Array.from(inside, (height, p) => height - from[p])
      const walk = walkLine(start.class, from, direction, 400)
      const met = walk.steps.find(({ class: cls }) => cls.triangles.join() === target.class.triangles.join())
      valueOf(start.class)
      if (met !== undefined) {
        values.add(valueOf(met.class))
        walked++
      }
      const image = form.automorphisms[path % form.automorphisms.length]
      values.add(valueOf(transportClass(target.class, image, form.polytope)))
    }
    expect(walked).toBeGreaterThan(10)
    expect(form.automorphisms.length).toBeGreaterThan(1)
    expect([...values]).toEqual([valueOf(target.class)])
  })
})
