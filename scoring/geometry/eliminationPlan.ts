import type { EliminationOrder } from './minimumDegree.ts'

/**
 * Where a Cholesky factor in a given elimination order is kept, and where each product of the elimination goes. The
 * first `sparse` columns stand one after another as in the order. The others, where fill leaves few zeros, form a full
 * triangle, packed by rows behind them: arithmetic on it costs a fraction of that through indices.
 */
export interface EliminationPlan {
  readonly order: EliminationOrder
  /** Number of columns kept sparsely. */
  readonly sparse: number
  /** Number of values: those of the sparse columns and of the packed triangle. */
  readonly length: number
  /**
   * For each sparse column in turn, for each entry a below the diagonal, for each entry b from a on: the place of
   * the entry (row of b, row of a), from which the product of both is taken.
   */
  readonly targets: Int32Array
}

/** Cost of a product through an index, in units of one in the packed triangle. By trial, and not critical. */
const indexed = 4

export function eliminationPlan(order: EliminationOrder): EliminationPlan {
  const { size, starts, rows } = order
  const sparse = sparseColumns(order)
  const base = starts[sparse]
  const count = size - sparse
  let products = 0
  for (let p = 0; p < sparse; p++) products += pairsOf(starts[p + 1] - starts[p] - 1)
  const targets = new Int32Array(products)
  let next = 0
  for (let p = 0; p < sparse; p++) {
    const end = starts[p + 1]
    for (let a = starts[p] + 1; a < end; a++) {
      const column = rows[a]
      if (column >= sparse) {
        const offset = base + column - sparse
        for (let b = a; b < end; b++) targets[next++] = offset + pairsOf(rows[b] - sparse)
        continue
      }
      // Both lists ascend, and the column has every row of the entries from a on.
      let q = starts[column]
      for (let b = a; b < end; b++) {
        while (rows[q] < rows[b]) q++
        targets[next++] = q
      }
    }
  }
  return { order, sparse, length: base + pairsOf(count), targets }
}

/** Place of the entry that couples variables a and b; the pair must be in the pattern. */
export function placeOf({ order, sparse }: EliminationPlan, a: number, b: number): number {
  const { positionOf, starts, rows } = order
  const column = Math.min(positionOf[a], positionOf[b])
  const row = Math.max(positionOf[a], positionOf[b])
  if (column >= sparse) return starts[sparse] + pairsOf(row - sparse) + column - sparse
  let low = starts[column]
  let high = starts[column + 1] - 1
  while (low < high) {
    const middle = (low + high) >> 1
    if (rows[middle] < row) low = middle + 1
    else high = middle
  }
  return low
}

/** How many columns to keep sparsely, so that the elimination costs least. */
function sparseColumns({ size, starts }: EliminationOrder): number {
  let best = size
  let least = Infinity
  let products = 0
  for (let sparse = 0; sparse <= size; sparse++) {
    const full = size - sparse
    const cost = indexed * products + (full * (full + 1) * (full + 2)) / 6
    if (cost < least) {
      least = cost
      best = sparse
    }
    if (sparse < size) products += pairsOf(starts[sparse + 1] - starts[sparse])
  }
  return best
}

/** Entries of a triangle with so many rows: also where the next row begins in it. */
const pairsOf = (n: number): number => (n * (n + 1)) / 2
