import { polytopeNumberNames, type PolytopeNumberName } from '../../shared/polytopeNumbers.ts'
import type { PolytopeRow } from '../../shared/polytopes.ts'
import type { NamedPolytope } from '../services/polytopes.ts'

export function presentPolytopeRow({ polytope, name }: NamedPolytope): PolytopeRow {
  const euler = 2 * (polytope.h11 - polytope.h21)
  const numbers = Object.fromEntries(
    polytopeNumberNames.map((number) => [number, number === 'euler' ? euler : polytope[number]]),
  ) as Pick<PolytopeRow, PolytopeNumberName>
  return {
    key: polytope.key,
    name,
    origin: polytope.origin,
    ...numbers,
    favourable: polytope.favourable,
    weights: polytope.weights,
    side: polytope.side,
  }
}
