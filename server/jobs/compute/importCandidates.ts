import {
  InputError,
  placeCandidate,
  PlacingSession,
  polytopeFromWeights,
  readCandidates,
  readWeightLines,
  type CandidateReading,
  type GivenCandidate,
  type Orientation,
  type ReadingProblem,
} from '../../../scoring/index.ts'
import type { FactsOrProblem } from './importBlocks.ts'
import { polytopeFacts, type PolytopeFacts } from './polytopeFacts.ts'

/** How long a piece of work on the interactive thread may take, which previews share. */
const pieceMilliseconds = 400

/** What this thread keeps between pieces of an import; it spares time and alters no result. */
const session = new PlacingSession()

/** A candidate as it is stored, or why it is none. */
export type StorableOrProblem =
  | {
      readonly candidate: {
        readonly key: string
        readonly heights: number[]
        readonly polytope: PolytopeFacts
      }
      readonly problem?: undefined
    }
  | { readonly candidate?: undefined; readonly problem: ReadingProblem }

export function candidatesOfText(input: {
  readonly text: string
  readonly orientation?: Orientation
}): CandidateReading {
  return readCandidates(input.text, input.orientation)
}

export function weightLinesOfText({ text }: { readonly text: string }): ReturnType<typeof readWeightLines> {
  return readWeightLines(text)
}

/** Answers for as many candidates as the time of a piece allows, the first ones in order; one at the least. */
export function placeCandidates({
  given,
}: {
  readonly given: readonly GivenCandidate[]
}): StorableOrProblem[] {
  const begun = performance.now()
  const facts = new Map<string, PolytopeFacts>()
  const answers: StorableOrProblem[] = []
  for (const one of given) {
    const { placed, problem } = placeCandidate(one, session)
    if (placed) {
      const { form, candidateKey, heights } = placed
      const polytope = facts.get(form.key) ?? polytopeFacts(form.polytope)
      facts.set(form.key, polytope)
      answers.push({ candidate: { key: candidateKey, heights: [...heights], polytope } })
    } else answers.push({ problem })
    if (performance.now() - begun > pieceMilliseconds) break
  }
  return answers
}

/** The polytopes of weight systems, as many as the time of a piece allows; one at the least. */
export function factsOfWeightLines(input: {
  readonly systems: readonly (readonly number[])[]
  readonly side: 'fan' | 'newton'
}): FactsOrProblem[] {
  const begun = performance.now()
  const answers: FactsOrProblem[] = []
  for (const weights of input.systems) {
    try {
      answers.push({ facts: polytopeFacts(polytopeFromWeights(weights, input.side)) })
    } catch (error) {
      if (!(error instanceof InputError)) throw error
      const { code, message, path } = error
      answers.push({ problem: { code, message, path } })
    }
    if (performance.now() - begun > pieceMilliseconds) break
  }
  return answers
}
