import type { Proposal, Run } from './method.ts'
import type { PlacedHeights } from './sampling.ts'
import { drawStart } from './starts.ts'

/** A random candidate with the polytope it is on. */
export interface Start {
  readonly polytope: number
  readonly place: PlacedHeights
}

/**
 * A random candidate on a polytope that `drawPolytope` gives; of several draws the one that the run's surrogate finds
 * most promising, where there is one.
 *
 * @returns null when there is no polytope to draw from
 */
export function promisingStart(run: Run, drawPolytope: () => number): Start | null {
  return run.choose(
    () => {
      const polytope = drawPolytope()
      return polytope < 0 ? null : { polytope, place: drawStart(run.form(polytope).polytope, run.stream) }
    },
    (start) => start && { polytope: start.polytope, class: start.place.class },
  )
}

/** A step from a candidate, with the kind of move that makes it. */
export interface Step {
  readonly from: Start
  readonly kind: number
  /** Undefined when the move leads nowhere; its class may be the old one. */
  readonly proposal: Proposal | undefined
}

/** A step; of several draws the one that the run's surrogate finds most promising, where there is one. */
export function promisingStep<S extends Step>(run: Run, draw: () => S): S {
  return run.choose(draw, ({ from, proposal }) =>
    proposal === undefined || proposal.class === from.place.class
      ? null
      : { polytope: from.polytope, class: proposal.class },
  )
}
