import { equality, equalLists, equalRows, type CheckList } from './check.ts'
import type { Claims } from './claims.ts'
import { ringNumbers, type RingNumbers } from './intersectionRing.ts'
import type { CertifiedPolytope } from './polytopeChecks.ts'
import type { CertifiedFan } from './triangulationChecks.ts'

/** Certified intersection numbers, sparse. */
export interface CertifiedNumbers {
  /** Non-zero [i, j, k, kappa_ijk], i <= j <= k, lexicographic order. */
  readonly triples: RingNumbers['triples']
  readonly secondChern: readonly number[]
  readonly euler: number
}

/** Intersection numbers from the whole fan, and what follows from them. */
export function checkIntersections(
  claims: Claims,
  { figures }: CertifiedPolytope,
  fan: CertifiedFan,
  checks: CheckList,
): CertifiedNumbers | undefined {
  const { numbers, points } = claims
  const ring = checks.run('linear-relations', () => {
    const value = ringNumbers(fan.lifted, fan.simplices, fan.report.walls)
    const { broken, fractional, relations } = value
    const note =
      broken.length > 0
        ? `First with points ${broken[0].join(', ')}.`
        : fractional.length > 0
          ? `kappa_${fractional[0].join(',')} is no integer.`
          : `${relations} equations in exact fractions; all triple numbers are integers.`
    const wrong = broken.length + fractional.length
    return { passed: wrong === 0, fast: null, independent: wrong, note, value }
  })
  if (ring === undefined) return undefined
  const agree = checks.run('intersection-numbers', () => ({
    ...equalRows(numbers.intersections, ring.triples, 'numbers'),
    value: true,
  }))
  const cubes = new Array<number>(points.length).fill(0)
  const secondChern = new Array<number>(points.length).fill(0)
  let distinct = 0
  // c2 . D_k = sum of kappa_ijk over i < j: each number counts once for every pair of different points in it.
  for (const [i, j, k, value] of ring.triples) {
    if (i === k) cubes[i] = value
    else if (i === j) secondChern[i] += value
    else if (j === k) secondChern[j] += value
    else {
      secondChern[i] += value
      secondChern[j] += value
      secondChern[k] += value
      distinct += value
    }
  }
  checks.run('second-chern', () => equalLists(numbers.c2, secondChern, 'c2'))
  const euler = distinct - secondChern.reduce((sum, value) => sum + value, 0)
  checks.run('euler', () =>
    equality(
      numbers.hodge.euler,
      euler,
      '2 (h11 - h21), against the sum of kappa_ijk over i < j < k less that of c2 . D_k.',
    ),
  )
  checks.run('noether', () => {
    // chi(O_D) = (2 D^3 + c2 . D) / 12, from lattice points alone on the other side (arXiv:1712.04946).
    const chi = figures.dualInterior.map((inside, p) =>
      figures.dimension[p] === 1 ? 1 - inside : 1 + inside,
    )
    const byNumbers = cubes.map((cube, p) => (2 * cube + secondChern[p]) / 12)
    return equalLists(chi, byNumbers, 'chi(O)')
  })
  return agree ? { triples: ring.triples, secondChern, euler } : undefined
}
