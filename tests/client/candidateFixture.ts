import {
  canonicalClass,
  classFromHeights,
  normalForm,
  polytopeFromWeights,
  quadraticHeights,
} from '../../scoring/index.ts'
import { candidateGeometry } from '../../server/jobs/compute/candidateGeometry.ts'
import { polytopeFacts } from '../../server/jobs/compute/polytopeFacts.ts'
import { polytopeShape } from '../../server/jobs/compute/polytopeShape.ts'
import { candidateGeometrySchema, type CandidateGeometry } from '../../shared/candidates.ts'

/** What a computed candidate was given, as the database keeps it. */
export interface StoredCandidate {
  readonly key: string
  readonly vertices: number[][]
  readonly heights: number[]
}

/** A real candidate on a polytope of a weight system, from |v|² and noise of a seed. */
export function storedCandidate(
  weights: readonly number[],
  seed: number,
  side: 'fan' | 'newton' = 'newton',
): StoredCandidate {
  const polytope = polytopeFromWeights([...weights], side)
  const form = normalForm(polytope)
  const heights = quadraticHeights(form.polytope, { seed, noise: 0.49 })
  const given = classFromHeights(form.polytope, heights)
  if (!given.fine) throw new Error('quadratic heights are fine')
  const { key, relabelling } = canonicalClass(form, given.class)
  const canonical: number[] = []
  heights.forEach((height, point) => (canonical[relabelling[point] ?? point] = height))
  return { key, vertices: polytopeFacts(polytope).coordinates, heights: canonical }
}

/** Its dossier as the server would answer it. */
export function dossierOf(stored: StoredCandidate, weights: readonly number[]): CandidateGeometry {
  const { coordinates, ...facts } = polytopeFacts(polytopeFromWeights([...weights], 'newton'))
  const shape = polytopeShape({ vertices: coordinates })
  const polytope = {
    ...facts,
    ...shape,
    euler: 2 * (facts.h11 - facts.h21),
    name: `newton-${weights.join('-')}`,
    origin: 'bundled',
    weights: null,
    side: null,
    classes: null,
    classOrbits: null,
    mirrorKey: null,
  }
  return candidateGeometrySchema.parse({ key: stored.key, polytope, ...candidateGeometry(stored) })
}
