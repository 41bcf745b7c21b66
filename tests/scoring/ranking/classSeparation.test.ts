import { describe, expect, it } from 'vitest'
import { trianglesApart } from '../../../scoring/geometry/classDistance.ts'
import { enumerateClasses } from '../../../scoring/geometry/enumeration.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import type { TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { ClassSeparation } from '../../../scoring/ranking/classSeparation.ts'
import { bundledPolytopes } from '../../reference/bundledPolytopes.ts'

describe('classes kept apart', () => {
  // 18 classes, 8 automorphisms.
  const entry = bundledPolytopes('small').find(({ id }) => id === 'r4-0164')
  const form = normalForm(polytopeFromPoints(entry?.vertices ?? []))
  const { classes } = enumerateClasses(form.polytope)

  it.each([0, 1, 2, 4, 6, 10])('at least %i triangles: the same as comparing every pair', (least) => {
    for (const order of [classes, [...classes].reverse()]) {
      const separation = new ClassSeparation(form, least)
      const admitted = order.map((cls) => separation.admit(cls))
      const taken: TwoFaceClass[] = []
      const expected = order.map((cls) => {
        const apart = taken.every((other) => trianglesApart(form, other, cls, least - 1) === null)
        if (apart || least === 0) taken.push(cls)
        return apart || least === 0
      })
      expect(admitted).toEqual(expected)
    }
  })

  it('takes one of each set of equivalent classes at 1, and all at 0', () => {
    const count = (least: number) => {
      const separation = new ClassSeparation(form, least)
      return classes.filter((cls) => separation.admit(cls)).length
    }
    expect(count(0)).toBe(classes.length)
    const orbits = count(1)
    expect(orbits).toBeLessThan(classes.length)
    expect(count(1000)).toBe(1)
  })
})
