import { boundaryLattice } from './boundaryLattice.ts'
import { planarSections, type PlanarSection } from './planarSections.ts'
import type { Polytope } from './polytope.ts'
import { solidSections, type SolidSection } from './solidSections.ts'

/** The reflexive sections of a polytope through the origin: fibres of toric fibrations that a class may have. */
export interface ReflexiveSections {
  /** Reflexive polygons: genus-one fibres. */
  readonly planar: readonly PlanarSection[]
  /** Three-dimensional reflexive polytopes: K3 fibres. */
  readonly solid: readonly SolidSection[]
  /** Per solid section, the planar ones that lie in it, ascending. */
  readonly nested: readonly (readonly number[])[]
}

const known = new WeakMap<Polytope, ReflexiveSections>()

/** All reflexive sections of dimension 2 and 3, exact. Computed once per polytope. */
export function reflexiveSections(polytope: Polytope): ReflexiveSections {
  const before = known.get(polytope)
  if (before) return before
  const { points } = boundaryLattice(polytope)
  const planar = planarSections(polytope)
  const solid = solidSections(polytope)
  const vanishes = ({ functional: [a, b, c, d] }: SolidSection, p: number): boolean =>
    a * points[4 * p] + b * points[4 * p + 1] + c * points[4 * p + 2] + d * points[4 * p + 3] === 0
  const nested = solid.map((space) =>
    planar.flatMap((plane, at) =>
      vanishes(space, plane.points[0]) && vanishes(space, plane.points[1]) ? [at] : [],
    ),
  )
  const sections = { planar, solid, nested }
  known.set(polytope, sections)
  return sections
}
