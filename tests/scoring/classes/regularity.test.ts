import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { classFromTriangles } from '../../../scoring/geometry/classFromTriangles.ts'
import { circuits, isGeneric } from '../../../scoring/geometry/circuits.ts'
import { flip, flippableEdges } from '../../../scoring/geometry/flips.ts'
import { genericWitness } from '../../../scoring/geometry/genericWitness.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { decideInIntegers, isRegular, type Regularity } from '../../../scoring/geometry/regularity.ts'
import { fineClass, referenceClass, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { codeOf } from './copies.ts'
import { polygonAlone, rectangle } from './polygonAlone.ts'

/** The proof that comes with an answer, checked from the definition. */
function isProved(cls: TwoFaceClass, answer: Regularity): boolean {
  if (answer.regular) {
    const found = fineClass(cls.polytope, answer.heights)
    return isGeneric(cls, answer.heights) && found?.triangles.join() === cls.triangles.join()
  }
  const rows = circuits(cls)
  const sums = new Array<bigint>(cls.polytope.pointCount).fill(0n)
  answer.edges.forEach(([i, j], n) => {
    const r = rows.i.findIndex((p, row) => p === i && rows.j[row] === j)
    sums[rows.k[r]] += answer.weights[n]
    sums[rows.l[r]] += answer.weights[n]
    sums[i] -= answer.weights[n] * BigInt(rows.a[r])
    sums[j] -= answer.weights[n] * BigInt(rows.b[r])
  })
  return answer.weights.length > 0 && answer.weights.every((w) => w > 0n) && sums.every((sum) => sum === 0n)
}

/** Flips picked by number, regular or not. */
function wander(cls: TwoFaceClass, picks: readonly number[]): TwoFaceClass {
  return picks.reduce((at, pick) => {
    const edges = flippableEdges(at)
    return edges.length === 0 ? at : (flip(at, edges[pick % edges.length]) ?? at)
  }, cls)
}

const picks = fc.array(fc.nat(1000), { minLength: 1, maxLength: 40 })
const start = fc.constantFrom(
  ...['w6-90', 'w10-46', 'w20-17', 'w50-7'].map((id) => {
    return referenceClass(normalForm(polytopeFromPoints(largePolytope(id).vertices)).polytope)
  }),
)

describe('regularity', () => {
  it('is decided with a proof that holds, regular and irregular', () => {
    const seen = { regular: 0, irregular: 0 }
    fc.assert(
      fc.property(start, picks, (from, path) => {
        const cls = wander(from, path)
        const answer = isRegular(cls)
        expect(isProved(cls, answer)).toBe(true)
        seen[answer.regular ? 'regular' : 'irregular']++
      }),
      { numRuns: 150 },
    )
    expect(seen.regular).toBeGreaterThan(10)
    expect(seen.irregular).toBeGreaterThan(10)
  })

  it('is the same by the road in integers alone', () => {
    fc.assert(
      fc.property(fc.constantFrom('w6-90', 'w10-46', 'w20-17'), picks, (id, path) => {
        const { polytope } = normalForm(polytopeFromPoints(largePolytope(id).vertices))
        const cls = wander(referenceClass(polytope), path)
        const exact = decideInIntegers(cls)
        expect(isProved(cls, exact)).toBe(true)
        expect(exact.regular).toBe(isRegular(cls).regular)
      }),
      { numRuns: 40 },
    )
  })

  it('fails for a pinwheel on the 3 x 3 square, one of its four triangulations that are not regular', () => {
    // Point 4 x + y; the four long edges (0,9), (12,10), (15,6), (3,5) whirl around the inner unit square.
    const triangles = `0,1,5 0,4,9 0,5,9 1,2,5 2,3,5 3,5,6 3,6,7 4,8,9 5,6,10 5,9,10 6,7,11 6,10,15 6,11,15 8,9,12
      9,10,12 10,12,13 10,13,14 10,14,15`
    const pinwheel = classFromTriangles(polygonAlone(rectangle(3, 3)), triangles.split(/[\s,]+/).map(Number))
    const answer = isRegular(pinwheel)
    expect(answer.regular).toBe(false)
    expect(isProved(pinwheel, answer)).toBe(true)
    const exact = decideInIntegers(pinwheel)
    expect(exact.regular).toBe(false)
    expect(isProved(pinwheel, exact)).toBe(true)
  })

  it('of a class near known heights is shown by heights near them', () => {
    const { polytope } = normalForm(polytopeFromPoints(largePolytope('w50-7').vertices))
    const heights = quadraticHeights(polytope, { seed: 5, noise: 0.4 })
    const cls = fineClass(polytope, heights)
    if (cls === undefined) throw new Error('quadratic heights are fine')
    const answer = isRegular(cls, { near: heights })
    expect(answer.regular).toBe(true)
    if (answer.regular) {
      answer.heights.forEach((height, p) => expect(Math.abs(height - heights[p])).toBeLessThan(2 ** 15))
    }
  })
})

describe('a generic witness', () => {
  const square = polygonAlone(rectangle(2, 2))

  it('gives the class, from heights that tie and from heights of another class', () => {
    const flat = quadraticHeights(square).map((height) => Math.round(height / 2 ** 20))
    const cls = fineClass(square, flat)
    if (cls === undefined) throw new Error('|v|^2 is fine')
    expect(isGeneric(cls, flat)).toBe(false)
    expect(isGeneric(cls, genericWitness(cls, flat))).toBe(true)
    const other = wander(cls, [0])
    expect(isGeneric(other, genericWitness(other, flat))).toBe(true)
  })

  it('differs by seed, and meets a further condition', () => {
    const heights = quadraticHeights(square)
    const cls = fineClass(square, heights)
    if (cls === undefined) throw new Error('quadratic heights are fine')
    const witness = genericWitness(cls, heights, { seed: 1 })
    expect(genericWitness(cls, heights, { seed: 1 })).toEqual(witness)
    expect(genericWitness(cls, heights, { seed: 2 })).not.toEqual(witness)
    const even = genericWitness(cls, heights, { accept: (w) => w[0] % 2 === 0 })
    expect(even[0] % 2).toBe(0)
    expect(codeOf(() => genericWitness(cls, heights, { accept: () => false }))).toBe('class.no-witness')
  })

  it('is refused for a class that is not regular', () => {
    const { polytope } = normalForm(polytopeFromPoints(largePolytope('w20-17').vertices))
    const irregular = [...Array(200).keys()]
      .map((n) => wander(referenceClass(polytope), [n, 3 * n + 1, 7 * n + 2, 5, n, n + 1, 2 * n, 11, 3, n]))
      .find((cls) => !isRegular(cls).regular)
    if (irregular === undefined) throw new Error('none found')
    expect(codeOf(() => genericWitness(irregular, quadraticHeights(polytope)))).toBe('class.not-regular')
  })
})
