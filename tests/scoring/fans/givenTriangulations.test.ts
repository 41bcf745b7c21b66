import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { fanFromHeights } from '../../../scoring/geometry/fans/fan.ts'
import { originIndex } from '../../../scoring/geometry/fans/fanFromSimplices.ts'
import { heightsOfSimplices } from '../../../scoring/geometry/fans/heightsOfSimplices.ts'
import { heightsOfTriangles } from '../../../scoring/geometry/fans/heightsOfTriangles.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { polygonAlone, rectangle } from '../classes/polygonAlone.ts'
import { rowsOf } from './byDefinition.ts'

const polytopeOf = (id: string): Polytope =>
  normalForm(polytopeFromPoints(largePolytope(id).vertices)).polytope

function fanOfSeed(polytope: Polytope, seed: number): number[][] {
  const fan = fanFromHeights(polytope, quadraticHeights(polytope, { seed, noise: 0.45 }))
  if (fan === undefined) throw new Error('quadratic heights are fine')
  return rowsOf(fan)
}

const trianglesOfSeed = (polytope: Polytope, seed: number): number[][] => {
  const cls = fineClass(polytope, quadraticHeights(polytope, { seed, noise: 0.45 }))
  if (cls === undefined) throw new Error('quadratic heights are fine')
  return Array.from(cls.faceOf, (_, t) => [...cls.triangles.subarray(3 * t, 3 * t + 3)])
}

/** The error a call throws, as code, path and message. */
function errorOf(call: () => unknown): { code: string; path: string; message: string } {
  try {
    call()
  } catch (error) {
    if (error instanceof InputError) return { code: error.code, path: error.path, message: error.message }
    throw error
  }
  return { code: 'none', path: '', message: '' }
}

describe('a triangulation given by simplices', () => {
  it('gets heights that give just these simplices, strictly, in any order and with or without the origin', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...['w6-90', 'w10-46', 'w20-17', 'w50-7'].map(polytopeOf)),
        fc.nat(1000),
        fc.boolean(),
        (polytope, seed, withOrigin) => {
          const simplices = fanOfSeed(polytope, seed)
          const given = simplices.map((s) =>
            withOrigin ? [s[3], s[1], originIndex, s[0], s[2]] : [...s].reverse(),
          )
          const found = heightsOfSimplices(polytope, given.reverse())
          const again = fanFromHeights(polytope, found.heights)
          expect(again && rowsOf(again)).toEqual(simplices)
          expect(again?.class.triangles).toEqual(found.class.triangles)
          expect(isGeneric(found.class, found.heights)).toBe(true)
        },
      ),
      { numRuns: 15 },
    )
  })

  const polytope = polytopeOf('w10-46')
  const good = fanOfSeed(polytope, 1)
  const last = polytope.pointCount - 1
  const errorWith = (simplices: number[][]): ReturnType<typeof errorOf> =>
    errorOf(() => heightsOfSimplices(polytope, simplices))

  it('is refused with the simplex that is none', () => {
    expect(errorWith([])).toMatchObject({ code: 'simplices.empty' })
    expect(errorWith(good.with(2, [0, 1, 2]))).toMatchObject({
      code: 'simplices.wrong-size',
      path: 'simplices[2]',
    })
    expect(errorWith(good.with(2, [originIndex, 0, 1, 2]))).toMatchObject({ code: 'simplices.wrong-size' })
    expect(errorWith(good.with(3, [0, 1, 2, last + 1]))).toMatchObject({
      code: 'simplices.no-such-point',
      path: 'simplices[3]',
      message: `Simplex 3 (0, 1, 2, ${last + 1}) names ${last + 1}, which is no point; indices run from 0 to ${last}.`,
    })
    expect(errorWith(good.with(4, [0, 1, 1, 2]))).toMatchObject({ code: 'simplices.repeated-point' })
    expect(errorWith([...good, good[5].toReversed()])).toMatchObject({
      code: 'simplices.twice',
      message: `Simplices 5 and ${good.length} are the same (${good[5].join(', ')}).`,
    })
  })

  it('is refused when it is not star, leaves its facet or is flat', () => {
    const stray = Array.from({ length: last + 1 }, (_, p) => p).find((p) => !good[0].includes(p))
    expect(errorWith(good.with(0, [...good[0], stray ?? -1]))).toMatchObject({ code: 'simplices.not-star' })
    const outside = Array.from({ length: last + 1 }, (_, p) => p)
      .map((p) => errorWith(good.with(0, [good[0][0], good[0][1], good[0][2], p])))
      .find(({ code }) => code === 'simplices.not-in-a-facet')
    expect(outside?.message).toMatch(/^Simplex 0 .* does not lie on one facet/)
    const face = polytope.twoFaces.find(({ points }) => points.length >= 4)
    expect(errorWith(good.with(0, [...(face?.points.subarray(0, 4) ?? [])]))).toMatchObject({
      code: 'simplices.degenerate',
    })
  })

  it('is refused with the triangle that is left open, or has two simplices on one side', () => {
    const open = errorWith(good.toSpliced(7, 1))
    expect(open.code).toBe('simplices.open-wall')
    expect(open.message).toMatch(
      /^No simplex lies on the other side of the triangle \(\d+, \d+, \d+\) of simplex \d+/,
    )
    const other = fanOfSeed(polytope, 2).find((simplex) => !good.some((own) => own.join() === simplex.join()))
    const doubled = errorWith([...good, other ?? []])
    expect(doubled.code).toBe('simplices.overlap')
    expect(doubled.message).toMatch(/ and \d+ \(.*\) overlap: they lie on the same side of the triangle/)
  })

  it('is refused when two whole triangulations lie over each other, though every wall has its two sides', () => {
    // Each facet of the four-dimensional cube is cut into a tetrahedron on its vertices of one parity and four
    // corners. The two parities have no triangle in common.
    const cube = polytopeFromPoints(
      Array.from({ length: 16 }, (_, n) => [0, 1, 2, 3].map((axis) => 2 * ((n >> axis) & 1) - 1)),
    )
    const sign = (v: number, axis: number): number => cube.points[4 * v + axis]
    const parity = (v: number): number => [0, 1, 2, 3].filter((axis) => sign(v, axis) > 0).length % 2
    const vertices = Array.from({ length: 16 }, (_, v) => v)
    const cut = (even: number): number[][] =>
      [0, 1, 2, 3].flatMap((axis) =>
        [1, -1].flatMap((side) => {
          const facet = vertices.filter((v) => sign(v, axis) === side)
          const corners = facet
            .filter((v) => parity(v) !== even)
            .map((v) =>
              facet.filter((w) => [0, 1, 2, 3].filter((c) => sign(v, c) !== sign(w, c)).length <= 1),
            )
          return [facet.filter((v) => parity(v) === even), ...corners]
        }),
      )
    expect(errorOf(() => heightsOfSimplices(cube, cut(0))).code).toBe('simplices.not-fine')
    const error = errorOf(() => heightsOfSimplices(cube, [...cut(0), ...cut(1)]))
    expect(error.code).toBe('simplices.overlap')
    expect(error.message).toMatch(/overlap inside facet 0: the volumes there add up to 96 in place of 48\.$/)
  })

  it('is refused when it is not fine, with the points it leaves out', () => {
    // The vertices alone: pulled from vertex 0, every facet of the quintic's dual is one simplex.
    const coarse = polytopeOf('w101-1')
    const cone = Array.from({ length: coarse.vertexCount }, (_, v) =>
      Array.from({ length: coarse.vertexCount }, (_, p) => p).filter((p) => p !== v),
    )
    const error = errorOf(() => heightsOfSimplices(coarse, cone))
    expect(error.code).toBe('simplices.not-fine')
    expect(error.message).toMatch(/^The triangulation is not fine: points 5, 6, .* are not used\.$/)
  })
})

describe('a triangulation given by triangles', () => {
  it('gets heights that give the class', () => {
    fc.assert(
      fc.property(fc.constantFrom(...['w10-46', 'w50-7'].map(polytopeOf)), fc.nat(1000), (polytope, seed) => {
        const triangles = trianglesOfSeed(polytope, seed)
        const found = heightsOfTriangles(polytope, triangles.map((t) => [t[2], t[0], t[1]]).reverse())
        expect(fineClass(polytope, found.heights)?.triangles).toEqual(Int32Array.from(triangles.flat()))
      }),
      { numRuns: 10 },
    )
  })

  const polytope = polytopeOf('w50-7')
  const good = trianglesOfSeed(polytope, 1)
  const errorWith = (triangles: number[][]): ReturnType<typeof errorOf> =>
    errorOf(() => heightsOfTriangles(polytope, triangles))
  const face = polytope.twoFaces.findIndex(({ area, points }) => area > 4 && points.length > 5)
  const cls = fineClass(polytope, quadraticHeights(polytope, { seed: 1, noise: 0.45 }))
  const onFace = good.filter((_, t) => cls?.faceOf[t] === face)

  it('is refused with the triangle, edge, point or face at fault', () => {
    expect(errorWith(good.with(1, [0, 1]))).toMatchObject({
      code: 'triangles.wrong-size',
      path: 'triangles[1]',
    })
    const gap = errorWith(good.filter((t) => t !== onFace[0]))
    expect(gap.code).toBe('triangles.gap')
    expect(gap.message).toMatch(
      /^No triangle lies on the other side of the edge \(\d+, \d+\) of triangle \d+/,
    )
    expect(errorWith(good.filter((t) => !onFace.includes(t)))).toMatchObject({
      code: 'triangles.gap',
      message: `No triangle lies on 2-face ${face}, with the corners ${polytope.twoFaces[face].corners.join(', ')}.`,
    })
    const corners = [...polytope.twoFaces[face].corners]
    const coarse = errorWith([...good.filter((t) => !onFace.includes(t)), corners.slice(0, 3)])
    expect(coarse.code).toBe('triangles.not-fine')
    expect(coarse.message).toMatch(/contains points? .*, not used on 2-face/)
    const foreign = [2, 3, 4, 5, 6]
      .flatMap((seed) => trianglesOfSeed(polytope, seed))
      .find((t) => !good.some((own) => own.join() === t.join()))
    expect(errorWith([...good, foreign ?? []])).toMatchObject({
      code: 'triangles.overlap',
      path: `triangles[${good.length}]`,
    })
  })

  it('is refused when it is not regular, with the edges that contradict each other', () => {
    // The four long edges whirl around the inner unit square of the 3 x 3 square; point 4 x + y.
    const whirl = `0,1,5 0,4,9 0,5,9 1,2,5 2,3,5 3,5,6 3,6,7 4,8,9 5,6,10 5,9,10 6,7,11 6,10,15 6,11,15 8,9,12
      9,10,12 10,12,13 10,13,14 10,14,15`
    const error = errorOf(() =>
      heightsOfTriangles(
        polygonAlone(rectangle(3, 3)),
        whirl.split(/\s+/).map((triangle) => triangle.split(',').map(Number)),
      ),
    )
    expect(error.code).toBe('triangles.not-regular')
    for (const edge of ['(0, 9)', '(10, 12)', '(6, 15)', '(3, 5)']) expect(error.message).toContain(edge)
  })
})
