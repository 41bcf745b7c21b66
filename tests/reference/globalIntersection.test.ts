import { describe, expect, it } from 'vitest'
import { quadraticHeights } from '../../scoring/geometry/heights.ts'
import { intersectionNumber, intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints, type Polytope } from '../../scoring/geometry/polytope.ts'
import { classFromHeights } from '../../scoring/geometry/twoFaceClass.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'
import { globalIntersectionNumbers } from './globalIntersection.ts'

function coordinates({ points, pointCount }: Polytope): number[][] {
  return Array.from({ length: pointCount }, (_, p) => Array.from(points.subarray(4 * p, 4 * p + 4)))
}

/** Entries (i, j, k) on which the local and the global road differ, for noisy heights that tie nowhere. */
function differences(polytope: Polytope): string[] {
  for (let seed = 1; seed < 10; seed++) {
    const heights = quadraticHeights(polytope, { seed, noise: 0.45 })
    const whole = globalIntersectionNumbers(coordinates(polytope), Array.from(heights))
    if (whole === undefined) continue
    const outcome = classFromHeights(polytope, heights)
    if (!outcome.fine) throw new Error('quadratic heights are fine')
    const local = intersectionNumbers(outcome.class)
    const wrong: string[] = []
    const n = polytope.pointCount
    for (let i = 0; i < n; i++) {
      let chern = 0n
      for (let j = 0; j < n; j++) {
        for (let k = j; k < n; k++) {
          const entry = intersectionNumber(local, i, j, k)
          if (BigInt(entry) !== whole.triple(i, j, k))
            wrong.push(`${i},${j},${k}: ${entry}, ${whole.triple(i, j, k)}`)
          if (j < k) chern += whole.triple(i, j, k)
        }
      }
      if (chern !== BigInt(local.secondChern[i])) wrong.push(`c2 of ${i}`)
    }
    return wrong
  }
  throw new Error('all heights tied')
}

describe('the local formulas against the intersection ring of the whole fan', () => {
  const small = bundledPolytopes('small')

  it('give the same numbers for all polytopes with h11 <= 3', () => {
    const compared = small.filter(({ h11 }) => h11 <= 3)
    expect(compared.length).toBe(285)
    for (const { id, vertices } of compared) {
      expect({ id, wrong: differences(polytopeFromPoints(vertices)) }).toEqual({ id, wrong: [] })
    }
  })

  it('give the same numbers for every fortieth polytope with h11 = 4', () => {
    const compared = small.filter(({ h11 }) => h11 === 4).filter((_, n) => n % 40 === 0)
    for (const { id, vertices } of compared) {
      expect({ id, wrong: differences(polytopeFromPoints(vertices)) }).toEqual({ id, wrong: [] })
    }
  })
})
