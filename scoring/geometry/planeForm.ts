import { intersectionNumber, type IntersectionNumbers } from './intersectionNumbers.ts'

/**
 * Normal form of a cubic form with a linear form c2 != 0 on a lattice of rank 2: two such pairs are equivalent under
 * GL(2,Z) exactly when these numbers and the gcd of c2 agree.
 *
 * Take k that generates the kernel of c2 and v with c2 . v = gcd. Both are unique up to k -> -k and v -> v + s k,
 * so the form is (a, b, c, d) = (k^3, k^2 v, k v^2, v^3) up to (-a, b, -c, d) and the shifts
 *
 *     (a, b + s a, c + 2 s b + s^2 a, d + 3 s c + 3 s^2 b + s^3 a)
 *
 * of which the one is taken whose first non-constant entry is least without being negative; of the two signs of k
 * the lexicographically lesser result.
 */
export function planeNormalForm(form: IntersectionNumbers): number[] {
  const [p, q] = form.secondChern
  const { common, x, y } = extendedGcd(p, q)
  const k = [-q / common, p / common]
  const v = [x, y]
  const product = (...vectors: number[][]): number => {
    let sum = 0
    for (let at = 0; at < 8; at++) {
      const [i, j, l] = [at & 1, (at >> 1) & 1, at >> 2]
      sum += vectors[0][i] * vectors[1][j] * vectors[2][l] * intersectionNumber(form, i, j, l)
    }
    return sum
  }
  const given = [product(k, k, k), product(k, k, v), product(k, v, v), product(v, v, v)]
  const [first, second] = [given, given.map((value, i) => (i % 2 === 0 ? -value : value))].map(shifted)
  // + 0 turns -0 into 0.
  return (lesser(first, second) ? first : second).map((value) => value + 0)
}

function shifted([a, b, c, d]: readonly number[]): number[] {
  const [value, step] = a !== 0 ? [b, a] : b !== 0 ? [c, 2 * b] : [d, 3 * c]
  const s = step === 0 ? 0 : -Math.floor(value / Math.abs(step)) * Math.sign(step)
  return [a, b + s * a, c + 2 * s * b + s * s * a, d + 3 * s * c + 3 * s * s * b + s ** 3 * a]
}

function lesser(a: readonly number[], b: readonly number[]): boolean {
  const at = a.findIndex((value, i) => value !== b[i])
  return at < 0 || a[at] < b[at]
}

/** p x + q y = common > 0. */
function extendedGcd(p: number, q: number): { common: number; x: number; y: number } {
  let [r, x, y] = [p, 1, 0]
  let [nextR, nextX, nextY] = [q, 0, 1]
  while (nextR !== 0) {
    const quotient = Math.trunc(r / nextR)
    ;[r, nextR] = [nextR, r - quotient * nextR]
    ;[x, nextX] = [nextX, x - quotient * nextX]
    ;[y, nextY] = [nextY, y - quotient * nextY]
  }
  const sign = r < 0 ? -1 : 1
  return { common: sign * r, x: sign * x, y: sign * y }
}
