import { curveRow, type CurveRows } from '../geometry/curves.ts'
import { ofCone, ofTopology, SOURCES } from './described.ts'
import { startsOfEqual } from './memberLists.ts'
import type { RecordSet, ValueField } from './observable.ts'

/** An integer per row of the curve classes, folded from the row's entries. */
const folded = (
  entry: ReturnType<typeof ofTopology>,
  fold: (row: number, entry: number) => number,
): ValueField => ({
  kind: 'value',
  type: 'integer',
  ...entry,
  column: (candidate) => foldRows(candidate.curves(), fold),
  at: (candidate, e) =>
    curveRow(candidate.class, candidate.numbers(), e).reduce((value, entry) => fold(value, entry), 0),
})

function foldRows(
  { starts, coefficients }: CurveRows,
  fold: (row: number, entry: number) => number,
): Float64Array {
  const column = new Float64Array(starts.length - 1)
  for (let r = 0; r < column.length; r++) {
    let value = 0
    for (let at = starts[r]; at < starts[r + 1]; at++) value = fold(value, coefficients[at])
    column[r] = value
  }
  return column
}

/** The curves D_i . D_j, one per edge of the class, as primitive classes. */
export const curves: RecordSet = {
  kind: 'records',
  ...ofTopology({
    name: 'curves',
    description: 'The curves in which two divisors meet, one per pair. Several may have the same class.',
    convention: 'primitive classes: the row of intersection numbers divided by its greatest common divisor',
    formula: 'C_{ij} = D_i \\cdot D_j / \\gcd',
  }),
  size: (candidate) => candidate.numbers().edges.length / 2,
  fields: [
    {
      kind: 'value',
      type: 'number',
      ...ofCone({
        name: 'volume',
        description: 'Volume of the primitive class.',
        unit: 'l_s^2',
        convention: "units 2 pi sqrt(alpha') = 1, Einstein frame, leading order",
        scaling: 1,
        formula: 'C \\cdot w = \\sum_k C_k w_k',
        source: SOURCES.volumes,
      }),
      column: (candidate) => candidate.volumes().curves,
    },
    folded(
      ofTopology({
        name: 'least',
        description: 'Smallest intersection number with a prime toric divisor.',
        formula: '\\min_k C \\cdot D_k',
      }),
      Math.min,
    ),
    folded(
      ofTopology({
        name: 'greatest',
        description: 'Largest intersection number with a prime toric divisor.',
        formula: '\\max_k C \\cdot D_k',
      }),
      Math.max,
    ),
    folded(
      ofTopology({
        name: 'negative',
        description:
          'Number of prime toric divisors with negative intersection: those that must contain the curve.',
        formula: '\\#\\{k : C \\cdot D_k < 0\\}',
      }),
      (count, entry) => count + (entry < 0 ? 1 : 0),
    ),
    {
      kind: 'members',
      of: 'divisors',
      ...ofTopology({
        name: 'divisors',
        description: 'The two divisors that meet in it.',
        formula: '\\{D_i, D_j\\}',
      }),
      members: (candidate) => {
        const { edges } = candidate.numbers()
        return { starts: startsOfEqual(2, edges), items: edges }
      },
    },
  ],
}
