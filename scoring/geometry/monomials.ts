import { gcd } from './integers.ts'
import type { WeightSystem } from './weightSystem.ts'

/**
 * Monomials whose hull is the Newton polytope: exponents e >= 0 with w . e = d. Of the monomials that agree in the
 * exponents of the three largest weights, which lie on a line, only the two ends are given.
 *
 * @yields exponents in the order of the weights
 */
export function* outerMonomials({ weights, degree }: WeightSystem): Generator<number[]> {
  const order = [0, 1, 2, 3, 4].sort((i, j) => weights[j] - weights[i] || i - j)
  const falling = order.map((i) => weights[i])
  const [a, b] = [falling[3], falling[4]]
  const common = gcd(a, b)
  const step = b / common
  const exponents = [0, 0, 0, 0, 0]
  const restGcd = [gcd(gcd(falling[1], falling[2]), common), gcd(falling[2], common), common]
  for (let e0 = 0; e0 * falling[0] <= degree; e0++) {
    const rest0 = degree - e0 * falling[0]
    if (rest0 % restGcd[0] !== 0) continue
    exponents[order[0]] = e0
    for (let e1 = 0; e1 * falling[1] <= rest0; e1++) {
      const rest1 = rest0 - e1 * falling[1]
      if (rest1 % restGcd[1] !== 0) continue
      exponents[order[1]] = e1
      for (let e2 = 0; e2 * falling[2] <= rest1; e2++) {
        const rest2 = rest1 - e2 * falling[2]
        if (rest2 % common !== 0) continue
        const least = leastSolution(a, b, rest2, step)
        if (least === undefined) continue
        exponents[order[2]] = e2
        const most = least + step * Math.floor((Math.floor(rest2 / a) - least) / step)
        for (const e3 of least === most ? [least] : [least, most]) {
          exponents[order[3]] = e3
          exponents[order[4]] = (rest2 - e3 * a) / b
          yield [...exponents]
        }
      }
    }
  }
}

/** Least x >= 0 with a x + b y = rest for some y >= 0; x repeats modulo `step`. */
function leastSolution(a: number, b: number, rest: number, step: number): number | undefined {
  for (let x = 0; x < step && x * a <= rest; x++) if ((rest - x * a) % b === 0) return x
  return undefined
}
