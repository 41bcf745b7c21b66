import {
  classFromHeights,
  intersectionNumbers,
  InvariantError,
  nearestLabelling,
  normalForm,
  polytopeFromPoints,
  trianglesApart,
  wallInvariants,
  wallVersion,
  type NormalForm,
  type Polytope,
  type TwoFaceClass,
} from '../../../scoring/index.ts'
import type { WallInvariantsView } from '../../../shared/relatives.ts'
import type { CandidateGeometryInput } from './candidateGeometry.ts'

export interface ComputedInvariants {
  readonly key: string
  readonly invariants: WallInvariantsView
}

/** The Wall-type invariants of stored candidates. */
export function invariantsOfEach({
  candidates,
}: {
  readonly candidates: readonly CandidateGeometryInput[]
}): ComputedInvariants[] {
  return candidates.map(({ key, vertices, heights }) => {
    const cls = storedClass(polytopeFromPoints(vertices), key, heights)
    const all = wallInvariants(cls, intersectionNumbers(cls))
    const { h11, h21, fundamentalGroup, triple, square, cube, chern, chi, products, parity } = all
    return {
      key,
      invariants: {
        key: all.key,
        version: wallVersion,
        h11,
        h21,
        fundamentalGroup,
        triple,
        square,
        cube,
        chern,
        chi,
        products: [...products],
        parity: { ...parity },
      },
    }
  })
}

export interface NearDuplicatesInput extends CandidateGeometryInput {
  /** Stored candidates on the same polytope. */
  readonly others: readonly { readonly key: string; readonly heights: readonly number[] }[]
  /** Differences above this number of triangles are left out. */
  readonly most: number
}

/** Those of the other candidates that differ from one in few triangles, nearest first. */
export function nearDuplicates({
  key,
  vertices,
  heights,
  others,
  most,
}: NearDuplicatesInput): { key: string; triangles: number }[] {
  const form: NormalForm = normalForm(polytopeFromPoints(vertices))
  const own = storedClass(form.polytope, key, heights)
  return others
    .flatMap((other) => {
      const cls = storedClass(form.polytope, other.key, other.heights, own)
      const triangles = trianglesApart(form, own, cls, most)
      return triangles === null ? [] : [{ key: other.key, triangles }]
    })
    .sort((a, b) => a.triangles - b.triangles || (a.key < b.key ? -1 : 1))
}

export interface AlignmentInput extends CandidateGeometryInput {
  /** A stored candidate on the same polytope. */
  readonly other: { readonly key: string; readonly heights: readonly number[] }
}

/** The symmetry of the polytope that lays another candidate on one with the least difference. */
export function alignCandidates({ key, vertices, heights, other }: AlignmentInput): {
  image: number[]
  triangles: number
} {
  const form = normalForm(polytopeFromPoints(vertices))
  const own = storedClass(form.polytope, key, heights)
  const cls = storedClass(form.polytope, other.key, other.heights, own)
  const nearest = nearestLabelling(form, own, cls, own.triangles.length / 3)
  if (!nearest) throw new InvariantError('A polytope without automorphisms, not even the identity.')
  return { image: Array.from(nearest.image), triangles: nearest.triangles }
}

function storedClass(
  polytope: Polytope,
  key: string,
  heights: readonly number[],
  start?: TwoFaceClass,
): TwoFaceClass {
  const outcome = classFromHeights(polytope, heights, start)
  if (!outcome.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
  return outcome.class
}
