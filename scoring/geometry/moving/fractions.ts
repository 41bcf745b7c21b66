/** A rational number with a positive denominator; both parts are exact integers below 2^53 in size. */
export interface Fraction {
  readonly over: number
  readonly under: number
}

export const ZERO: Fraction = { over: 0, under: 1 }

/** Sign of p q - r s, exact for integers below 2^53 in size. */
export function productDifference(p: number, q: number, r: number, s: number): number {
  const left = p * q
  const right = r * s
  // Each product is off by half a unit in the last place at most, and so is the difference.
  if (Math.abs(left - right) > 2 * Number.EPSILON * (Math.abs(left) + Math.abs(right))) return left - right
  const exact = BigInt(p) * BigInt(q) - BigInt(r) * BigInt(s)
  return exact > 0n ? 1 : exact < 0n ? -1 : 0
}
