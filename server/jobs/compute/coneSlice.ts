import { coneSlice as slice, type SliceDirection } from '../../../scoring/index.ts'
import type { ConeSliceQuery, ConeSliceView } from '../../../shared/coneSlices.ts'
import { storedCandidate, type CandidateGeometryInput } from './candidateGeometry.ts'

export interface ConeSliceInput extends CandidateGeometryInput {
  readonly directions: ConeSliceQuery
}

/** The cone that is counted, cut by a plane through the reference point. */
export function coneSlice({ directions, ...input }: ConeSliceInput): ConeSliceView {
  const candidate = storedCandidate(input)
  const { walls, cone, stretched, nearest, ...rest } = slice(
    candidate.class,
    candidate.numbers(),
    candidate.reference().weights,
    [directionOf(directions.first), directionOf(directions.second)],
    candidate.curves(),
  )
  return {
    key: input.key,
    walls: walls.map(({ slope, ...wall }) => ({ ...plainWall(wall), slope: [slope[0], slope[1]] })),
    cone: [...cone],
    stretched: [...stretched],
    nearest: nearest.map(plainWall),
    ...rest,
    directions: rest.directions.map(([x, y]): [number, number] => [x, y]),
  }
}

function directionOf(text: string): SliceDirection {
  const [kind, number] = text.split('-')
  if (kind === 'wall') return { wall: Number(number) }
  return kind === 'divisor' ? { divisor: Number(number) } : { ray: true }
}

type Wall = ReturnType<typeof slice>['nearest'][number]

function plainWall({ row, edges, value, distance }: Wall): ConeSliceView['nearest'][number] {
  return {
    row: row.map(([point, coefficient]): [number, number] => [point, coefficient]),
    edges: edges.map(([i, j]): [number, number] => [i, j]),
    value,
    distance,
  }
}
