import { PointSpan } from './pointSpan.ts'
import type { Polytope } from './polytope.ts'
import { reducedCoordinates } from './reducedCoordinates.ts'
import type { Volumes } from './volumes.ts'

/** Scales of the instantons of Euclidean D3-branes on prime toric divisors, in Planck units. */
export interface InstantonScales {
  /** The divisors by falling scale; by point where they are equal. */
  readonly order: Int32Array
  /** log10 Lambda in that order. */
  readonly logScales: Float64Array
}

/**
 * Lambda_a^4 = 8 pi tau_a e^{-2 pi tau_a} / V^2 with prefactors of order one set to 1, at `scale` times the Kaehler class of
 * `volumes` (tau goes with its square, V with its cube). In logarithms, as the scales are too small for doubles.
 */
export function instantonScales(
  { divisors, total }: Volumes,
  candidates: Int32Array,
  scale: number,
): InstantonScales {
  const logVolume = Math.log10(total) + 3 * Math.log10(scale)
  const logOf = (p: number): number => {
    const tau = divisors[p] * scale * scale
    return (Math.log10(8 * Math.PI * tau) - 2 * Math.PI * tau * Math.LOG10E - 2 * logVolume) / 4
  }
  const logs = new Float64Array(divisors.length)
  for (const p of candidates) logs[p] = logOf(p)
  const order = candidates.slice().sort((a, b) => logs[b] - logs[a] || a - b)
  return { order, logScales: Float64Array.from(order, (p) => logs[p]) }
}

/**
 * Whether two prime toric divisors have the same class modulo torsion, exact: some m has <m, a> = -<m, b> other than zero
 * and vanishes on all other points, which then span three dimensions.
 */
export function sameClass(polytope: Polytope, a: number, b: number): boolean {
  const points = reducedCoordinates(polytope)
  const others = new PointSpan(points)
  for (let p = 0; p < polytope.pointCount && others.rank < 4; p++) if (p !== a && p !== b) others.add(p)
  if (others.rank !== 3) return false
  return others.valueAt(a) === -others.valueAt(b)
}
