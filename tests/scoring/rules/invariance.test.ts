import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm, type NormalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { transportClass } from '../../../scoring/geometry/transport.ts'
import { fineClass, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { type Cell, checkRule, evaluateRule } from '../../../scoring/rules/index.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { isomorphicCopy, unimodular } from '../classes/copies.ts'
import { everyReading, patterns } from './everyReading.ts'

const columns = [...everyReading, ...patterns]
const checked = checkRule(
  `score volume\n${columns.map((reading, at) => `report r${at} = ${reading}`).join('\n')}`,
)

/** What every reading gives on a class as it stands, without taking its canonical representative. */
function readingsOf(form: NormalForm, cls: TwoFaceClass): Cell[] {
  if (!checked.ok) throw new Error(checked.issues[0].message)
  const outcome = evaluateRule(checked.rule, buildCandidate({ ...form, polytope: cls.polytope }, cls, 'any'))
  if (outcome.kind !== 'feasible') throw new Error(JSON.stringify(outcome))
  return columns.map((_, at) => outcome.report[`r${at}`])
}

/** Integers, truth values and undefined cells agree exactly, numbers to seven digits. */
function expectSame(found: readonly Cell[], first: readonly Cell[]): void {
  if (!checked.ok) throw new Error('the readings check')
  found.forEach((cell, at) => {
    const value = first[at].value
    const measured = checked.rule.report[at].type === 'number' && typeof value === 'number'
    const wanted = measured
      ? expect.closeTo(value, 7 - Math.ceil(Math.log10(Math.abs(value) + 1e-30)))
      : value
    expect([columns[at], cell.value]).toEqual([columns[at], wanted])
  })
}

function classOf(form: NormalForm, seed: number): TwoFaceClass {
  const cls = fineClass(form.polytope, quadraticHeights(form.polytope, { seed, noise: 0.45 }))
  if (!cls) throw new Error('quadratic heights with noise below 1/2 are fine')
  return cls
}

/** Polytopes with several automorphisms, favourable and not, and some larger ones. */
const vertices = [
  ...bundledPolytopes('small').filter((_, at) => at % 97 === 5),
  ...['w7-106', 'w8-77', 'w12-62', 'w18-72'].map(largePolytope),
].map((entry) => entry.vertices)

describe('what a rule can say about a candidate', () => {
  it('reads every observable', () => {
    expect(checked.issues).toEqual([])
  })

  it('does not change under automorphisms', () => {
    let images = 0
    for (const rows of vertices) {
      const form = normalForm(polytopeFromPoints(rows))
      const cls = classOf(form, 3)
      const first = readingsOf(form, cls)
      for (const permutation of form.automorphisms.slice(1, 5)) {
        expectSame(readingsOf(form, transportClass(cls, permutation, form.polytope)), first)
        images++
      }
    }
    expect(images).toBeGreaterThan(20)
  })

  it('does not change with coordinates, and so with the order of points', () => {
    fc.assert(
      fc.property(fc.constantFrom(...vertices), unimodular, fc.nat(99), (rows, matrix, seed) => {
        const form = normalForm(polytopeFromPoints(rows))
        const cls = classOf(form, seed)
        const copy = isomorphicCopy(form.polytope, matrix)
        expectSame(
          readingsOf(form, transportClass(cls, copy.permutation, copy.polytope)),
          readingsOf(form, cls),
        )
      }),
      { numRuns: 25, seed: 20 },
    )
  })

  it('gives equal bits on the canonical representative, metric.basis included', () => {
    const rule = checkRule(
      `score log10(metric.divisor.top) + sum(d in divisors : sqrt(d.volume))\nreport metric.basis.top, ${patterns.map((p, at) => `p${at} = ${p}`).join(', ')}`,
    )
    if (!rule.ok) throw new Error('the rule checks')
    for (const rows of vertices.slice(0, 8)) {
      const form = normalForm(polytopeFromPoints(rows))
      const cls = classOf(form, 7)
      const outcomes = form.automorphisms.slice(0, 4).map((permutation) => {
        const canonical = canonicalClass(form, transportClass(cls, permutation, form.polytope))
        return evaluateRule(rule.rule, buildCandidate(form, canonical.class, canonical.key))
      })
      for (const outcome of outcomes) expect(outcome).toEqual(outcomes[0])
    }
  })
})
