import { InvariantError } from '../errors.ts'
import { isGeneric } from './circuits.ts'
import { classOfMesh, meshOfClass } from './classMesh.ts'
import { circuitCoefficient, copyMesh, previous, type FaceMesh } from './faceMesh.ts'
import { faceSheets } from './faceSheets.ts'
import { checkedHeights, cornerHeights } from './heights.ts'
import { circuitValue, regularise, type CircuitSign } from './polygonTriangulation.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

export interface LineWalk {
  /** The classes met after the first, in order, each with integer heights inside it. */
  readonly steps: readonly LineStep[]
  /**
   * Why the walk ended: enough steps were taken; the fine cone ends at `at`; or the direction stays in the last
   * class for ever.
   */
  readonly end: 'enough' | 'boundary' | 'unbounded'
  /** The parameter t of the last wall met, as a double for orientation; 0 when there was none. */
  readonly at: number
}

export interface LineStep {
  readonly class: TwoFaceClass
  /** Integer heights halfway between the walls on both sides; they give the class, every circuit positive. */
  readonly heights: Float64Array
}

/** A positive rational number; both parts are exact integers. */
interface Fraction {
  readonly over: number
  readonly under: number
}

const ZERO: Fraction = { over: 0, under: 1 }

/**
 * Walks along w + t d, t >= 0, from wall to wall, without a linear program: every class met is regular because
 * the line shows its heights. A circuit's value c(w) + t c(d) vanishes at t = c(w) / -c(d); the least such t is
 * the next wall, found by exact comparison. There the triangulation is made regular for heights infinitesimally
 * further on (all circuits that vanish together at once). A wall whose circuit is no parallelogram is the end of
 * the fine cone.
 *
 * Heights of a step are rounded to integers, then checked. A class so thin that no rounded heights lie in it is
 * passed over: it is no step.
 *
 * @param cls the class of `heights`
 * @param heights integers that give the class with every circuit positive
 * @param direction integers within `heightBound`, not necessarily fine
 * @param maxSteps number of steps after which to stop
 */
export function walkLine(
  cls: TwoFaceClass,
  heights: ArrayLike<number>,
  direction: ArrayLike<number>,
  maxSteps: number,
): LineWalk {
  const { polytope } = cls
  const sheets = faceSheets(polytope)
  if (!isGeneric(cls, checkedHeights(polytope, heights))) {
    throw new InvariantError('The heights that a walk starts from do not lie inside the class.')
  }
  const value = circuitValue(cornerHeights(sheets, heights))
  const slope = circuitValue(cornerHeights(sheets, checkedHeights(polytope, direction)))
  const mesh = copyMesh(meshOfClass(cls))
  const steps: LineStep[] = []
  let wall = nextWall(mesh, value, slope)
  let met = ZERO
  while (wall !== undefined) {
    if (steps.length >= maxSteps) return { steps, end: 'enough', at: met.over / met.under }
    met = wall
    if (regularise(mesh, signPast(met, value, slope)) < 0) {
      return { steps, end: 'boundary', at: met.over / met.under }
    }
    wall = nextWall(mesh, value, slope)
    const inside = heightsBetween(met, wall, heights, direction, sheets.heightBound)
    const candidate = classOfMesh(copyMesh(mesh))
    if (inside !== undefined && isGeneric(candidate, inside))
      steps.push({ class: candidate, heights: inside })
  }
  return { steps, end: 'unbounded', at: met.over / met.under }
}

/**
 * The least t at which a circuit vanishes that is positive before. Circuits that have already vanished grow
 * (slope > 0) or are ties along the whole line (slope 0), so those with a negative slope lie ahead.
 */
function nextWall(mesh: FaceMesh, value: CircuitSign, slope: CircuitSign): Fraction | undefined {
  const { from, twin } = mesh
  let least: Fraction | undefined
  for (let h = 0; h < twin.length; h++) {
    const g = twin[h]
    if (g <= h) continue
    const b = circuitCoefficient(mesh, h)
    const k = from[previous(h)]
    const l = from[previous(g)]
    const under = -slope(from[h], from[g], k, l, b)
    if (under <= 0) continue
    const over = value(from[h], from[g], k, l, b)
    if (least === undefined || productDifference(over, least.under, least.over, under) < 0)
      least = { over, under }
  }
  return least
}

/** Signs of circuits at t = wall + an infinitesimal amount. */
function signPast(wall: Fraction, value: CircuitSign, slope: CircuitSign): CircuitSign {
  return (i, j, k, l, b) => {
    const rate = slope(i, j, k, l, b)
    const there = productDifference(value(i, j, k, l, b), wall.under, -rate, wall.over)
    return there === 0 ? rate : there
  }
}

/** Sign of p q - r s, exact for integers below 2^53 in size. */
function productDifference(p: number, q: number, r: number, s: number): number {
  const left = p * q
  const right = r * s
  // Each product is off by half a unit in the last place at most, and so is the difference.
  if (Math.abs(left - right) > 2 * Number.EPSILON * (Math.abs(left) + Math.abs(right))) return left - right
  const exact = BigInt(p) * BigInt(q) - BigInt(r) * BigInt(s)
  return exact > 0n ? 1 : exact < 0n ? -1 : 0
}

/** Rounded heights halfway between two walls, or a little past the last one; undefined beyond the bound. */
function heightsBetween(
  wall: Fraction,
  following: Fraction | undefined,
  heights: ArrayLike<number>,
  direction: ArrayLike<number>,
  bound: number,
): Float64Array | undefined {
  const t = wall.over / wall.under
  let length = following === undefined ? Math.max(t, 1) : (following.over / following.under - t) / 2
  for (let n = 0; n < 20; n++) {
    const inside = new Float64Array(heights.length)
    for (let p = 0; p < inside.length; p++)
      inside[p] = Math.round(heights[p] + (t + length) * direction[p]) + 0
    if (inside.every((height) => Math.abs(height) <= bound)) return inside
    length /= 2
  }
  return undefined
}
