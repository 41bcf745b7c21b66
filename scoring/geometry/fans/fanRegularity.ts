import { decideCone, type ConeDecision, type ConeQuestion } from '../coneDecision.ts'
import { SparseConeRows } from '../coneRows.ts'
import { heightBound } from '../faceSheets.ts'
import { quadraticHeights } from '../heights.ts'
import type { FanSimplices } from './fan.ts'
import { fanWalls, isStrict, type FanWall } from './fanWalls.ts'

/** The answer on a fan's regularity, with its proof. */
export type FanRegularity =
  /** Integer heights that give the fan, every wall's circuit positive (checked exactly). */
  | { readonly regular: true; readonly heights: Float64Array }
  /**
   * Walls whose circuits, taken `weights` times (positive integers), add up to zero (checked exactly): no heights
   * can make all of them positive.
   */
  | { readonly regular: false; readonly walls: readonly FanWall[]; readonly weights: bigint[] }

/** Least value asked of a wall, in units of the largest sum of a circuit's coefficients, for rounding to be safe. */
const MARGIN = 2 ** 12

/**
 * Decides exactly whether some heights give the fan, that is whether all walls' circuits can be positive at once.
 * One of a pair of walls with the same circuit stands for both.
 *
 * @param near heights to look near to; default: quadratic heights
 */
export function isRegularFan(fan: FanSimplices, near?: ArrayLike<number>): FanRegularity {
  const walls = distinctWalls(fan)
  const decision = decideCone(
    questionOf(fan, walls),
    near ?? quadraticHeights(fan.polytope, { form: 'facets' }),
    marginOf(walls),
  )
  return regularity(walls, decision)
}

/** Walls with different circuits, the first of each kind. */
export function distinctWalls(fan: FanSimplices): FanWall[] {
  const seen = new Set<string>()
  return fanWalls(fan).filter(({ circuit }) => {
    const name = circuit.points
      .map((point, m) => `${point}:${circuit.coefficients[m]}`)
      .sort()
      .join()
    if (seen.has(name)) return false
    seen.add(name)
    return true
  })
}

function questionOf(fan: FanSimplices, walls: readonly FanWall[]): ConeQuestion {
  const bound = heightBound(fan.polytope)
  return {
    rows: new SparseConeRows(walls.map(({ circuit }) => circuit)),
    pointCount: fan.polytope.pointCount,
    accepts: (heights) => heights.every((height) => Math.abs(height) <= bound) && isStrict(fan, heights),
  }
}

function marginOf(walls: readonly FanWall[]): number {
  let largest = 8
  for (const { circuit } of walls) {
    largest = Math.max(
      largest,
      circuit.coefficients.reduce((sum, entry) => sum + Math.abs(entry), 0),
    )
  }
  return (MARGIN / 8) * largest
}

function regularity(walls: readonly FanWall[], decision: ConeDecision): FanRegularity {
  if (decision.kind === 'inside') return { regular: true, heights: decision.heights }
  return { regular: false, walls: decision.rows.map((row) => walls[row]), weights: decision.weights }
}
