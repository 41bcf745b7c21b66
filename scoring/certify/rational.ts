/** An exact fraction in lowest terms, `under` positive. */
export interface Rational {
  readonly over: bigint
  readonly under: bigint
}

export const zero: Rational = { over: 0n, under: 1n }

export function rational(over: bigint, under: bigint): Rational {
  const common = commonDivisor(over, under)
  const sign = under < 0n ? -1n : 1n
  return { over: (sign * over) / common, under: (sign * under) / common }
}

export function commonDivisor(a: bigint, b: bigint): bigint {
  let [p, q] = [a < 0n ? -a : a, b < 0n ? -b : b]
  while (q !== 0n) [p, q] = [q, p % q]
  return p
}

export function sumOf(values: readonly Rational[]): Rational {
  const under = commonDenominator(values)
  return rational(
    values.reduce((sum, value) => sum + value.over * (under / value.under), 0n),
    under,
  )
}

/** Least common multiple of the denominators. */
export function commonDenominator(values: readonly Rational[]): bigint {
  return values.reduce(
    (multiple, { under }) =>
      multiple % under === 0n ? multiple : (multiple / commonDivisor(multiple, under)) * under,
    1n,
  )
}

export const equal = (a: Rational, b: Rational): boolean => a.over === b.over && a.under === b.under
