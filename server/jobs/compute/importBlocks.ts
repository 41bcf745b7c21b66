import { InputError, parsePointBlocks, polytopeFromWeights, reducedPolytope } from '../../../scoring/index.ts'
import { polytopeFacts, type PolytopeFacts } from './polytopeFacts.ts'

/** Matrices found in a text, and what was no matrix. */
export type PointBlocks = ReturnType<typeof parsePointBlocks>

/** A polytope's facts, or why the points are no reflexive polytope. */
export type FactsOrProblem =
  | { readonly facts: PolytopeFacts; readonly problem?: undefined }
  | {
      readonly facts?: undefined
      readonly problem: { readonly code: string; readonly message: string; readonly path: string }
    }

export function pointBlocks({ text }: { readonly text: string }): PointBlocks {
  return parsePointBlocks(text)
}

/** One answer per set of points: a wrong one does not spoil the others. */
export function factsOfEach({
  points,
}: {
  readonly points: readonly (readonly number[][])[]
}): FactsOrProblem[] {
  return points.map((rows) => {
    try {
      return { facts: polytopeFacts(reducedPolytope(rows)) }
    } catch (error) {
      if (!(error instanceof InputError)) throw error
      const { code, message, path } = error
      return { problem: { code, message, path } }
    }
  })
}

export function factsOfWeights(input: {
  readonly weights: readonly number[]
  readonly side: 'fan' | 'newton'
}): PolytopeFacts {
  return polytopeFacts(polytopeFromWeights(input.weights, input.side))
}
