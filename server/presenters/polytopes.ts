import type { PolytopeRow } from '../../shared/polytopes.ts'
import type { NamedPolytope } from '../services/polytopes.ts'

export function presentPolytopeRow({ polytope, name }: NamedPolytope): PolytopeRow {
  return {
    key: polytope.key,
    name,
    origin: polytope.origin,
    h11: polytope.h11,
    h21: polytope.h21,
    euler: 2 * (polytope.h11 - polytope.h21),
    points: polytope.points,
    vertices: polytope.vertices,
    facets: polytope.facets,
    latticePoints: polytope.latticePoints,
    dualLatticePoints: polytope.dualLatticePoints,
    favourable: polytope.favourable,
    symmetryOrder: polytope.symmetryOrder,
    weights: polytope.weights,
    side: polytope.side,
  }
}
