import {
  buildCandidate,
  canonicalClass,
  checkRule,
  classFromHeights,
  drawCandidates,
  evaluateColumn,
  facetGenericHeights,
  heightsOfCode,
  InvariantError,
  type CheckedRule,
  type DrawnCandidate,
} from '../../../scoring/index.ts'
import type { Cell } from '../../../shared/outcomes.ts'
import { pieceLength } from './pieceLength.ts'
import { scopeSource, stateOf } from './segments.ts'

export interface DrawInput {
  /** See `ScoredScope`. */
  readonly polytopes: string
  readonly seed: number
  /** JSON text of the state after the piece before; null at the beginning. */
  readonly state: string | null
  /** Candidates at most, and the time after which no other is begun. */
  readonly count: number
  readonly milliseconds: number
}

export interface DrawnPiece {
  readonly state: string
  readonly rows: readonly DrawnCandidate[]
  /** Nothing new turns up any more. */
  readonly ended: boolean
  /** Time the piece took on its thread. */
  readonly milliseconds: number
}

/** Draws the next candidates of the null sample of a scope, as no rule sees them. */
export function drawSample({ polytopes, seed, state, count, milliseconds }: DrawInput): DrawnPiece {
  const begun = performance.now()
  const drawn = drawCandidates(
    scopeSource(polytopes),
    seed,
    stateOf(state),
    count,
    pieceLength(milliseconds, begun),
  )
  const { rows, ended } = drawn
  return { rows, ended, state: JSON.stringify(drawn.state), milliseconds: performance.now() - begun }
}

export interface CellsInput {
  readonly polytopes: string
  /** Texts of rules whose only report column is the expression. */
  readonly columns: readonly string[]
  readonly candidates: readonly DrawnCandidate[]
}

export interface CellsPiece {
  /** Per candidate, in the order of the columns; of the first candidates, as many as the time of a piece allows. */
  readonly cells: readonly (readonly Cell[])[]
  readonly milliseconds: number
}

/** Work of one piece: previews, imports and dossiers get their turn in between. */
const pieceMilliseconds = 50

/** Evaluates columns on candidates; one candidate at the least. */
export function columnCells({ polytopes, columns, candidates }: CellsInput): CellsPiece {
  const begun = performance.now()
  const source = scopeSource(polytopes)
  const places = new Map(source.keys.map((key, place) => [key, place]))
  const rules = columns.map(ruleOf)
  const cells: Cell[][] = []
  for (const { candidateKey, polytopeKey, heights } of candidates) {
    const place = places.get(polytopeKey)
    if (place === undefined) throw new InvariantError(`Polytope ${polytopeKey} is not in the scope.`)
    const form = source.at(place)
    const given = classFromHeights(form.polytope, heightsOfCode(heights))
    const canonical = given.fine ? canonicalClass(form, given.class) : null
    if (canonical?.key !== candidateKey) {
      throw new InvariantError(
        `The heights of candidate ${candidateKey} give ${canonical?.key ?? 'no class'}.`,
      )
    }
    const candidate = buildCandidate(form, canonical.class, candidateKey)
    cells.push(
      rules.map((rule): Cell => {
        const cell = evaluateColumn({ rule }, candidate)
        return cell.value === null ? { undefined: cell.reason } : cell.value
      }),
    )
    if (performance.now() - begun > pieceMilliseconds) break
  }
  return { cells, milliseconds: performance.now() - begun }
}

function ruleOf(text: string): CheckedRule {
  const check = checkRule(text)
  if (!check.ok) throw new InvariantError('A column that was checked has errors.')
  return check.rule
}

export interface GenericInput {
  readonly polytopes: string
  readonly candidates: readonly DrawnCandidate[]
}

/** Heights under which the candidates may be stored: they tie neither in a 2-face nor in a facet. */
export function genericHeights({ polytopes, candidates }: GenericInput): number[][] {
  const source = scopeSource(polytopes)
  return candidates.map(({ polytopeKey, heights }) => {
    const { polytope } = source.at(source.keys.indexOf(polytopeKey))
    return [...facetGenericHeights(polytope, heightsOfCode(heights))]
  })
}
