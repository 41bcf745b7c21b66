/** How a polytope is given in a text. */
export type GivenPolytope =
  /** Points whose hull it is. */
  | { readonly kind: 'points'; readonly rows: readonly (readonly number[])[] }
  | { readonly kind: 'weights'; readonly weights: readonly number[]; readonly side: 'fan' | 'newton' }
  /** By the key of its normal form: known to the library, or with its vertices in normal-form coordinates. */
  | { readonly kind: 'key'; readonly key: string; readonly vertices?: readonly (readonly number[])[] }

/** How a triangulation is given. Indices count from 0 and refer to `GivenCandidate.points`. */
export type GivenTriangulation =
  | { readonly kind: 'heights'; readonly values: readonly number[] }
  /** S |v|^2 plus seeded noise, as the headless evaluation makes them. */
  | { readonly kind: 'quadratic'; readonly seed?: number; readonly noise?: number }
  /** Maximal simplices: 4 indices with the origin implied, or 5 of which one is the origin. */
  | { readonly kind: 'simplices'; readonly rows: readonly (readonly number[])[] }
  /** Triangles of the 2-faces. */
  | { readonly kind: 'triangles'; readonly rows: readonly (readonly number[])[] }
  /** Nothing but the permanent address of a candidate. */
  | { readonly kind: 'address' }

export type Section = 'vertices' | 'weights' | 'polytope' | 'points' | 'heights' | 'simplices' | 'triangles'

/** Line of each row of a section, counted from 1; one line only when all rows stand on it. */
export type Places = Readonly<Partial<Record<Section, readonly number[]>>>

/** A candidate as a text gives it: nothing is known of it yet but its shape. Plain data. */
export interface GivenCandidate {
  /** Line on which it begins, counted from 1. */
  readonly line: number
  /** Where in the text, in the format's own words: `row 3`, `candidates[2]`; empty when the line says it all. */
  readonly entry: string
  readonly name: string | null
  readonly polytope: GivenPolytope
  /**
   * The points that heights and indices refer to, in the polytope's coordinates. Null: the rows of `polytope`, or
   * the points of the polytope in the order in which the engine lists them, for a key or weights.
   */
  readonly points: readonly (readonly number[])[] | null
  readonly triangulation: GivenTriangulation
  /**
   * How the text names points in simplices and triangles: by index, what the first is called (0 or 1), or by their
   * coordinates. Messages do the same.
   */
  readonly naming: 0 | 1 | 'coordinates'
  /** Keys that the text says it has. They are compared with what the geometry gives. */
  readonly claims: { readonly polytopeKey?: string; readonly candidateKey?: string }
  readonly places: Places
}

/** Something that was not understood and left out, with its place. */
export interface ReadingProblem {
  /** Line, counted from 1. */
  readonly line: number
  readonly entry: string
  readonly code: string
  readonly message: string
}

/** What a text holds. */
export interface CandidateReading {
  /** The format that was recognised, in words: `text in sections`, `tessellary.search/1, JSON Lines`, ... */
  readonly format: string
  readonly candidates: readonly GivenCandidate[]
  readonly problems: readonly ReadingProblem[]
  /** Lines passed over because they are no data: comments of the format are not among them. */
  readonly skipped: readonly { readonly line: number; readonly text: string }[]
  /** Matrices that can be read by rows and by columns; asked about, unless the reader was told. */
  readonly ambiguous: readonly { readonly line: number; readonly what: string }[]
}

export type Orientation = 'rows' | 'columns'

/** Line of row `index` of a section. */
export function lineOfRow(places: Places, section: Section, index: number): number | undefined {
  const lines = places[section]
  if (lines === undefined || lines.length === 0) return undefined
  return lines.length === 1 ? lines[0] : lines[Math.min(index, lines.length - 1)]
}

/** The places of rows: one line when they share it. */
export function linesOf(lines: readonly number[]): readonly number[] {
  return lines.every((line) => line === lines[0]) ? lines.slice(0, 1) : [...lines]
}
