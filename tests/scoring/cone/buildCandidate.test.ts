import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { classFromHeights } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'

describe('candidate', () => {
  const form = normalForm(polytopeFromPoints(largePolytope('w8-44').vertices))
  const outcome = classFromHeights(form.polytope, quadraticHeights(form.polytope, { seed: 2, noise: 0.4 }))
  if (!outcome.fine) throw new Error('quadratic heights are fine')
  const canonical = canonicalClass(form, outcome.class)

  it('computes every stage once and keeps it', () => {
    const candidate = buildCandidate(form, canonical.class, canonical.key)
    expect(candidate.classKey).toBe(canonical.key)
    expect(candidate.symmetryOrder).toBe(form.automorphisms.length)
    expect(candidate.numbers()).toBe(candidate.numbers())
    expect(candidate.divisorTopology()).toBe(candidate.divisorTopology())
    expect(candidate.curves()).toBe(candidate.curves())
    expect(candidate.reference()).toBe(candidate.reference())
    expect(candidate.volumes()).toBe(candidate.volumes())
    expect(candidate.divisorSpectrum()).toBe(candidate.divisorSpectrum())
    expect(candidate.basisSpectrum()).toBe(candidate.basisSpectrum())
  })

  it('gives the same bits in whatever order the stages are asked for', () => {
    const one = buildCandidate(form, canonical.class, canonical.key)
    const other = buildCandidate(form, canonical.class, canonical.key)
    const top = one.topEigenvalue()
    const spectrum = other.basisSpectrum()
    other.curves()
    expect(other.topEigenvalue()).toBe(top)
    expect(one.basisSpectrum()).toEqual(spectrum)
    expect(one.volumes()).toEqual(other.volumes())
    expect(one.divisorSpectrum()).toHaveLength(form.polytope.pointCount - 4)
  })
})
