import { InvariantError } from '../errors.ts'
import { compareLexicographic, gcdOf } from './integers.ts'
import { difference, largest, orthogonalTo, TooLarge, value4 } from './vectors.ts'

/**
 * Indices of five affinely independent vertices of the hull: each maximises a functional that is constant on those
 * before.
 *
 * @throws InvariantError when the points lie in a hyperplane, TooLarge when a value might leave the safe integers
 */
export function startSimplex(points: readonly (readonly number[])[]): number[] {
  const size = points.reduce((most, point) => Math.max(most, largest(point)), 0)
  const chosen = [extreme(points, (p) => p[0]), extreme(points, (p) => -p[0])]
  while (chosen.length < 5) {
    const base = points[chosen[0]]
    const directions = chosen.slice(1).map((index) => difference(points[index], base))
    const functionals = annihilators(directions)
    let found: number | undefined
    for (const functional of functionals) {
      if (8 * size * largest(functional) > Number.MAX_SAFE_INTEGER) throw new TooLarge()
      const level = value4(functional, base)
      for (const sign of [1, -1]) {
        const index = extreme(points, (p) => sign * (value4(functional, p) - level))
        if (value4(functional, points[index]) !== level) {
          found = index
          break
        }
      }
      if (found !== undefined) break
    }
    if (found === undefined) throw new InvariantError('A hull was asked for points in a hyperplane.')
    chosen.push(found)
  }
  return chosen
}

/** Index of the point that maximises the functional; ties go to the lexicographically greatest, a vertex. */
function extreme(
  points: readonly (readonly number[])[],
  functional: (point: readonly number[]) => number,
): number {
  let best = 0
  let height = functional(points[0])
  for (let i = 1; i < points.length; i++) {
    const here = functional(points[i])
    if (here > height || (here === height && compareLexicographic(points[i], points[best]) > 0)) {
      best = i
      height = here
    }
  }
  return best
}

/** Functionals that span the annihilator of one to three independent directions. */
function annihilators(directions: readonly (readonly number[])[]): number[][] {
  const found: number[][] = []
  const fill = Array.from({ length: 3 - directions.length }, () => 0)
  // Completing by unit vectors in every way gives a spanning set: each is orthogonal to all rows it was made of.
  const complete = (from: number, units: readonly number[]): void => {
    if (units.length === fill.length) {
      const rows = [...directions, ...units.map((axis) => [0, 1, 2, 3].map((i) => (i === axis ? 1 : 0)))]
      const functional = orthogonalTo(rows)
      const common = gcdOf(functional)
      if (common !== 0) found.push(functional.map((entry) => entry / common))
      return
    }
    for (let axis = from; axis < 4; axis++) complete(axis + 1, [...units, axis])
  }
  complete(0, [])
  return found
}
