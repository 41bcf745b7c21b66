import { describe, expect, it } from 'vitest'
import { normalForm } from '../../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../../scoring/geometry/polytope.ts'
import { transportClass } from '../../../../scoring/geometry/transport.ts'
import { moves } from '../../../../scoring/search/moves.ts'
import { RandomStream, seededState } from '../../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../../scoring/search/sampling.ts'
import { classFeatures } from '../../../../scoring/search/surrogate/classFeatures.ts'
import { polytopeFeatures } from '../../../../scoring/search/surrogate/polytopeFeatures.ts'
import { bundledEntry } from '../problems.ts'

const forms = ['w12-30-newton-5-7-7-8-9', 'w101-1-newton-1-1-1-1-1', 'r4-0100'].map((id) =>
  normalForm(polytopeFromPoints(bundledEntry(id).vertices)),
)

describe('features of a class', () => {
  it('are the same, to the bit, for all classes that automorphisms map to each other', () => {
    const stream = new RandomStream(seededState(4))
    let images = 0
    for (const form of forms) {
      const { class: cls } = drawNull(form.polytope, stream)
      const features = classFeatures(form, cls)
      for (const automorphism of form.automorphisms.slice(1, 6)) {
        expect(classFeatures(form, transportClass(cls, automorphism, form.polytope))).toEqual(features)
        images++
      }
    }
    expect(images).toBeGreaterThan(5)
  })

  it('are finite, of one length on all polytopes, and change with a flip', () => {
    const stream = new RandomStream(seededState(5))
    const lengths = new Set<number>()
    for (const form of forms) {
      const { class: cls, heights } = drawNull(form.polytope, stream)
      const features = classFeatures(form, cls)
      expect(features.every(Number.isFinite)).toBe(true)
      lengths.add(features.length)
      const flipped = moves[0]({ class: cls, heights }, stream)
      if (flipped === undefined) continue
      const others = classFeatures(form, flipped.class)
      const shared = polytopeFeatures(form).length
      expect(others.slice(0, shared)).toEqual(features.slice(0, shared))
      expect(others).not.toEqual(features)
    }
    expect(lengths.size).toBe(1)
  })
})
