import { InvariantError } from '../errors.ts'

/** Finds points of a fixed list (4 coordinates each, sizes up to 2,000) by their coordinates. */
export class PointIndex {
  private readonly bound: number
  private readonly indexOf = new Map<number, number>()

  constructor(points: ArrayLike<number>) {
    let bound = 0
    for (let i = 0; i < points.length; i++) bound = Math.max(bound, Math.abs(points[i]))
    // (2 * 4,000 + 1)^4 < 2^52: the key below is exact.
    if (bound > 4000) throw new InvariantError(`Coordinates of size ${bound} cannot be indexed.`)
    this.bound = bound
    for (let i = 0; 4 * i < points.length; i++) this.indexOf.set(this.key(points, i), i)
  }

  /** Index of the point with the coordinates `points[4 i .. 4 i + 3]`, or undefined. */
  lookup(points: ArrayLike<number>, i: number): number | undefined {
    return this.indexOf.get(this.key(points, i))
  }

  /** The same for a point that must be there. */
  find(points: ArrayLike<number>, i: number): number {
    const index = this.lookup(points, i)
    if (index === undefined)
      throw new InvariantError('An image of a lattice point is no lattice point of the polytope.')
    return index
  }

  private key(points: ArrayLike<number>, i: number): number {
    const radix = 2 * this.bound + 1
    let key = 0
    for (let axis = 0; axis < 4; axis++) {
      const entry = points[4 * i + axis]
      if (entry > this.bound || entry < -this.bound) return -1
      key = key * radix + entry + this.bound
    }
    return key
  }
}
