import { InputError } from '../errors.ts'
import type { BasisChange } from '../geometry/latticeReduction.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { polytopeFromPoints, polytopeInReducedBasis, type Polytope } from '../geometry/polytope.ts'
import { polytopeFromWeights } from '../geometry/weights.ts'
import type { GivenPolytope } from './given.ts'

/** A polytope as given, in coordinates that can be kept. */
interface BuiltPolytope {
  readonly polytope: Polytope
  /** From the coordinates given to those of `polytope`; absent when they are the same. */
  readonly basis?: BasisChange
  readonly form: NormalForm
}

/**
 * The polytopes of the last candidates: an import often has many candidates on one. Spares time and alters no result.
 */
export class PlacingSession {
  private readonly built = new Map<string, BuiltPolytope>()

  constructor(private readonly limit = 8) {}

  /**
   * @param reduce false where the coordinates given must be kept
   * @throws InputError of the geometry, with paths that begin with the section (`vertices[2][1]`)
   */
  polytope(given: GivenPolytope, reduce: boolean): BuiltPolytope {
    const name = `${reduce} ${JSON.stringify(given)}`
    let built = this.built.get(name)
    if (built === undefined) {
      const made = polytopeOf(given, reduce)
      built = { ...made, form: normalForm(made.polytope) }
    }
    this.built.delete(name)
    this.built.set(name, built)
    for (const oldest of this.built.keys()) {
      if (this.built.size <= this.limit) break
      this.built.delete(oldest)
    }
    return built
  }
}

function polytopeOf(given: GivenPolytope, reduce: boolean): { polytope: Polytope; basis?: BasisChange } {
  switch (given.kind) {
    case 'points':
      return inSection('vertices', () =>
        reduce ? polytopeInReducedBasis(given.rows) : { polytope: polytopeFromPoints(given.rows) },
      )
    case 'weights':
      return { polytope: inSection('weights', () => polytopeFromWeights(given.weights, given.side)) }
    case 'key': {
      const { vertices } = given
      if (vertices === undefined) {
        throw new InputError(
          'polytope.not-known',
          `There is no polytope with the key ${given.key} in the library or in this campaign; give its vertices.`,
          'polytope',
          given.key,
        )
      }
      return { polytope: inSection('vertices', () => polytopeFromPoints(vertices)) }
    }
  }
}

/** Runs a check; the path of what it throws gets the section's name in front. */
export function inSection<T>(section: string, check: () => T): T {
  try {
    return check()
  } catch (error) {
    if (!(error instanceof InputError)) throw error
    throw new InputError(error.code, error.message, `${section}${error.path}`, error.found)
  }
}
