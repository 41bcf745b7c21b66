import type { IntersectionNumbers } from '../geometry/intersectionNumbers.ts'
import { ofTopology } from './described.ts'
import type { RecordSet } from './observable.ts'

/**
 * Element 2 e is edge e = (i, j) read as (a, b) = (i, j), element 2 e + 1 the same edge as (j, i). With both
 * orders present no rule can tell which point has the smaller index.
 */
function bothOrders(edgeNumbers: ArrayLike<number>, swap: boolean): ArrayLike<number> {
  if (!swap) return edgeNumbers
  const column = new Float64Array(edgeNumbers.length)
  for (let at = 0; at < column.length; at++) column[at] = edgeNumbers[at ^ 1]
  return column
}

const column = (pick: (numbers: IntersectionNumbers) => ArrayLike<number>, swap: boolean) => ({
  column: (candidate: { numbers(): IntersectionNumbers }) => bothOrders(pick(candidate.numbers()), swap),
  at: (candidate: { numbers(): IntersectionNumbers }, pair: number) =>
    pick(candidate.numbers())[swap ? pair ^ 1 : pair],
})

/** Ordered pairs of different divisors that meet in a curve. */
export const pairs: RecordSet = {
  kind: 'records',
  ...ofTopology({
    name: 'pairs',
    description:
      'Ordered pairs (a, b) of different divisors that meet. Each meeting counts twice, once in each order.',
    formula: '(a,b):\\ D_a \\cap D_b \\ne \\emptyset,\\ a \\ne b',
  }),
  size: (candidate) => candidate.numbers().edgeNumbers.length,
  fields: [
    {
      kind: 'element',
      of: 'divisors',
      ...ofTopology({ name: 'a', description: 'The first divisor.', formula: 'D_a' }),
      ...column((numbers) => numbers.edges, false),
    },
    {
      kind: 'element',
      of: 'divisors',
      ...ofTopology({ name: 'b', description: 'The second divisor.', formula: 'D_b' }),
      ...column((numbers) => numbers.edges, true),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofTopology({
        name: 'aab',
        description: 'Intersection number with the first divisor twice.',
        formula: '\\kappa_{aab}',
      }),
      ...column((numbers) => numbers.edgeNumbers, false),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofTopology({
        name: 'abb',
        description: 'Intersection number with the second divisor twice.',
        formula: '\\kappa_{abb}',
      }),
      ...column((numbers) => numbers.edgeNumbers, true),
    },
    {
      kind: 'value',
      type: 'integer',
      ...ofTopology({
        name: 'genus',
        description: 'Arithmetic genus of the curve in which the two divisors meet.',
        convention: 'for a curve of n components of genus 0: 1 - n',
        formula: 'g = 1 + \\tfrac12(\\kappa_{aab} + \\kappa_{abb})',
        source: 'adjunction on a threefold with trivial canonical class',
      }),
      at: (candidate, pair) => {
        const { edgeNumbers } = candidate.numbers()
        return 1 + (edgeNumbers[pair] + edgeNumbers[pair ^ 1]) / 2
      },
      column: (candidate) => {
        const { edgeNumbers } = candidate.numbers()
        const genus = new Float64Array(edgeNumbers.length)
        for (let at = 0; at < genus.length; at++) genus[at] = 1 + (edgeNumbers[at] + edgeNumbers[at ^ 1]) / 2
        return genus
      },
    },
  ],
}
