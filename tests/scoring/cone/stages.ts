import { curveRows, type CurveRows } from '../../../scoring/geometry/curves.ts'
import { quadraticHeights } from '../../../scoring/geometry/heights.ts'
import {
  intersectionNumbers,
  type IntersectionNumbers,
} from '../../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints, type Polytope } from '../../../scoring/geometry/polytope.ts'
import { referencePoint, type ReferencePoint } from '../../../scoring/geometry/referencePoint.ts'
import { classFromHeights, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { pairNumbers, volumes, type PairNumbers, type Volumes } from '../../../scoring/geometry/volumes.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'

export interface Topology {
  readonly class: TwoFaceClass
  readonly numbers: IntersectionNumbers
  readonly curves: CurveRows
}

/** A class with its volumes at the reference point. */
export interface Stages extends Topology {
  readonly polytope: Polytope
  readonly reference: ReferencePoint
  readonly pairs: PairNumbers
  readonly volumes: Volumes
}

export function topologyOf(cls: TwoFaceClass): Topology {
  const numbers = intersectionNumbers(cls)
  return { class: cls, numbers, curves: curveRows(cls, numbers) }
}

export function stagesOf(cls: TwoFaceClass): Stages {
  const topology = topologyOf(cls)
  const reference = referencePoint(cls, topology.numbers, topology.curves)
  return { polytope: cls.polytope, ...topology, reference, ...volumesAt(topology, reference.weights) }
}

export function volumesAt(
  topology: Topology,
  weights: Float64Array,
): { pairs: PairNumbers; volumes: Volumes } {
  const pairs = pairNumbers(topology.numbers, weights)
  return { pairs, volumes: volumes(topology.numbers, topology.curves, weights, pairs) }
}

/** The class of the quadratic form with noise from a seed. */
export function classOf(vertices: readonly (readonly number[])[], seed = 0): TwoFaceClass {
  const polytope = polytopeFromPoints(vertices)
  const outcome = classFromHeights(polytope, quadraticHeights(polytope, { seed, noise: 0.45 }))
  if (!outcome.fine) throw new Error('quadratic heights with noise below 1/2 are fine')
  return outcome.class
}

/** Every `step`-th polytope with h11 <= 4, and some larger ones, favourable and not. */
export function someVertices(step: number): { id: string; vertices: number[][] }[] {
  const larger = ['w6-60', 'w7-106', 'w8-77', 'w10-46', 'w12-62', 'w18-72', 'w25-109', 'w40-40']
  return [...bundledPolytopes('small').filter((_, i) => i % step === 0), ...larger.map(largePolytope)]
}
