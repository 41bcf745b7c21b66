import { describe, expect, it } from 'vitest'
import { trianglesApart } from '../../../scoring/geometry/classDistance.ts'
import { enumerateClasses } from '../../../scoring/geometry/enumeration.ts'
import { flip, flippableEdges } from '../../../scoring/geometry/flips.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { transportClass } from '../../../scoring/geometry/transport.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { classOf } from '../cone/stages.ts'

describe('triangles by which two classes differ', () => {
  const form = normalForm(polytopeFromPoints(largePolytope('w20-17').vertices))
  const start = transportClass(classOf(largePolytope('w20-17').vertices), form.relabelling, form.polytope)

  it('are two per flip, none for an image under an automorphism, and null above the bound', () => {
    let cls = start
    const done = new Set<number>()
    for (let flips = 1; flips <= 3; flips++) {
      const edge = flippableEdges(cls).find(({ face }) => !done.has(face))
      if (!edge) throw new Error('the class has flips on several faces')
      done.add(edge.face)
      cls = flip(cls, edge) ?? cls
      const image = transportClass(cls, form.automorphisms[form.automorphisms.length - 1], form.polytope)
      const apart = trianglesApart(form, start, image, 8)
      expect(apart).toBe(trianglesApart(form, image, start, 8))
      expect(apart).toBeLessThanOrEqual(2 * flips)
      expect(apart).toBe(trianglesApart(form, start, cls, 8))
      expect(trianglesApart(form, start, cls, (apart ?? 0) - 1)).toBeNull()
    }
    expect(trianglesApart(form, start, start, 0)).toBe(0)
  })

  it('are the least over all automorphisms, found by mapping every class', () => {
    const entry = bundledPolytopes('small').find(({ id }) => id === 'r4-0164')
    const small = normalForm(polytopeFromPoints(entry?.vertices ?? []))
    const { classes } = enumerateClasses(small.polytope)
    expect([classes.length, small.automorphisms.length]).toEqual([18, 8])
    const names = (cls: (typeof classes)[number]) =>
      Array.from(cls.faceOf, (_, t) => cls.triangles.subarray(3 * t, 3 * t + 3).join())
    let zero = 0
    for (const a of classes) {
      const own = new Set(names(a))
      for (const b of classes) {
        const distances = small.automorphisms.map(
          (image) =>
            names(transportClass(b, image, small.polytope)).filter((triangle) => !own.has(triangle)).length,
        )
        expect(trianglesApart(small, a, b, 100)).toBe(Math.min(...distances))
        if (Math.min(...distances) === 0) zero++
      }
    }
    expect(zero).toBeGreaterThan(classes.length)
  })
})
