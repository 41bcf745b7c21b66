import { InvariantError } from '../errors.ts'

/** Number of the polygon by its lattice points on the boundary and its corners; of F_2 and F_3, F_14 and F_15 one. */
const NUMBERS: ReadonlyMap<string, number> = new Map([
  ['3 3', 1],
  ['4 4', 3],
  ['4 3', 4],
  ['5 5', 5],
  ['5 4', 6],
  ['6 6', 7],
  ['6 4', 8],
  ['6 5', 9],
  ['6 3', 10],
  ['7 4', 11],
  ['7 5', 12],
  ['8 3', 13],
  ['8 4', 14],
  ['9 3', 16],
])

/**
 * Which of the 16 reflexive polygons it is, by the numbers F_1 to F_16 of Klevers, Mayorga Pena, Oehlmann, Piragua,
 * Reuter, arXiv:1408.4808 (from memory, checked against the gauge groups given there, which the points inside
 * edges show). F_i and F_{17-i} are dual for i <= 6; F_7 to F_10 are dual to themselves. Boundary points and
 * corners tell them apart but for F_2, all of whose dual edges have equal length, from F_3, and F_15, all of whose
 * edges have equal length, from F_14.
 *
 * @param turns a_i with v_{i-1} + v_{i+1} = a_i v_i for the lattice points around the polygon
 */
export function polygonType(turns: ArrayLike<number>): number {
  const points = turns.length
  const corners: number[] = []
  for (let k = 0; k < points; k++) if (turns[k] !== 2) corners.push(k)
  const number = NUMBERS.get(`${points} ${corners.length}`)
  if (number === undefined) {
    throw new InvariantError(`No reflexive polygon has ${points} points and ${corners.length} corners.`)
  }
  const edges = corners.map((k, c) => (corners[(c + 1) % corners.length] - k + points) % points)
  if (number === 3 && equal(corners.map((k) => turns[k]))) return 2
  if (number === 14 && equal(edges)) return 15
  return number
}

const equal = (lengths: readonly number[]): boolean => lengths.every((length) => length === lengths[0])
