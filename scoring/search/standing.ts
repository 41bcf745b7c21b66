import { InvariantError } from '../errors.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import type { Merit } from './merit.ts'
import type { Run } from './method.ts'
import type { PlacedHeights } from './sampling.ts'

/** A candidate that a chain goes on from. */
export interface Standing {
  readonly polytope: number
  readonly place: PlacedHeights
  readonly merit: Merit
}

/** The same inside a state. */
export interface StandingState extends Merit {
  readonly polytope: number
  readonly heights: string
}

export function storedStanding({ polytope, place, merit }: Standing): StandingState {
  return { polytope, heights: codeOfHeights(place.heights), kind: merit.kind, value: merit.value }
}

export function restoredStanding(
  run: Pick<Run, 'form'>,
  { polytope, heights, kind, value }: StandingState,
): Standing {
  return { polytope, place: restoredPlace(run, polytope, heights), merit: { kind, value } }
}

export function restoredPlace(run: Pick<Run, 'form'>, polytope: number, code: string): PlacedHeights {
  const heights = heightsOfCode(code)
  const cls = fineClass(run.form(polytope).polytope, heights)
  if (cls === undefined) throw new InvariantError('The heights stored in a state are not fine.')
  return { class: cls, heights }
}
