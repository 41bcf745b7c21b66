/** The largest number of quantities that fronts are taken over. */
export const paretoAxesLimit = 3

/**
 * The number of the Pareto front of each row, from 1: front 1 holds the rows that no other dominates, front n + 1
 * those that only rows of the fronts up to n dominate. A row dominates another when it is at least as large in every
 * column and larger in one; equal rows share a front. Null for a row with an undefined value (null, or not finite):
 * it lies on no front and dominates nothing.
 *
 * Rows are taken from the lexicographically largest down, so that only earlier ones can dominate; each front keeps
 * the staircase of its rows in the last two columns, and whether a front dominates falls with its number, so that it is
 * found by bisection. For n rows O(n log² n) comparisons (insertion into a staircase moves elements besides).
 *
 * @param rows one to three columns, larger is better; turn the sign for a column that is to be small
 */
export function paretoFronts(rows: readonly (readonly (number | null)[])[]): (number | null)[] {
  const points = rows.map((row): readonly [number, number, number] | null => {
    if (row.length < 1 || row.length > paretoAxesLimit) {
      throw new RangeError(`Fronts are taken over 1 to ${paretoAxesLimit} columns, not ${row.length}.`)
    }
    const [x, y = 0, z = 0] = row
    // Adding zero makes -0 equal to 0 in every comparison.
    return isDefined(x) && isDefined(y) && isDefined(z) ? [x + 0, y + 0, z + 0] : null
  })
  const order = points.flatMap((point, at) => (point === null ? [] : [{ at, point }]))
  order.sort((a, b) => compare(a.point, b.point))
  const fronts: (number | null)[] = rows.map(() => null)
  const stairs: Staircase[] = []
  let last: { readonly point: readonly number[]; readonly front: number } | undefined
  for (const { at, point } of order) {
    if (last === undefined || !last.point.every((value, axis) => value === point[axis])) {
      const [, y, z] = point
      let low = 0
      let high = stairs.length
      while (low < high) {
        const middle = (low + high) >> 1
        if (stairs[middle].covers(y, z)) low = middle + 1
        else high = middle
      }
      if (low === stairs.length) stairs.push(new Staircase())
      stairs[low].add(y, z)
      last = { point, front: low + 1 }
    }
    fronts[at] = last.front
  }
  return fronts
}

const isDefined = (value: number | null): value is number => value !== null && Number.isFinite(value)

/** Larger first. */
function compare(a: readonly number[], b: readonly number[]): number {
  for (let axis = 0; axis < paretoAxesLimit; axis++)
    if (a[axis] !== b[axis]) return a[axis] > b[axis] ? -1 : 1
  return 0
}

/** The pairs (y, z) of a set that no other pair of it covers: y ascending, z descending. */
class Staircase {
  private readonly y: number[] = []
  private readonly z: number[] = []

  /** Whether some pair is at least as large in both. */
  covers(y: number, z: number): boolean {
    const at = this.firstFrom(y)
    return at < this.y.length && this.z[at] >= z
  }

  /** @param y, z a pair that is not covered */
  add(y: number, z: number): void {
    const end = this.firstFrom(y)
    let from = end
    while (from > 0 && this.z[from - 1] <= z) from--
    // A pair of equal y has a smaller z, for it would cover the new one otherwise.
    const through = this.y[end] === y ? end + 1 : end
    this.y.splice(from, through - from, y)
    this.z.splice(from, through - from, z)
  }

  /** Index of the first pair whose y is at least this large. */
  private firstFrom(y: number): number {
    let low = 0
    let high = this.y.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (this.y[middle] < y) low = middle + 1
      else high = middle
    }
    return low
  }
}
