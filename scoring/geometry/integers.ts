/** Greatest common divisor of two integers of any sign; gcd(0, 0) = 0. Exact for safe integers. */
export function gcd(a: number, b: number): number {
  let x = Math.abs(a)
  let y = Math.abs(b)
  while (y !== 0) {
    const rest = x % y
    x = y
    y = rest
  }
  return x
}

/** Greatest common divisor of all entries; 0 for a zero vector. */
export function gcdOf(values: Iterable<number>): number {
  let result = 0
  for (const value of values) {
    result = gcd(result, value)
    if (result === 1) return 1
  }
  return result
}

export function gcdBig(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a
  let y = b < 0n ? -b : b
  while (y !== 0n) {
    const rest = x % y
    x = y
    y = rest
  }
  return x
}

/** Nearest integer to the quotient of two big integers, halves towards zero; `divisor` positive. */
export function roundedQuotient(dividend: bigint, divisor: bigint): bigint {
  const size = dividend < 0n ? -dividend : dividend
  const rounded = (2n * size + divisor - 1n) / (2n * divisor)
  return dividend < 0n ? -rounded : rounded
}

/** Compares two integer vectors of equal length lexicographically. */
export function compareLexicographic(a: ArrayLike<number>, b: ArrayLike<number>): number {
  for (let i = 0; i < a.length; i++) {
    const difference = a[i] - b[i]
    if (difference !== 0) return difference
  }
  return 0
}
