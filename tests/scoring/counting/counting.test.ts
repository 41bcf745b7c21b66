import { describe, expect, it } from 'vitest'
import { classCountBound, innerEdges, log10Of } from '../../../scoring/geometry/counting/classCountBound.ts'
import { countClasses } from '../../../scoring/geometry/counting/countClasses.ts'
import { independentFaces } from '../../../scoring/geometry/counting/faceGroups.ts'
import { polygonCount } from '../../../scoring/geometry/counting/polygonCount.ts'
import { enumerateClasses, orbitsOf } from '../../../scoring/geometry/enumeration.ts'
import { flip, flippableEdges } from '../../../scoring/geometry/flips.ts'
import { normalForm, type NormalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope, type TwoFace } from '../../../scoring/geometry/polytope.ts'
import { referenceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'

const formOf = (id: string): NormalForm => normalForm(polytopeFromPoints(largePolytope(id).vertices))

/** All fine triangulations of one 2-face, by exchanging diagonals. */
function exchangedEverywhere(polytope: Polytope, face: TwoFace): number {
  const found = [referenceClass({ ...polytope, twoFaces: [face] })]
  const seen = new Set([found[0].triangles.join()])
  for (const cls of found) {
    for (const edge of flippableEdges(cls)) {
      const other = flip(cls, edge)
      if (other === undefined || seen.has(other.triangles.join())) continue
      seen.add(other.triangles.join())
      found.push(other)
    }
  }
  return found.length
}

describe('the number of fine triangulations of a polygon', () => {
  it('is what exchanging diagonals finds, on the 2-faces of polytopes', () => {
    const counts = ['w12-30', 'w30-15', 'w25-11', 'w20-76'].flatMap((id) => {
      const { polytope } = formOf(id)
      return polytope.twoFaces
        .filter(({ area }) => area > 1 && area < 16)
        .map((face) => {
          const count = polygonCount(face.plane, face.area, 1e6)
          expect(count).toBe(BigInt(exchangedEverywhere(polytope, face)))
          return count
        })
    })
    expect(counts.filter((count) => count !== undefined && count > 1n).length).toBeGreaterThan(10)
  })

  it('is at most 2 to the number of edges inside, which a triangulation shows', () => {
    for (const face of formOf('w40-40').polytope.twoFaces) {
      const polytope = { ...formOf('w40-40').polytope, twoFaces: [face] }
      const { triangles } = referenceClass(polytope)
      const edges = new Map<string, number>()
      for (let t = 0; t < triangles.length; t += 3) {
        for (const [p, q] of [
          [0, 1],
          [0, 2],
          [1, 2],
        ]) {
          const edge = `${triangles[t + p]},${triangles[t + q]}`
          edges.set(edge, (edges.get(edge) ?? 0) + 1)
        }
      }
      expect(innerEdges(face)).toBe([...edges.values()].filter((times) => times === 2).length)
      const count = polygonCount(face.plane, face.area, 20_000)
      if (count !== undefined) expect(count <= 2n ** BigInt(innerEdges(face))).toBe(true)
    }
  })

  it('is given up beyond the limit', () => {
    const [largest] = [...formOf('w491-11').polytope.twoFaces].sort((f, g) => g.area - f.area)
    expect(polygonCount(largest.plane, largest.area, 1000)).toBeUndefined()
  })
})

describe('the number of classes', () => {
  it('is a product over independent faces wherever there are any', () => {
    let products = 0
    for (const { vertices } of bundledPolytopes('small').filter((_, n) => n % 3 === 0)) {
      const form = normalForm(polytopeFromPoints(vertices))
      const groups = independentFaces(form.polytope)
      if (groups.length < 2) continue
      const { classes } = countClasses(form)
      expect(classes).toBe(BigInt(enumerateClasses(form.polytope).classes.length))
      if (classes !== 1n) products++
    }
    expect(products).toBeGreaterThan(20)
  })

  it('is counted before symmetry and after', () => {
    for (const id of ['w8-44', 'w15-27', 'w20-20']) {
      const form = formOf(id)
      const { classes } = enumerateClasses(form.polytope)
      const counted = countClasses(form)
      expect(counted.classes).toBe(BigInt(classes.length))
      if (id === 'w8-44') expect(counted.classes).toBe(168n)
      expect(counted.candidates).toBe(BigInt(orbitsOf(form, classes).size))
      expect(counted.atLeast).toBe(counted.classes)
      expect(counted.bound.bound >= BigInt(classes.length)).toBe(true)
    }
  })

  it('is left open beyond the limit, with bounds from both sides', () => {
    const { classes, candidates, atLeast, bound } = countClasses(formOf('w8-44'), 50)
    expect([classes, candidates, atLeast]).toEqual([null, null, 50n])
    // Its 168 classes, counted in full above.
    expect(bound.bound >= 168n).toBe(true)
  })

  it('has a bound at h11 = 491', () => {
    const { bound, log10, facesExact } = classCountBound(formOf('w491-11').polytope)
    expect(facesExact).toBe(false)
    expect(Math.floor(log10)).toBe(bound.toString().length - 1)
    expect(log10).toBeGreaterThan(400)
  })

  it('has logarithms of any size', () => {
    expect(log10Of(1n)).toBe(0)
    expect(log10Of(2n ** 2000n)).toBeCloseTo(2000 * Math.log10(2), 10)
  })
})
