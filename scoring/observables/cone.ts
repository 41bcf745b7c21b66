import { ofCone, SOURCES } from './described.ts'
import type { ScalarObservable } from './observable.ts'

/** What depends on the reference point: the Kaehler class all volumes are taken at. */
export const coneObservables: readonly ScalarObservable[] = [
  {
    kind: 'scalar',
    type: 'number',
    ...ofCone({
      name: 'volume',
      description: 'Volume of the threefold.',
      unit: 'l_s^6',
      convention: "units 2 pi sqrt(alpha') = 1, Einstein frame, leading order",
      scaling: 3,
      formula: 'V = \\tfrac16 \\kappa_{ijk} w_i w_j w_k',
      source: SOURCES.volumes,
    }),
    read: (candidate) => candidate.volumes().total,
  },
  {
    kind: 'scalar',
    type: 'number',
    ...ofCone({
      name: 'reference.norm',
      description: 'Norm of the reference point: how far from the origin all curves reach size one.',
      unit: 'l_s^2',
      convention: 'over all prime toric divisors, so independent of a basis',
      scaling: 1,
      formula: '|w| = \\Bigl(\\sum_k w_k^2\\Bigr)^{1/2}',
    }),
    read: (candidate) => {
      let sum = 0
      for (const weight of candidate.reference().weights) sum += weight * weight
      return Math.sqrt(sum)
    },
  },
  {
    kind: 'scalar',
    type: 'truth',
    ...ofCone({
      name: 'reference.edgeCurvesSuffice',
      description:
        'The edge curves alone fix the reference point, so inner and outer description of the cone agree there.',
      formula: '\\text{rounds} = 0',
    }),
    read: (candidate) => (candidate.reference().edgeCurvesSuffice ? 1 : 0),
  },
]
