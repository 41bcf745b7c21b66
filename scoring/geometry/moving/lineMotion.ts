import { InvariantError } from '../../errors.ts'
import { circuitCoefficient, exchange, next, previous, type FaceMesh } from '../faceMesh.ts'
import { checkedHeights, cornerHeights } from '../heights.ts'
import { CrossingQueue } from './crossingQueue.ts'
import { ZERO, type Fraction } from './fractions.ts'

/**
 * An exchange as it happens, in points: the diagonal (i, j) of the unit parallelogram i, k, j, l on a 2-face gives
 * way to (k, l).
 */
export type ExchangeListener = (i: number, j: number, k: number, l: number, face: number) => void

/**
 * A triangulation of all 2-faces that moves along w + t d, t >= 0, from wall to wall. A circuit's value
 * c(w) + t c(d) vanishes at t = c(w) / -c(d); these parameters, exact rationals, wait in a queue, and an exchange
 * changes only the circuits of its own edge and of the four around it. So a wall costs the logarithm of the number
 * of edges, and every class met is regular because the line shows its heights.
 *
 * Several circuits may vanish at one t; then all exchanges there belong to one wall, after which the triangulation
 * is the regular one of heights infinitesimally further on (see `regularise`: the outcome does not depend on their
 * order). A circuit that vanishes along the whole line is decided by the lowest index among its four points, as
 * there.
 */
export class LineMotion {
  /** Exchanges so far. */
  exchanges = 0
  private wall: Fraction = ZERO
  private readonly queue: CrossingQueue
  /** Name of the edge of a half-edge, -1 on the boundary; and one half-edge of every edge. */
  private readonly edgeOf: Int32Array
  private readonly halfOf: Int32Array
  private readonly heights: Float64Array
  private readonly slopes: Float64Array

  /**
   * @param mesh the triangulation of `heights`; changed in place by `cross`
   * @param heights integers that give the triangulation with every circuit positive
   * @param direction integers within `heightBound`, not necessarily fine
   * @param exchanged told of every exchange
   * @throws InvariantError when some circuit is not positive on the heights
   */
  constructor(
    readonly mesh: FaceMesh,
    heights: ArrayLike<number>,
    direction: ArrayLike<number>,
    private readonly exchanged?: ExchangeListener,
  ) {
    const { twin, sheets } = mesh
    this.heights = cornerHeights(sheets, checkedHeights(sheets.polytope, heights))
    this.slopes = cornerHeights(sheets, checkedHeights(sheets.polytope, direction))
    this.edgeOf = new Int32Array(twin.length).fill(-1)
    let count = 0
    for (let h = 0; h < twin.length; h++) {
      if (twin[h] <= h) continue
      this.edgeOf[h] = count
      this.edgeOf[twin[h]] = count++
    }
    this.halfOf = new Int32Array(count)
    this.queue = new CrossingQueue(count)
    for (let h = 0; h < twin.length; h++) {
      if (twin[h] <= h) continue
      this.halfOf[this.edgeOf[h]] = h
      if (this.await(h, ZERO) <= 0) {
        throw new InvariantError('The heights that a walk starts from do not lie inside the class.')
      }
    }
  }

  /** The last wall crossed; 0 at the start. */
  get at(): Fraction {
    return this.wall
  }

  /** The next wall ahead, undefined when the direction stays in the present class for ever. */
  get ahead(): Fraction | undefined {
    const edge = this.queue.first()
    return edge < 0 ? undefined : this.queue.at(edge)
  }

  /** Crosses the next wall. 'boundary': it is the end of the fine cone, and the triangulation stays as it is. */
  cross(): 'crossed' | 'boundary' | 'unbounded' {
    const { queue } = this
    const first = queue.first()
    if (first < 0) return 'unbounded'
    const wall = queue.at(first)
    const crossed: number[] = []
    for (let edge = first; edge >= 0 && queue.isAt(edge, wall); edge = queue.first()) {
      const h = this.halfOf[edge]
      if (circuitCoefficient(this.mesh, h) !== 1) {
        // An exchange is undone by exchanging the new diagonal.
        for (const done of crossed.reverse()) this.exchange(this.halfOf[done], wall)
        return 'boundary'
      }
      this.exchange(h, wall)
      crossed.push(edge)
    }
    this.wall = wall
    return 'crossed'
  }

  private exchange(a: number, wall: Fraction): void {
    const { mesh, edgeOf, halfOf } = this
    const { from, twin, sheets } = mesh
    const b = twin[a]
    const ap = previous(a)
    const bp = previous(b)
    const [i, j, k, l] = [from[a], from[b], from[ap], from[bp]]
    exchange(mesh, a)
    this.exchanges++
    const diagonal = edgeOf[a]
    edgeOf[a] = edgeOf[bp]
    edgeOf[b] = edgeOf[ap]
    edgeOf[ap] = diagonal
    edgeOf[bp] = diagonal
    halfOf[diagonal] = ap
    for (const outer of [a, b, next(a), next(b)]) {
      if (edgeOf[outer] < 0) continue
      halfOf[edgeOf[outer]] = outer
      this.await(outer, wall)
    }
    this.await(ap, wall)
    const { point } = sheets
    this.exchanged?.(point[i], point[j], point[k], point[l], sheets.faceOfSlot[Math.floor(a / 3)])
  }

  /**
   * Puts the wall of an interior edge into the queue, if it lies ahead. Where we stand no circuit is negative, so
   * one with a negative slope vanishes here or further on; without a slope it vanishes nowhere or everywhere.
   * Returns its value at t = 0.
   *
   * @param here where we stand
   */
  private await(h: number, here: Fraction): number {
    const { mesh, heights, slopes, queue } = this
    const { from, twin, sheets } = mesh
    const g = twin[h]
    const i = from[h]
    const j = from[g]
    const k = from[previous(h)]
    const l = from[previous(g)]
    const b = circuitCoefficient(mesh, h)
    const slope = slopes[k] + slopes[l] - (2 - b) * slopes[i] - b * slopes[j]
    const value = heights[k] + heights[l] - (2 - b) * heights[i] - b * heights[j]
    const edge = this.edgeOf[h]
    if (slope < 0) {
      queue.put(edge, value, -slope)
      return value
    }
    const { point } = sheets
    const tied = slope === 0 && value === 0
    if (tied && Math.min(point[i], point[j]) < Math.min(point[k], point[l]))
      queue.put(edge, here.over, here.under)
    else queue.remove(edge)
    return value
  }
}
