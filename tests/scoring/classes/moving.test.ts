import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { isGeneric } from '../../../scoring/geometry/circuits.ts'
import { classOfMesh, meshOfClass } from '../../../scoring/geometry/classMesh.ts'
import { copyMesh } from '../../../scoring/geometry/faceMesh.ts'
import { intersectionNumbers } from '../../../scoring/geometry/intersectionNumbers.ts'
import { ClassSums } from '../../../scoring/geometry/moving/classSums.ts'
import { CrossingQueue } from '../../../scoring/geometry/moving/crossingQueue.ts'
import { LineMotion } from '../../../scoring/geometry/moving/lineMotion.ts'
import { MovingNumbers } from '../../../scoring/geometry/moving/movingNumbers.ts'
import { normalForm, type NormalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { transportClass } from '../../../scoring/geometry/transport.ts'
import type { TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'

const formOf = ({ vertices }: { vertices: number[][] }): NormalForm =>
  normalForm(polytopeFromPoints(vertices))

/** Groups of 1 to 12 automorphisms; the last five are not favourable and have split points. */
const chosen: NormalForm[] = [
  ...['w20-17', 'w25-11', 'w50-7', 'w35-65', 'w40-24', 'w40-8', 'w50-74', 'w75-3', 'w86-2'].map(
    largePolytope,
  ),
  ...bundledPolytopes('h11-5').filter(({ id }) => id === 'r5-1819'),
].map(formOf)
const largest = formOf(largePolytope('w491-11'))

interface Line {
  readonly form: NormalForm
  readonly class: TwoFaceClass
  readonly heights: Float64Array
  readonly direction: Float64Array
}

/** From one random candidate towards another. */
function line(form: NormalForm, seed: number): Line {
  const stream = new RandomStream(seededState(seed))
  const from = drawNull(form.polytope, stream)
  const to = drawNull(form.polytope, stream)
  return { form, ...from, direction: to.heights.map((height, p) => height - from.heights[p]) }
}

const lines: Line[] = chosen.flatMap((form) => [1, 2, 3].map((seed) => line(form, seed)))

/** Follows a line to the target and calls back after every wall. */
function follow(
  { form, class: cls, heights, direction }: Line,
  look: (now: TwoFaceClass, numbers: MovingNumbers, sums: ClassSums, exchanges: number) => void,
): number {
  const numbers = new MovingNumbers(cls)
  const sums = new ClassSums(form, cls)
  const motion = new LineMotion(copyMesh(meshOfClass(cls)), heights, direction, (i, j, k, l, face) => {
    numbers.exchange(i, j, k, l, face)
    sums.exchange(i, j, k, l)
  })
  let walls = 0
  while (motion.ahead !== undefined && motion.ahead.over < motion.ahead.under) {
    const before = motion.exchanges
    expect(motion.cross()).toBe('crossed')
    walls++
    look(classOfMesh(copyMesh(motion.mesh)), numbers, sums, motion.exchanges - before)
  }
  return walls
}

function expectEqualFromScratch(now: TwoFaceClass, moving: MovingNumbers): void {
  const fresh = { ...intersectionNumbers(now), ...now }
  const kept = { ...moving.numbersNow(), ...moving.classNow() }
  expect(kept.euler).toBe(fresh.euler)
  // Comparing by `toEqual` takes ten times as long.
  const arrays = [
    'triangles',
    'faceOf',
    'triangleNumbers',
    'edges',
    'edgeNumbers',
    'cubes',
    'secondChern',
  ] as const
  for (const name of arrays) {
    const differs =
      kept[name].length !== fresh[name].length || kept[name].some((x, n) => x !== fresh[name][n])
    if (differs) expect(kept[name]).toEqual(fresh[name])
  }
}

describe('a class in motion', () => {
  it('has the triangles and numbers of a computation from scratch, after every wall', () => {
    const seen = { walls: 0, split: 0, symmetric: 0 }
    for (const from of lines) {
      expect(isGeneric(from.class, from.heights)).toBe(true)
      const walls = follow(from, expectEqualFromScratch)
      seen.walls += walls
      if (!from.form.polytope.favourable) seen.split += walls
      if (from.form.automorphisms.length > 1) seen.symmetric += walls
    }
    expect(seen.walls).toBeGreaterThan(300)
    expect(seen.split).toBeGreaterThan(100)
    expect(seen.symmetric).toBeGreaterThan(200)
  })

  it('does so at h11 = 491, over a hundred walls and more', () => {
    let walls = 0
    follow(line(largest, 3), (now, numbers) => {
      walls++
      if (walls % 25 === 0) expectEqualFromScratch(now, numbers)
    })
    expect(walls).toBeGreaterThan(100)
  })

  it('has the sums of a computation from scratch, equal for equivalent classes and different for others', () => {
    const keyOf = new Map<string, string>()
    const sumOf = new Map<string, string>()
    for (const from of lines) {
      const { form } = from
      let pick = 0
      follow(from, (now, _numbers, sums) => {
        const words = sums.words()
        expect(words).toEqual(new ClassSums(form, now).words())
        const image = form.automorphisms[++pick % form.automorphisms.length]
        expect(words).toEqual(new ClassSums(form, transportClass(now, image, form.polytope)).words())
        const { key } = canonicalClass(form, now)
        const name = `${form.key} ${words.join()}`
        expect(sumOf.get(key) ?? name).toBe(name)
        expect(keyOf.get(name) ?? key).toBe(key)
        sumOf.set(key, name)
        keyOf.set(name, key)
      })
    }
    expect(keyOf.size).toBeGreaterThan(300)
  })

  it('does not begin outside its class', () => {
    const { class: cls, heights, form } = line(chosen[chosen.length - 1], 1)
    const other = line(form, 2)
    expect(other.class.triangles).not.toEqual(cls.triangles)
    expect(() => new LineMotion(copyMesh(meshOfClass(cls)), other.heights, heights)).toThrow(InvariantError)
  })
})

describe('the queue of walls', () => {
  it('gives the least parameter first, told apart beyond rounding', () => {
    const large = fc.integer({ min: 2 ** 51, max: 2 ** 52 })
    const command = fc.tuple(fc.nat(7), large, large, fc.boolean())
    fc.assert(
      fc.property(fc.array(command, { minLength: 1, maxLength: 60 }), (commands) => {
        const queue = new CrossingQueue(8)
        const held = new Map<number, { over: number; under: number }>()
        for (const [edge, over, near, keep] of commands) {
          if (keep) {
            // Quotients next to 1 differ by less than a double can tell.
            const under = near % 2 === 0 ? over + (near % 3) : near
            queue.put(edge, over, under)
            held.set(edge, { over, under })
          } else {
            queue.remove(edge)
            held.delete(edge)
          }
          const first = queue.first()
          expect(first < 0).toBe(held.size === 0)
          const least = held.get(first)
          if (least === undefined) continue
          for (const { over: o, under: u } of held.values()) {
            expect(BigInt(least.over) * BigInt(u) <= BigInt(o) * BigInt(least.under)).toBe(true)
          }
        }
      }),
    )
  })
})
