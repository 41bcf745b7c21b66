import { boundaryLattice } from './boundaryLattice.ts'
import { gcd } from './integers.ts'
import { planeMinors } from './minors.ts'
import type { PlanarSection } from './planarSections.ts'
import type { Polytope } from './polytope.ts'

/**
 * Where the points of a polytope go when one projects along the plane of a section: N / (plane and N), which is
 * Z^2 after a choice of basis. Directions are the primitive images, each once.
 */
export interface FibrationBase {
  /** 2 coordinates per point of the polytope. */
  readonly images: Int32Array
  /** 2 coordinates each, counterclockwise. */
  readonly directions: Int32Array
  /** Index of each point's direction, -1 for points in the plane. */
  readonly directionOf: Int32Array
}

const known = new WeakMap<PlanarSection, FibrationBase>()

/** The directions for a section of the polytope, exact. Computed once per section. */
export function fibrationBase(polytope: Polytope, section: PlanarSection): FibrationBase {
  const before = known.get(section)
  if (before) return before
  const { points } = boundaryLattice(polytope)
  const [f, g] = functionalsVanishingOn(points, section.points[0], section.points[1])
  const images = Array.from({ length: polytope.pointCount }, (_, p): [number, number] => [
    valueAt(f, points, p),
    valueAt(g, points, p),
  ])
  const primitive = images.map(([x, y]): [number, number] => {
    const common = gcd(x, y) || 1
    return [x / common + 0, y / common + 0]
  })
  const name = ([x, y]: readonly [number, number]): string => `${x} ${y}`
  const distinct = [...new Map(primitive.map((direction) => [name(direction), direction])).values()]
    .filter(([x, y]) => x !== 0 || y !== 0)
    .sort(byAngle)
  const place = new Map(distinct.map((image, at) => [name(image), at]))
  const base = {
    images: Int32Array.from(images.flat()),
    directions: Int32Array.from(distinct.flat()),
    directionOf: Int32Array.from(primitive, (direction) => place.get(name(direction)) ?? -1),
  }
  known.set(section, base)
  return base
}

/** Counterclockwise from the positive first axis. */
function byAngle([a, b]: readonly [number, number], [c, d]: readonly [number, number]): number {
  const lower = (x: number, y: number): number => (y < 0 || (y === 0 && x < 0) ? 1 : 0)
  return lower(a, b) - lower(c, d) || b * c - a * d
}

function valueAt(f: readonly number[], points: ArrayLike<number>, p: number): number {
  let sum = 0
  for (let axis = 0; axis < 4; axis++) sum += f[axis] * points[4 * p + axis]
  return sum
}

/**
 * Basis of the functionals on N that vanish on two points which form a basis of the plane's lattice. The minors of the
 * two, contracted with each axis, generate these functionals because they have no common divisor; elimination
 * leaves two.
 */
function functionalsVanishingOn(points: ArrayLike<number>, p: number, q: number): [number[], number[]] {
  const [m01, m02, m03, m12, m13, m23] = planeMinors(points, p, q, new Float64Array(6))
  const generators = [
    [m12, -m02, m01, 0],
    [m13, -m03, 0, m01],
    [m23, 0, -m03, m02],
    [0, m23, -m13, m12],
  ]
  const basis: number[][] = []
  for (let axis = 0; axis < 4 && basis.length < 2; axis++) {
    for (;;) {
      const rows = generators
        .filter((row) => row[axis] !== 0)
        .sort((a, b) => Math.abs(a[axis]) - Math.abs(b[axis]))
      if (rows.length === 0) break
      const [least, next] = rows
      if (next === undefined) {
        basis.push(least)
        generators.splice(generators.indexOf(least), 1)
        break
      }
      const factor = Math.trunc(next[axis] / least[axis])
      for (let i = 0; i < 4; i++) next[i] -= factor * least[i]
    }
  }
  return [basis[0], basis[1]]
}
