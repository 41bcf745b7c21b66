import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import { classFromTriangles } from '../../../scoring/geometry/classFromTriangles.ts'
import { crossClasses } from '../../../scoring/geometry/crossClasses.ts'
import { circuits, circuitValues, isGeneric } from '../../../scoring/geometry/circuits.ts'
import { clampToFine } from '../../../scoring/geometry/clampToFine.ts'
import { heightBound } from '../../../scoring/geometry/faceSheets.ts'
import { flip, flippableEdges, interiorEdgeCount, oppositeDiagonal } from '../../../scoring/geometry/flips.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { classFromHeights, fineClass, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { walkLine } from '../../../scoring/geometry/walkLine.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { polygonAlone, rectangle } from './polygonAlone.ts'

const chosen: Polytope[] = [
  ...bundledPolytopes('small')
    .filter((_, n) => n % 150 === 149)
    .map(({ vertices }) => vertices),
  ...['w6-90', 'w10-46', 'w20-17', 'w30-15', 'w50-7'].map((id) => largePolytope(id).vertices),
].map((vertices) => normalForm(polytopeFromPoints(vertices)).polytope)

/** A polytope, fine heights on it that are far from quadratic, and their class. */
const fineHeights = fc
  .tuple(fc.constantFrom(...chosen), fc.nat(1e6))
  .map(([polytope, seed]) => farHeights(polytope, seed))

interface Fine {
  readonly polytope: Polytope
  readonly heights: Float64Array
  readonly class: TwoFaceClass
}

function farHeights(polytope: Polytope, seed: number): Fine {
  const base = quadraticHeights(polytope)
  const noisy = quadraticHeights(polytope, { seed, noise: 0.49 })
  const towards = base.map((height, p) => height + 40 * (noisy[p] - height))
  return { polytope, ...clampToFine(polytope, base, towards) }
}

describe('circuits', () => {
  it('are relations among four points that hold in all coordinates', () => {
    fc.assert(
      fc.property(fineHeights, ({ polytope, class: cls }) => {
        const rows = circuits(cls)
        const { points } = polytope
        expect(rows.count).toBe(interiorEdgeCount(cls))
        for (let axis = 0; axis < 4; axis++) {
          const coordinate = Array.from({ length: polytope.pointCount }, (_, p) => points[4 * p + axis])
          expect(circuitValues(rows, coordinate).every((value) => value === 0)).toBe(true)
        }
        for (let r = 0; r < rows.count; r++) {
          expect(rows.a[r] + rows.b[r]).toBe(2)
          expect(rows.i[r] < rows.j[r] && rows.k[r] < rows.l[r]).toBe(true)
        }
      }),
      { numRuns: 40 },
    )
  })
})

describe('fine heights', () => {
  it('form a convex cone', () => {
    const pair = fc.constantFrom(...chosen).chain((polytope) =>
      fc
        .tuple(fc.nat(1e6), fc.nat(1e6), fc.integer({ min: 1, max: 50 }), fc.integer({ min: 1, max: 50 }))
        .map(([s, t, x, y]) => {
          const one = farHeights(polytope, s).heights
          const other = farHeights(polytope, t).heights
          return { polytope, heights: one.map((height, p) => x * height + y * other[p]) }
        }),
    )
    fc.assert(
      fc.property(pair, ({ polytope, heights }) => {
        expect(fineClass(polytope, heights)).toBeDefined()
      }),
    )
  })

  it('give their class from any start, and the same object when nothing changes', () => {
    fc.assert(
      fc.property(fineHeights, fc.nat(1e6), ({ polytope, heights, class: cls }, seed) => {
        expect(fineClass(polytope, heights, farHeights(polytope, seed).class)?.triangles).toEqual(
          cls.triangles,
        )
        expect(fineClass(polytope, heights, cls)).toBe(cls)
      }),
      { numRuns: 50 },
    )
  })
})

describe('a flip', () => {
  it('changes two triangles and is undone by flipping the new diagonal', () => {
    fc.assert(
      fc.property(fineHeights, fc.nat(), ({ class: cls }, pick) => {
        const edges = flippableEdges(cls)
        fc.pre(edges.length > 0)
        const edge = edges[pick % edges.length]
        const flipped = flip(cls, edge)
        if (flipped === undefined) throw new Error('a flippable edge did not flip')
        const names = (c: TwoFaceClass): string[] =>
          Array.from(c.faceOf, (f, t) => `${c.triangles.subarray(3 * t, 3 * t + 3).join()} on ${f}`)
        const before = new Set(names(cls))
        expect(names(flipped).filter((name) => !before.has(name)).length).toBe(2)
        const ordered = classFromTriangles(cls.polytope, flipped.triangles)
        expect(ordered.triangles).toEqual(flipped.triangles)
        expect(ordered.faceOf).toEqual(flipped.faceOf)
        const back = flip(flipped, oppositeDiagonal(cls, edge))
        expect(back?.triangles).toEqual(cls.triangles)
        expect(back?.faceOf).toEqual(cls.faceOf)
      }),
    )
  })

  it('is refused where the quadrilateral is no parallelogram, and for pairs that are no inner edge', () => {
    // A triangle of area 3 around its only inner point: no edge can be exchanged.
    const cls = fineClass(polygonAlone([[0, 0], [1, 1], [1, 2], [2, 1]]), [0, -1, 0, 0]) // prettier-ignore
    if (cls === undefined) throw new Error('the inner point is low')
    expect(flippableEdges(cls)).toEqual([])
    expect(flip(cls, { i: 0, j: 1 })).toBeUndefined()
    expect(() => flip(cls, { i: 0, j: 2 })).toThrow(InvariantError)
  })
})

describe('a crossing', () => {
  it('takes every 2-face whole from one of the parents', () => {
    fc.assert(
      fc.property(fineHeights, fc.nat(1e6), fc.infiniteStream(fc.nat(1)), (from, seed, choice) => {
        const one = from.class
        const other = farHeights(from.polytope, seed).class
        const fromOther = from.polytope.twoFaces.map(() => choice.next().value)
        const child = crossClasses(one, other, fromOther)
        expect(classFromTriangles(from.polytope, child.triangles).faceOf).toEqual(child.faceOf)
        const onFace = (cls: TwoFaceClass, f: number): string[] =>
          Array.from(cls.faceOf.keys())
            .filter((t) => cls.faceOf[t] === f)
            .map((t) => cls.triangles.subarray(3 * t, 3 * t + 3).join())
        fromOther.forEach((taken, f) => expect(onFace(child, f)).toEqual(onFace(taken ? other : one, f)))
      }),
      { numRuns: 30 },
    )
  })
})

describe('a clamped step', () => {
  it('ends on fine heights, in their class, and is taken whole when its end is fine', () => {
    fc.assert(
      fc.property(fineHeights, fc.nat(1e6), fc.integer({ min: 1, max: 1000 }), (from, seed, size) => {
        const { polytope, heights, class: cls } = from
        const noise = quadraticHeights(polytope, { seed, noise: 0.49 })
        const towards = heights.map((height, p) => height + size * (noise[p] - heights[p]))
        const step = clampToFine(polytope, heights, towards, cls)
        const outcome = classFromHeights(polytope, step.heights)
        expect(outcome.fine && outcome.class.triangles).toEqual(step.class.triangles)
        const whole =
          towards.every((height) => Math.abs(height) <= heightBound(polytope)) && fineClass(polytope, towards)
        expect(step.fraction === 1).toBe(Boolean(whole))
      }),
      { numRuns: 50 },
    )
  })

  it('stays where it is when no part of the step can be taken', () => {
    const { polytope, heights, class: cls } = farHeights(chosen[chosen.length - 1], 3)
    const step = clampToFine(
      polytope,
      heights,
      heights.map((height, p) => height + (p === 50 ? 1e300 : 0)),
      cls,
    )
    expect(step.fraction).toBe(0)
    expect(step.class).toBe(cls)
    expect(step.heights).toEqual(heights)
  })
})

describe('a walk along a line', () => {
  it('meets classes whose heights are on the line up to rounding, one flip apart or a few where walls coincide', () => {
    const seen = { steps: 0, single: 0 }
    fc.assert(
      fc.property(fineHeights, fc.nat(1e6), (from, seed) => {
        const { polytope, heights } = from
        // Inside the class, so that the walk may start there.
        fc.pre(isGeneric(from.class, heights))
        const direction = quadraticHeights(polytope, { seed, noise: 0.49 }).map(
          (height, p) => height - heights[p],
        )
        let previous = from.class
        for (const step of walkLine(from.class, heights, direction, 20).steps) {
          expect(isGeneric(step.class, step.heights)).toBe(true)
          const outcome = classFromHeights(polytope, step.heights)
          expect(outcome.fine && outcome.class.triangles).toEqual(step.class.triangles)
          expect(step.class.triangles).not.toEqual(previous.triangles)
          const before = new Set(previous.triangles.join().match(/\d+,\d+,\d+/g))
          const changed = step.class.triangles
            .join()
            .match(/\d+,\d+,\d+/g)
            ?.filter((t) => !before.has(t)).length
          seen.steps++
          if (changed === 2) seen.single++
          previous = step.class
        }
      }),
    )
    expect(seen.steps).toBeGreaterThan(100)
    expect(seen.single / seen.steps).toBeGreaterThan(0.9)
  })

  it('to fine heights ends in their class', () => {
    fc.assert(
      fc.property(fineHeights, fc.nat(1e6), (from, seed) => {
        const target = farHeights(from.polytope, seed)
        fc.pre(isGeneric(from.class, from.heights) && isGeneric(target.class, target.heights))
        const direction = target.heights.map((height, p) => height - from.heights[p])
        const walk = walkLine(from.class, from.heights, direction, Infinity)
        const met = [from.class, ...walk.steps.map((step) => step.class)]
        expect(met.some((cls) => cls.triangles.join() === target.class.triangles.join())).toBe(true)
      }),
      { numRuns: 60 },
    )
  })

  it('ends at the boundary of the fine cone, exactly there', () => {
    // On the square with its centre (area 8) raise the centre: fine while it is below its neighbours' planes.
    const square = polygonAlone(rectangle(2, 2))
    const heights = quadraticHeights(square)
    const cls = fineClass(square, heights)
    if (cls === undefined) throw new Error('quadratic heights are fine')
    const raise = Float64Array.from(heights, (_, p) => (p === 4 ? 1 : 0))
    const walk = walkLine(cls, heights, raise, Infinity)
    expect(walk.end).toBe('boundary')
    const at = (t: number): Float64Array => heights.map((height, p) => height + t * raise[p])
    expect(fineClass(square, at(Math.ceil(walk.at) - 1))).toBeDefined()
    expect(fineClass(square, at(Math.ceil(walk.at)))).toBeUndefined()
    expect(walk.steps.every((step) => fineClass(square, step.heights) !== undefined)).toBe(true)
  })

  it('goes on for ever in a fine direction', () => {
    const square = polygonAlone(rectangle(2, 2))
    const heights = quadraticHeights(square)
    const cls = fineClass(square, heights)
    if (cls === undefined) throw new Error('quadratic heights are fine')
    const walk = walkLine(cls, heights, heights, 5)
    expect(walk).toEqual({ steps: [], end: 'unbounded', at: 0 })
  })

  it('must start inside its class', () => {
    const square = polygonAlone(rectangle(1, 1))
    const cls = fineClass(square, [0, 0, 0, 0])
    if (cls === undefined) throw new Error('flat heights on a square are fine')
    expect(() => walkLine(cls, [0, 0, 0, 0], [0, 0, 0, 1], 1)).toThrow(InvariantError)
  })
})
