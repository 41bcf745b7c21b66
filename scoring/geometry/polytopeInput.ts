import { InputError } from '../errors.ts'
import { compareLexicographic } from './integers.ts'

/**
 * The distinct points of an input in lexicographic order, after the checks that need no geometry.
 *
 * Paths are relative to the list of points: `[2][3]` is the last coordinate of the third point.
 *
 * @throws InputError polytope.wrong-shape, polytope.not-integers, polytope.unsafe-integers,
 *   polytope.too-few-points, polytope.not-four-dimensional
 */
export function checkedPoints(rows: readonly (readonly number[])[]): number[][] {
  rows.forEach(checkPoint)
  const sorted = rows.map((row) => row.map((entry) => entry + 0)).sort(compareLexicographic)
  const distinct = sorted.filter((row, i) => i === 0 || compareLexicographic(row, sorted[i - 1]) !== 0)
  if (distinct.length < 5) {
    const repeated = rows.length - distinct.length
    throw new InputError(
      'polytope.too-few-points',
      `${distinct.length} distinct points were given${repeated > 0 ? ` (${repeated} repeated)` : ''}; a polytope in four dimensions has at least 5 vertices.`,
      '',
      distinct.length,
    )
  }
  const dimension = affineDimension(distinct)
  if (dimension < 4) {
    throw new InputError(
      'polytope.not-four-dimensional',
      `The points span only ${dimension} ${dimension === 1 ? 'dimension' : 'dimensions'}; a polytope that spans all 4 is needed.`,
      '',
      dimension,
    )
  }
  return distinct
}

/**
 * Checks that a row is a lattice point: four safe integers.
 * @throws InputError polytope.wrong-shape, polytope.not-integers, polytope.unsafe-integers; paths begin `[index]`
 */
export function checkPoint(row: readonly number[], index: number): void {
  if (!Array.isArray(row) || row.length !== 4) {
    const found = Array.isArray(row) ? `has ${row.length} coordinates` : 'is no list of coordinates'
    throw new InputError(
      'polytope.wrong-shape',
      `Point ${index + 1} ${found}; every point needs 4.`,
      `[${index}]`,
      row,
    )
  }
  row.forEach((entry: unknown, axis) => {
    const place = `Coordinate ${axis + 1} of point ${index + 1}`
    if (typeof entry !== 'number' || !Number.isFinite(entry) || !Number.isInteger(entry)) {
      throw new InputError(
        'polytope.not-integers',
        `${place} is ${describe(entry)}; lattice points have integer coordinates.`,
        `[${index}][${axis}]`,
        entry,
      )
    }
    if (!Number.isSafeInteger(entry)) {
      throw new InputError(
        'polytope.unsafe-integers',
        `${place} is ${entry}, beyond ${Number.MAX_SAFE_INTEGER} in size, where integers are no longer exact.`,
        `[${index}][${axis}]`,
        entry,
      )
    }
  })
}

const describe = (entry: unknown): string =>
  typeof entry === 'string' ? `the text "${entry}"` : String(entry)

/** Dimension of the affine hull of integer points, exact; stops at the first points that span everything. */
export function affineDimension(points: Iterable<readonly number[]>): number {
  let base: readonly number[] | undefined
  const echelon: { pivot: number; row: bigint[] }[] = []
  for (const point of points) {
    base ??= point
    const origin = base
    const rest = point.map((entry, i) => BigInt(entry) - BigInt(origin[i]))
    for (const { pivot, row } of echelon) {
      const factor = rest[pivot]
      if (factor === 0n) continue
      for (let i = 0; i < rest.length; i++) rest[i] = rest[i] * row[pivot] - factor * row[i]
    }
    const pivot = rest.findIndex((entry) => entry !== 0n)
    if (pivot < 0) continue
    echelon.push({ pivot, row: rest })
    if (echelon.length === Math.min(rest.length, 4)) break
  }
  return echelon.length
}
