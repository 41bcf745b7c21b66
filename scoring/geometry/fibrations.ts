import { InvariantError } from '../errors.ts'
import { boundaryLattice } from './boundaryLattice.ts'
import { fibrationBase, type FibrationBase } from './fibrationBase.ts'
import type { IntersectionNumbers } from './intersectionNumbers.ts'
import type { PlanarSection } from './planarSections.ts'
import type { Polytope } from './polytope.ts'
import { reflexiveSections } from './sections.ts'
import type { SolidSection } from './solidSections.ts'
import { squareOf } from './squareOf.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** A fibration of a class over the projective line by K3 surfaces. */
export interface K3Fibration {
  /** Index among the solid sections. */
  readonly section: number
  /** Coefficients of the fibre's class D_f = sum_{f(p) > 0} f(p) D_p, per point. */
  readonly fibre: Float64Array
}

/** A fibration of a class over a toric surface by curves of genus one. */
export interface GenusOneFibration {
  /** Index among the planar sections. */
  readonly section: number
  /** Primitive rays of the base's fan in Z^2, 2 coordinates each, counterclockwise. */
  readonly baseRays: Int32Array
  /** Least number of points in which a prime toric divisor, or one component of it, meets the fibre. */
  readonly degree: number
}

/** The toric fibrations of a class. */
export interface Fibrations {
  readonly k3: readonly K3Fibration[]
  readonly genusOne: readonly GenusOneFibration[]
  /** Pairs [index in k3, index in genusOne] where the genus-one fibre lies in the K3 fibre. */
  readonly nested: readonly (readonly [number, number])[]
}

/** All toric K3 and genus-one fibrations of a class, exact. They depend on the class alone. */
export function fibrations(cls: TwoFaceClass, numbers: IntersectionNumbers): Fibrations {
  const { polytope } = cls
  const sections = reflexiveSections(polytope)
  const k3 = sections.solid.flatMap((section, at) => {
    const fibre = k3Fibre(polytope, numbers, section)
    return fibre === undefined ? [] : [{ section: at, fibre }]
  })
  const genusOne = sections.planar.flatMap((section, at) => {
    const baseRays = baseFan(cls, fibrationBase(polytope, section))
    return baseRays === undefined ? [] : [{ section: at, baseRays, degree: leastDegree(polytope, section) }]
  })
  const nested = k3.flatMap((outer, a) =>
    genusOne.flatMap((inner, b): [number, number][] =>
      sections.nested[outer.section].includes(inner.section) ? [[a, b]] : [],
    ),
  )
  return { k3, genusOne, nested }
}

/**
 * The class of the fibre when the functional f of the section fibres the class: no edge may join f > 0 to f < 0, so that
 * every cone over a triangle maps into one of the two rays of the projective line's fan. A fibre D_f that f > 0
 * and f < 0 both give has D_f^2 = 0, and c2 . D_f = 24, the Euler number of a K3 surface; both are asserted.
 */
function k3Fibre(
  polytope: Polytope,
  numbers: IntersectionNumbers,
  { functional: [a, b, c, d] }: SolidSection,
): Float64Array | undefined {
  const { points } = boundaryLattice(polytope)
  const values = new Float64Array(polytope.pointCount)
  for (let p = 0; p < values.length; p++) {
    values[p] = a * points[4 * p] + b * points[4 * p + 1] + c * points[4 * p + 2] + d * points[4 * p + 3]
  }
  const { edges, secondChern } = numbers
  for (let e = 0; e < edges.length; e += 2) if (values[edges[e]] * values[edges[e + 1]] < 0) return undefined
  const fibre = values.map((value) => Math.max(value, 0))
  const chern = fibre.reduce((sum, coefficient, p) => sum + coefficient * secondChern[p], 0)
  if (chern !== 24 || squareOf(numbers, fibre).some((number) => number !== 0)) {
    throw new InvariantError(`A K3 fibre has c2 . D = ${chern}, or its square does not vanish.`)
  }
  return fibre
}

/**
 * The rays of the base's fan when a section fibres the class: the directions that lie strictly inside no triangle's
 * image. The cones between them must be convex, at least three, and hold every triangle's image.
 */
function baseFan({ triangles }: TwoFaceClass, base: FibrationBase): Int32Array | undefined {
  const { directions, directionOf } = base
  const count = directions.length / 2
  const cross = (u: number, v: number): number =>
    directions[2 * u] * directions[2 * v + 1] - directions[2 * u + 1] * directions[2 * v]
  const inside = new Uint8Array(count)
  for (let t = 0; t < triangles.length; t += 3) {
    const p = directionOf[triangles[t]]
    const q = directionOf[triangles[t + 1]]
    const r = directionOf[triangles[t + 2]]
    const corners = [p, q, r].filter((direction) => direction >= 0)
    if (corners.length === 0 || corners.every((direction) => direction === corners[0])) continue
    // The image is the cone from `first` counterclockwise to `last`, both corners, when it spans less than half a turn.
    const first = corners.find((u) => corners.every((v) => u === v || cross(u, v) > 0))
    const last = corners.find((v) => corners.every((u) => u === v || cross(u, v) > 0))
    if (first === undefined || last === undefined) return undefined
    for (let u = (first + 1) % count; u !== last; u = (u + 1) % count) inside[u] = 1
  }
  const rays: number[] = []
  for (let u = 0; u < count; u++) if (inside[u] === 0) rays.push(u)
  const complete = rays.length >= 3 && rays.every((u, k) => cross(u, rays[(k + 1) % rays.length]) > 0)
  return complete
    ? Int32Array.from(rays.flatMap((u) => [directions[2 * u], directions[2 * u + 1]]))
    : undefined
}

/**
 * A prime toric divisor meets the fibre only when its point is a corner v of the polygon, and then in as many points as
 * the dual edge of v is long; its components, if it splits, share them equally. One means a section.
 */
function leastDegree(polytope: Polytope, { points, turns }: PlanarSection): number {
  let least = Infinity
  for (let k = 0; k < points.length; k++) {
    if (turns[k] === 2) continue
    const degree = (2 - turns[k]) / polytope.components[points[k]]
    if (!Number.isInteger(degree)) {
      throw new InvariantError(`Components of divisor ${points[k]} meet a genus-one fibre ${degree} times.`)
    }
    least = Math.min(least, degree)
  }
  return least
}
