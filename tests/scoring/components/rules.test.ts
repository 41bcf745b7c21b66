import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { referenceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { checkRule, evaluateRule } from '../../../scoring/rules/index.ts'
import { bundledPolytopes } from '../../reference/bundledPolytopes.ts'

function valueOf(id: string, expression: string): unknown {
  const entry = bundledPolytopes('small').find((polytope) => polytope.id === id)
  const form = normalForm(polytopeFromPoints(entry?.vertices ?? []))
  const canonical = canonicalClass(form, referenceClass(form.polytope))
  const candidate = buildCandidate(form, canonical.class, canonical.key)
  const checked = checkRule(`score 0\nreport value = ${expression}`)
  if (!checked.ok) throw new Error(checked.issues[0].message)
  const outcome = evaluateRule(checked.rule, candidate)
  return outcome.kind === 'feasible' ? outcome.report.value.value : outcome
}

// A point inside a triangle of three boundary points, L_f = 2: its divisor is two disjoint projective planes, by hand
// D^3 = 9 and c2 . D = -6 each (K^2 = 9; 12 chi(O) - 2 K^2). Together they are no prime toric del Pezzo divisor.
describe('rules about components, where a divisor is two projective planes', () => {
  it('count rigid and del Pezzo components apart from the divisors', () => {
    expect(valueOf('r4-0797', 'favourable')).toBe(false)
    expect(valueOf('r4-0797', 'count(c in components : true) == h11 + 4')).toBe(true)
    expect(valueOf('r4-0797', 'count(c in components : c.cubic == 9 and c.c2 == -6 and c.euler == 3)')).toBe(
      2,
    )
    expect(valueOf('r4-0797', 'count(c in components where c.delPezzo : c.delPezzoDegree == 9)')).toBe(2)
    expect(valueOf('r4-0797', 'count(d in divisors : d.delPezzo)')).toBe(0)
    expect(valueOf('r4-0797', 'count(c in components where c.rigid : c.whole.components > 1)')).toBe(2)
    expect(valueOf('r4-0797', 'any(d in divisors : d.rigid and d.components > 1)')).toBe(false)
  })
})
