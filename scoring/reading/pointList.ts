/**
 * A list of points that indices refer to. Simplices whose corners are given by coordinates are turned into indices
 * with it: a point that is not listed yet is added.
 */
export class PointList {
  readonly rows: number[][]
  private readonly indexOf = new Map<string, number>()

  constructor(rows: readonly (readonly number[])[] = []) {
    this.rows = rows.map((row) => [...row])
    this.rows.forEach((row, index) => {
      const name = row.join()
      if (!this.indexOf.has(name)) this.indexOf.set(name, index)
    })
  }

  indexOfPoint(row: readonly number[]): number {
    const name = row.map((entry) => entry + 0).join()
    const known = this.indexOf.get(name)
    if (known !== undefined) return known
    this.indexOf.set(name, this.rows.length)
    return this.rows.push([...row]) - 1
  }
}
