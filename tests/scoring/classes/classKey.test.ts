import fc from 'fast-check'
import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { enumerateClasses, orbitsOf } from '../../../scoring/geometry/enumeration.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { intersectionNumbers } from '../../../scoring/geometry/intersectionNumbers.ts'
import { normalForm, type NormalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import {
  fromNormalForm,
  inversePermutation,
  toNormalForm,
  transportClass,
  transportHeights,
} from '../../../scoring/geometry/transport.ts'
import { fineClass, referenceClass, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { isomorphicCopy, unimodular } from './copies.ts'

const formOf = (vertices: number[][]): NormalForm => normalForm(polytopeFromPoints(vertices))

/** Forms with symmetries and more than one class. */
const symmetric = [
  ...bundledPolytopes('small').filter((_, n) => n % 100 === 7),
  ...['w6-90', 'w10-46', 'w18-18', 'w20-17', 'w20-20', 'w50-7', 'w90-6-newton'].map(largePolytope),
]
  .map(({ vertices }) => formOf(vertices))
  .filter(({ automorphisms }) => automorphisms.length > 1)

const classed = fc.tuple(fc.constantFrom(...symmetric), fc.nat(1e6)).map(([form, seed]) => {
  const cls = fineClass(form.polytope, quadraticHeights(form.polytope, { seed, noise: 0.49 }))
  if (cls === undefined) throw new Error('quadratic heights are fine')
  return { form, class: cls }
})

/** The least sorted triangle list by the definition: all images, all triangles. */
function leastByTrial(form: NormalForm, cls: TwoFaceClass): number[] {
  const images = form.automorphisms.map((permutation) =>
    Array.from({ length: cls.faceOf.length }, (_, t) =>
      Array.from(cls.triangles.subarray(3 * t, 3 * t + 3), (p) => permutation[p]).sort((a, b) => a - b),
    )
      .sort((s, t) => s[0] - t[0] || s[1] - t[1] || s[2] - t[2])
      .flat(),
  )
  return images.sort((s, t) => {
    const at = s.findIndex((entry, n) => entry !== t[n])
    return at < 0 ? 0 : s[at] - t[at]
  })[0]
}

describe('the canonical class', () => {
  it('is the least image, reached by the relabelling given', () => {
    expect(symmetric.length).toBeGreaterThan(8)
    fc.assert(
      fc.property(classed, ({ form, class: cls }) => {
        const canonical = canonicalClass(form, cls)
        expect(Array.from(canonical.class.triangles)).toEqual(leastByTrial(form, cls))
        const moved = transportClass(cls, canonical.relabelling, form.polytope)
        expect(moved.triangles).toEqual(canonical.class.triangles)
        expect(moved.faceOf).toEqual(canonical.class.faceOf)
      }),
      { numRuns: 60 },
    )
  })

  it('and its key are the same along every automorphism', () => {
    fc.assert(
      fc.property(classed, fc.nat(), ({ form, class: cls }, pick) => {
        const image = transportClass(cls, form.automorphisms[pick % form.automorphisms.length], form.polytope)
        const one = canonicalClass(form, cls)
        const other = canonicalClass(form, image)
        expect(other.key).toBe(one.key)
        expect(other.class.triangles).toEqual(one.class.triangles)
        expect(other.class.faceOf).toEqual(one.class.faceOf)
      }),
    )
  })

  it('and its key are the same in other coordinates, by way of the normal form', () => {
    fc.assert(
      fc.property(classed, unimodular, ({ form, class: cls }, matrix) => {
        const copy = isomorphicCopy(form.polytope, matrix)
        const copyForm = normalForm(copy.polytope)
        const there = transportClass(cls, copy.permutation, copy.polytope)
        expect(canonicalClass(copyForm, toNormalForm(copyForm, there)).key).toBe(
          canonicalClass(form, cls).key,
        )
      }),
      { numRuns: 40 },
    )
  })

  it('of an image has the same numbers, carried along', () => {
    fc.assert(
      fc.property(classed, fc.nat(), ({ form, class: cls }, pick) => {
        const permutation = form.automorphisms[pick % form.automorphisms.length]
        const one = intersectionNumbers(cls)
        const other = intersectionNumbers(transportClass(cls, permutation, form.polytope))
        expect(transportHeights(one.cubes, permutation)).toEqual(other.cubes)
        expect(transportHeights(one.secondChern, permutation)).toEqual(other.secondChern)
      }),
      { numRuns: 30 },
    )
  })

  it('has as many keys as there are orbits', () => {
    const form = formOf(largePolytope('w10-46').vertices)
    const { classes, complete } = enumerateClasses(form.polytope)
    expect(complete).toBe(true)
    const cut = enumerateClasses(form.polytope, 3)
    expect(cut.complete).toBe(false)
    expect(cut.classes.length).toBe(3)
    const orbits = orbitsOf(form, classes)
    const byTrial = new Set(classes.map((cls) => leastByTrial(form, cls).join()))
    expect(orbits.size).toBe(byTrial.size)
    expect(orbits.size).toBeLessThan(classes.length)
  })

  it('must be asked for on the polytope of the normal form', () => {
    const form = symmetric[0]
    const copy = polytopeFromPoints(
      Array.from({ length: form.polytope.vertexCount }, (_, p) =>
        Array.from(form.polytope.points.subarray(4 * p, 4 * p + 4)),
      ),
    )
    expect(() => canonicalClass(form, referenceClass(copy))).toThrow(InvariantError)
  })
})

describe('carrying a class', () => {
  it('to the normal form and back gives it again', () => {
    for (const { vertices } of bundledPolytopes('small').filter((_, n) => n % 50 === 3)) {
      const polytope = polytopeFromPoints(vertices)
      const form = normalForm(polytope)
      const cls = referenceClass(polytope)
      const back = fromNormalForm(form, toNormalForm(form, cls), polytope)
      expect(back.triangles).toEqual(cls.triangles)
      expect(back.faceOf).toEqual(cls.faceOf)
      expect(inversePermutation(inversePermutation(form.relabelling))).toEqual(form.relabelling)
    }
  })

  it('by a permutation that is no isomorphism fails', () => {
    const { polytope } = formOf(largePolytope('w20-17').vertices)
    const turned = Int32Array.from({ length: polytope.pointCount }, (_, p) => (p + 1) % polytope.pointCount)
    expect(() => transportClass(referenceClass(polytope), turned, polytope)).toThrow(InvariantError)
  })
})

describe('the class key', () => {
  it('hashes exactly the bytes its description names', () => {
    const form = formOf(largePolytope('w50-7').vertices)
    const canonical = canonicalClass(form, referenceClass(form.polytope))
    const indices = Buffer.alloc(2 * canonical.class.triangles.length)
    canonical.class.triangles.forEach((point, n) => indices.writeUInt16BE(point, 2 * n))
    const hash = createHash('sha256').update(`tessellary.class/1\n${form.key}\n`, 'ascii').update(indices)
    expect(canonical.key).toBe(hash.digest('hex').slice(0, 32))
  })

  // Keys are permanent addresses. A change here breaks stored candidates: it is never the test that is wrong.
  it.each([
    ['w1-101-fan', '739692a4d29c2a99ce53547523324bc9'],
    ['w2-86-fan', '9a03313e4c664fac01ba5e51abec322c'],
    ['w6-90-newton', 'ca215d1b5aa0e3f499c3b949f913a474'],
    ['w20-20-fan', '952535b571919a110bcc57185c816f4a'],
    ['w50-7-newton', 'b232790b955e1c8687779cf79b09e18d'],
    ['w491-11-newton', '3eb2afe76e564ff0a9b6283ec6c27428'],
  ])('of one class on %s stays %s', (id, key) => {
    const form = formOf(largePolytope(id).vertices)
    const { points, pointCount } = form.polytope
    const heights = Float64Array.from({ length: pointCount }, (_, p) => {
      const square = points.subarray(4 * p, 4 * p + 4).reduce((sum, x) => sum + x * x, 0)
      return 4096 * square + ((37 * p * p) % 101)
    })
    const cls = fineClass(form.polytope, heights)
    if (cls === undefined) throw new Error('noise is below half a step')
    expect(canonicalClass(form, cls).key).toBe(key)
  })

  it('of all classes with h11 <= 3, sorted, stay the same', () => {
    const keys = bundledPolytopes('small')
      .filter(({ h11 }) => h11 <= 3)
      .flatMap(({ vertices }) => {
        const form = formOf(vertices)
        return [...orbitsOf(form, enumerateClasses(form.polytope).classes).keys()]
      })
    expect(new Set(keys).size).toBe(5 + 36 + 275)
    expect(createHash('sha256').update(keys.sort().join()).digest('hex')).toBe(
      '0e5458a5fe8055eba4e90b6d78340f64710415121a667515868bffcc09decc45',
    )
  })
})
