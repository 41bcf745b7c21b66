import { InputError } from '../errors.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { facetGenericWitness } from '../geometry/fans/facetGenericHeights.ts'
import { heightsOfSimplices } from '../geometry/fans/heightsOfSimplices.ts'
import { heightsOfTriangles } from '../geometry/fans/heightsOfTriangles.ts'
import { quadraticHeights } from '../geometry/heights.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import { toNormalForm, transportHeights } from '../geometry/transport.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { witnessHeights } from '../search/witness.ts'
import type { GivenCandidate, ReadingProblem, Section } from './given.ts'
import { lineOfRow } from './given.ts'
import { requireStar } from './originHeight.ts'
import { classOfHeights, placedHeights } from './placedHeights.ts'
import { placedPoints, type PlacedPoints } from './placedPoints.ts'
import { PlacingSession } from './placingSession.ts'
import { placedRows } from './placedSimplices.ts'

/** A candidate whose geometry was checked: what is stored of it. */
export interface PlacedCandidate {
  readonly form: NormalForm
  /** The permanent address. */
  readonly candidateKey: string
  /** Integer heights that give exactly the canonical class, one per point of `form.polytope`. */
  readonly heights: readonly number[]
}

/** Of a candidate given by its address, with what is known under it: see `GivenTriangulation`. */
export type Placing =
  | { readonly placed: PlacedCandidate; readonly problem?: undefined }
  | { readonly placed?: undefined; readonly problem: ReadingProblem }

/** Checks a candidate's geometry; what is wrong with it comes back with its place in the text. */
export function placeCandidate(given: GivenCandidate, session = new PlacingSession()): Placing {
  try {
    return { placed: geometryOf(given, session) }
  } catch (error) {
    if (!(error instanceof InputError)) throw error
    return { problem: located(given, error) }
  }
}

function geometryOf(given: GivenCandidate, session: PlacingSession): PlacedCandidate {
  if (given.triangulation.kind === 'address') throw notStored(given)
  const placed = placedPoints(given, session)
  const { form } = placed
  const { polytopeKey, candidateKey } = given.claims
  if (polytopeKey !== undefined && polytopeKey !== form.key) {
    throw new InputError(
      'candidate.other-polytope',
      `The text says that the polytope has the key ${polytopeKey}, but its vertices give ${form.key}.`,
      'vertices',
      form.key,
    )
  }
  const { cls, heights } = classOf(placed, given)
  const canonical = canonicalClass(form, toNormalForm(form, cls))
  if (candidateKey !== undefined && candidateKey !== canonical.key) {
    throw new InputError(
      'candidate.other-key',
      `The text says that the candidate has the key ${candidateKey}, but its triangulation gives ${canonical.key}.`,
      given.triangulation.kind,
      canonical.key,
    )
  }
  const carried = transportHeights(transportHeights(heights, form.relabelling), canonical.relabelling)
  const witness = facetGenericWitness(canonical.class, witnessHeights(canonical.class, carried))
  return { form, candidateKey: canonical.key, heights: [...witness] }
}

function classOf(
  placed: PlacedPoints,
  { triangulation, naming, claims }: GivenCandidate,
): { readonly cls: TwoFaceClass; readonly heights: ArrayLike<number> } {
  switch (triangulation.kind) {
    case 'heights': {
      const heights = placedHeights(placed, triangulation.values)
      const cls = classOfHeights(placed, heights)
      const index = placed.places.indexOf('origin')
      if (index >= 0) requireStar(placed, cls, heights, { height: triangulation.values[index], index })
      return { cls, heights }
    }
    case 'quadratic': {
      const heights = quadraticHeights(placed.polytope, triangulation)
      return { cls: classOfHeights(placed, heights), heights }
    }
    case 'simplices': {
      const rows = placedRows(placed, 'simplices', triangulation.rows, naming)
      const proved = heightsOfSimplices(placed.polytope, rows, placed.labelOf)
      return { cls: proved.class, heights: proved.heights }
    }
    case 'triangles': {
      const rows = placedRows(placed, 'triangles', triangulation.rows, naming)
      const proved = heightsOfTriangles(placed.polytope, rows, placed.labelOf)
      return { cls: proved.class, heights: proved.heights }
    }
    case 'address':
      throw notStored({ claims })
  }
}

function notStored({ claims }: Pick<GivenCandidate, 'claims'>): InputError {
  return new InputError(
    'candidate.not-stored',
    `No candidate with the key ${claims.candidateKey} is known here, and the text gives no triangulation to make it from.`,
    'candidate',
    claims.candidateKey,
  )
}

const sections = ['vertices', 'weights', 'polytope', 'points', 'heights', 'simplices', 'triangles'] as const

/** A mistake with the line of the row it speaks of. */
function located({ line, entry, places }: GivenCandidate, error: InputError): ReadingProblem {
  const parts = /^(\w+)(?:\[(\d+)\])?/.exec(error.path)
  const named = sections.find((section) => section === parts?.[1])
  // A polytope may be given by its points alone.
  const section: Section | undefined =
    named === 'vertices' && places.vertices === undefined ? 'points' : named
  const place = section && lineOfRow(places, section, parts?.[2] === undefined ? 0 : Number(parts[2]))
  const path = error.path === '' ? entry : entry === '' ? error.path : `${entry}.${error.path}`
  return { line: place ?? line, entry: path, code: error.code, message: error.message }
}
