import { planeMinors, spaceNormal } from './minors.ts'

/** The linear span of a growing set of points, exact for points in reduced coordinates. */
export class PointSpan {
  rank = 0
  private readonly chosen: number[] = []
  private readonly minors = new Float64Array(6)
  private readonly normal = new Float64Array(4)

  /** @param points 4 coordinates each, as `reducedCoordinates` gives them */
  constructor(private readonly points: ArrayLike<number>) {}

  /** Adds a point; true when it was outside the span. */
  add(point: number): boolean {
    if (!this.isOutside(point)) return false
    this.chosen.push(point)
    this.rank++
    return true
  }

  /** The determinant of the first three points added and this one; of a span of rank 3, zero on it alone. */
  valueAt(point: number): number {
    let determinant = 0
    for (let axis = 0; axis < 4; axis++) determinant += this.normal[axis] * this.points[4 * point + axis]
    return determinant
  }

  /** Leaves the minors of the first two points, or the normal of the first three, when it lets the last of them in. */
  private isOutside(point: number): boolean {
    const { points, chosen, minors, normal } = this
    switch (this.rank) {
      case 0:
        return [0, 1, 2, 3].some((axis) => points[4 * point + axis] !== 0)
      case 1:
        planeMinors(points, chosen[0], point, minors)
        return minors.some((minor) => minor !== 0)
      case 2:
        spaceNormal(points, minors, point, normal)
        return normal.some((entry) => entry !== 0)
      case 3:
        return this.valueAt(point) !== 0
      default:
        return false
    }
  }
}
