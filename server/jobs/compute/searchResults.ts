import {
  checkedFind,
  polytopeSource,
  readSearchResult,
  ruleOfInput,
  usesStarts,
  type GivenStart,
  type ListedFind,
  type PolytopeEntry,
  type SearchResult,
} from '../../../scoring/index.ts'
import type { MethodSettings } from '../../../shared/searchRunning.ts'
import type { SegmentFind } from '../segment.ts'
import { outcomeView } from './outcomeView.ts'

/** What the lines of a headless search say, as plain data; candidates are not checked yet. */
export interface ReportedResult extends Omit<SearchResult, 'spec' | 'null'> {
  readonly spec: {
    readonly polytopes: readonly { readonly key: string; readonly vertices: number[][] }[]
    readonly ruleText: string
    readonly method: string
    readonly seed: number
    readonly settings: {
      readonly budget: number
      readonly islands: number
      readonly keep: number
      readonly surrogate: boolean
    }
    readonly methodSettings: MethodSettings
    readonly starts: readonly GivenStart[]
    readonly startsUsed: boolean
    readonly extensions: readonly number[]
  }
  readonly null: unknown
}

export function readSearchResultText({ text }: { readonly text: string }): ReportedResult {
  const { spec, ...result } = readSearchResult(text)
  const { budget, islands, keep, surrogate, ...methodSettings } = spec.settings
  return {
    ...result,
    spec: {
      polytopes: spec.polytopes.map(({ key, vertices }) => ({
        key,
        vertices: vertices.map((row) => [...row]),
      })),
      ruleText: spec.ruleText,
      method: spec.method,
      seed: spec.seed,
      settings: { budget, islands, keep, surrogate },
      methodSettings,
      starts: spec.starts,
      startsUsed: usesStarts(spec.method),
      extensions: spec.extensions,
    },
  }
}

/** How long a piece of work on the interactive thread may take, which previews share. */
const pieceMilliseconds = 400

/** Places and scores the first candidates, as many as the time of a piece allows; one at the least. */
export function checkSearchResult({
  rule: text,
  polytopes,
  top,
  line,
  first,
}: {
  readonly rule: string
  readonly polytopes: readonly PolytopeEntry[]
  readonly top: readonly ListedFind[]
  readonly line: number
  /** Rank of the first. */
  readonly first: number
}): SegmentFind[] {
  const begun = performance.now()
  const rule = ruleOfInput(text)
  const source = polytopeSource(polytopes)
  const finds: SegmentFind[] = []
  for (const [n, one] of top.entries()) {
    const { polytopeKey, classKey, outcome, heights } = checkedFind(
      one,
      { line, rank: first + n },
      { source, rule },
    )
    finds.push({ polytopeKey, candidateKey: classKey, outcome: outcomeView(outcome), heights: [...heights] })
    if (performance.now() - begun > pieceMilliseconds) break
  }
  return finds
}
