import { ofTopology } from './described.ts'
import { startsOfEqual } from './memberLists.ts'
import type { RecordSet } from './observable.ts'

const threeEach = (triangles: ArrayLike<number>) => ({
  starts: startsOfEqual(3, triangles),
  items: triangles,
})

/** The triangles of the class, one for every triple of distinct divisors that meet. */
export const triangles: RecordSet = {
  kind: 'records',
  ...ofTopology({
    name: 'triangles',
    description: 'The triangles that cut the 2-faces: all there is to the class.',
    formula: '\\{(i,j,k)\\}',
  }),
  size: (candidate) => candidate.class.faceOf.length,
  fields: [
    {
      kind: 'element',
      of: 'faces',
      ...ofTopology({
        name: 'face',
        description: 'The 2-face the triangle lies on.',
        formula: 'f \\supset (i,j,k)',
      }),
      column: (candidate) => candidate.class.faceOf,
      at: (candidate, t) => candidate.class.faceOf[t],
    },
    {
      kind: 'members',
      of: 'divisors',
      ...ofTopology({
        name: 'divisors',
        description: 'The divisors of its three corners.',
        formula: '\\{D_i, D_j, D_k\\}',
      }),
      members: (candidate) => threeEach(candidate.class.triangles),
    },
  ],
}

/** Unordered triples of distinct divisors with a non-zero intersection number. */
export const triples: RecordSet = {
  kind: 'records',
  ...ofTopology({
    name: 'triples',
    description: 'Unordered triples of different divisors that meet, with their intersection number.',
    formula: '\\{i,j,k\\}:\\ \\kappa_{ijk} \\ne 0',
  }),
  size: (candidate) => candidate.numbers().triangleNumbers.length,
  fields: [
    {
      kind: 'value',
      type: 'integer',
      ...ofTopology({
        name: 'number',
        description: 'Number of points in which the three divisors meet.',
        formula: '\\kappa_{ijk} = L_f',
      }),
      column: (candidate) => candidate.numbers().triangleNumbers,
      at: (candidate, t) => candidate.numbers().triangleNumbers[t],
    },
    {
      kind: 'members',
      of: 'divisors',
      ...ofTopology({ name: 'divisors', description: 'The three divisors.', formula: '\\{D_i, D_j, D_k\\}' }),
      members: (candidate) => threeEach(candidate.numbers().triangles),
    },
  ],
}
