import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { facetPotentials } from '../../../scoring/search/facetPotentials.ts'
import { moves } from '../../../scoring/search/moves.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import { drawStart } from '../../../scoring/search/starts.ts'
import type { TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { problemOf } from './problems.ts'

const polytopeOf = (id: string) =>
  problemOf([id], 'score h11', 'random', { budget: 1 }).polytopes.at(0).polytope

describe('starts of guided searches', () => {
  it.each(['w20-17-newton-4-4-5-5-7', 'r4-0100', 'w75-10-fan-5-8-9-13-18'])(
    'are fine integer heights with their class (%s)',
    (id) => {
      const polytope = polytopeOf(id)
      fc.assert(
        fc.property(fc.nat(), (seed) => {
          const { heights, class: cls } = drawStart(polytope, new RandomStream(seededState(seed)))
          expect(fineClass(polytope, heights)?.triangles).toEqual(cls.triangles)
        }),
        { numRuns: 25 },
      )
    },
  )

  it('reach classes that the null’s law does not come near', () => {
    const polytope = polytopeOf('w50-7-newton-2-2-3-3-7')
    const stream = new RandomStream(seededState(3))
    const draws = (draw: typeof drawStart) => Array.from({ length: 20 }, () => draw(polytope, stream).class)
    const names = ({ triangles, faceOf }: TwoFaceClass): string[] =>
      [...faceOf.keys()].map((t) => triangles.subarray(3 * t, 3 * t + 3).join())
    const [nulls, starts] = [draws(drawNull).map(names), draws(drawStart).map(names)]
    // The triangles common to all null candidates are forced by the one quadratic form.
    const always = nulls.reduce((common, list) => common.filter((name) => list.includes(name)))
    const kept = starts.map((list) => always.filter((name) => list.includes(name)).length / always.length)
    expect(always.length).toBeGreaterThan(20)
    expect(Math.min(...kept)).toBeLessThan(0.8)
  })
})

describe('facet potentials', () => {
  it('are the same in all coordinates', () => {
    const points = [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
      [0, 0, 1, 0],
      [0, 0, 0, 1],
      [-1, -1, -6, -9],
    ]
    const sheared = points.map(([a, b, c, d]) => [a + 3 * b, b, c - 2 * a, d + c])
    const tables = [points, sheared].map((rows) =>
      facetPotentials(polytopeFromPoints(rows), 1)
        .map((values) =>
          [...values]
            .map((value) => value.toFixed(12))
            .sort()
            .join(' '),
        )
        .sort(),
    )
    expect(tables[1]).toEqual(tables[0])
  })

  it('move heights to other fine heights of the class proposed', () => {
    const polytope = polytopeOf('w20-17-newton-4-4-5-5-7')
    const stream = new RandomStream(seededState(1))
    let changed = 0
    for (const move of moves.slice(-3)) {
      for (let n = 0; n < 10; n++) {
        const place = drawStart(polytope, stream)
        const proposal = move(place, stream)
        const heights = proposal?.heights()
        if (proposal === undefined || heights === undefined) continue
        expect(fineClass(polytope, heights)?.triangles).toEqual(proposal.class.triangles)
        if (proposal.class !== place.class) changed++
      }
    }
    expect(changed).toBeGreaterThan(10)
  })
})
