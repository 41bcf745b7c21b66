import fc from 'fast-check'

/** A row operation: add `factor` times row `from` to row `to`; equal rows stand for a change of sign. */
export interface RowOperation {
  readonly to: number
  readonly from: number
  readonly factor: number
}

/** Matrices of GL(4,Z) as products of elementary ones. */
export function unimodular(length: number, size: number): fc.Arbitrary<RowOperation[]> {
  const row = fc.integer({ min: 0, max: 3 })
  const operation = fc.record({ to: row, from: row, factor: fc.integer({ min: -size, max: size }) })
  return fc.array(operation, { minLength: 1, maxLength: length })
}

/** The images of points under the product of the operations, in order. */
export function transformed(
  points: readonly (readonly number[])[],
  operations: readonly RowOperation[],
): number[][] {
  return points.map((point) => {
    const image = [...point]
    for (const { to, from, factor } of operations) {
      if (to === from) image[to] = 0 - image[to]
      else image[to] += factor * image[from]
    }
    return image
  })
}

/** The points of a flat list, 4 coordinates each. */
export function rowsOfFour(flat: ArrayLike<number>): number[][] {
  return Array.from({ length: flat.length / 4 }, (_, i) => [0, 1, 2, 3].map((axis) => flat[4 * i + axis]))
}

export const quintic = [
  [1, 0, 0, 0],
  [0, 1, 0, 0],
  [0, 0, 1, 0],
  [0, 0, 0, 1],
  [-1, -1, -1, -1],
]
