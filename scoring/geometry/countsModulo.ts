import { intersectionNumber, type IntersectionNumbers } from './intersectionNumbers.ts'

/** Powers of primes modulo which vectors are counted. Higher powers tell apart what the prime cannot. */
const moduli: readonly (readonly [modulus: number, prime: number])[] = [
  [2, 2],
  [3, 3],
  [4, 2],
  [5, 5],
  [7, 7],
  [8, 2],
  [9, 3],
  [27, 3],
]

/** Products to be taken per modulus: some ten milliseconds. */
const workLimit = 400_000

/**
 * How the form behaves on the vectors of L / m, for each modulus that is small enough for the rank. A change of
 * basis permutes these vectors, so what is counted over all of them does not depend on it. Counted are, with
 * kappa and c2 divided by their gcds,
 *
 *     over all x: (x^3, c2 . x) modulo m and the rank of (y, z) -> kappa(x, y, z) modulo the prime
 *     where feasible, with every x its counts over all y of (x^2 y, x y^2, y^3, c2 . y) modulo m
 *
 * @param triple the gcd of all kappa_ijk; `chern`: of all c2_i
 * @returns per modulus "m:digest", or "m^2:digest" with pairs; the digest is a sum over x of mixed codes, so equal
 *   tables have equal digests
 */
export function countsModulo(form: IntersectionNumbers, triple: number, chern: number): string[] {
  const n = form.pointCount
  const slices = Array.from({ length: n }, (_, i) => i)
  if (moduli[0][0] ** n * n ** 2 > workLimit) return []
  const dense = slices.map((i) =>
    Array.from(
      { length: n * n },
      (_, at) => intersectionNumber(form, i, Math.floor(at / n), at % n) / triple,
    ),
  )
  const linear = Array.from(form.secondChern, (value) => (chern === 0 ? 0 : value / chern))
  return moduli
    .filter(([modulus]) => modulus ** n * n ** 2 <= workLimit)
    .map(([modulus, prime]) => {
      const vectors = new Vectors(dense, linear, modulus, prime)
      const pairs = modulus ** (2 * n) * n <= workLimit
      return `${modulus}${pairs ? '^2' : ''}:${vectors.digest(pairs)}`
    })
}

/** All vectors of L / m with what the form makes of them. */
class Vectors {
  readonly #count: number
  readonly #rank: number
  readonly #modulus: number
  readonly #coordinates: Uint8Array
  /** x^2 as an element of L*, modulo m. */
  readonly #squares: Uint8Array
  readonly #cubes: Uint8Array
  readonly #chern: Uint8Array
  readonly #ranks: Uint8Array

  constructor(
    dense: readonly (readonly number[])[],
    linear: readonly number[],
    modulus: number,
    prime: number,
  ) {
    const n = linear.length
    const count = modulus ** n
    this.#count = count
    this.#rank = n
    this.#modulus = modulus
    this.#coordinates = new Uint8Array(count * n)
    this.#squares = new Uint8Array(count * n)
    this.#cubes = new Uint8Array(count)
    this.#chern = new Uint8Array(count)
    this.#ranks = new Uint8Array(count)
    const residue = (value: number): number => ((value % modulus) + modulus) % modulus
    const steps = dense.map((slice) => slice.map(residue))
    const chern = linear.map(residue)
    const x = new Array<number>(n).fill(0)
    const matrix = new Float64Array(n * n)
    const work = new Float64Array(n * n)
    let value = 0
    for (let v = 0; v < count; v++) {
      let cube = 0
      for (let j = 0; j < n; j++) {
        let entry = 0
        for (let k = 0; k < n; k++) entry += matrix[j * n + k] * x[k]
        this.#coordinates[v * n + j] = x[j]
        this.#squares[v * n + j] = entry % modulus
        cube += x[j] * (entry % modulus)
      }
      this.#cubes[v] = cube % modulus
      this.#chern[v] = value
      this.#ranks[v] = rankModulo(matrix, work, n, prime)
      // The next vector; a coordinate that goes from m - 1 back to 0 moves by one as well, modulo m.
      for (let at = 0, carry = true; carry && at < n; at++) {
        const step = steps[at]
        for (let entry = 0; entry < step.length; entry++) {
          const sum = matrix[entry] + step[entry]
          matrix[entry] = sum < modulus ? sum : sum - modulus
        }
        value = (value + chern[at]) % modulus
        x[at] = (x[at] + 1) % modulus
        carry = x[at] === 0
      }
    }
  }

  /** 16 hexadecimal digits. */
  digest(pairs: boolean): string {
    let high = 0
    let low = 0
    for (let x = 0; x < this.#count; x++) {
      let code = (this.#cubes[x] * this.#modulus + this.#chern[x]) * (this.#rank + 1) + this.#ranks[x]
      if (pairs) code = (Math.imul(code, 0x9e3779b1) ^ this.#around(x)) | 0
      high = (high + mixed(code)) | 0
      low = (low + mixed(code ^ 0x5bd1e995)) | 0
    }
    return [high, low].map((word) => (word >>> 0).toString(16).padStart(8, '0')).join('')
  }

  /** The counts over all y beside x, as a number. */
  #around(x: number): number {
    const n = this.#rank
    const modulus = this.#modulus
    let sum = 0
    for (let y = 0; y < this.#count; y++) {
      let xxy = 0
      let xyy = 0
      for (let i = 0; i < n; i++) {
        xxy += this.#squares[x * n + i] * this.#coordinates[y * n + i]
        xyy += this.#squares[y * n + i] * this.#coordinates[x * n + i]
      }
      const code = ((xxy % modulus) * modulus + (xyy % modulus)) * modulus + this.#cubes[y]
      sum = (sum + mixed(code * modulus + this.#chern[y])) | 0
    }
    return mixed(sum)
  }
}

/** A fixed bijection of 32-bit words without structure (a finaliser of multiplications and shifts). */
function mixed(word: number): number {
  let h = Math.imul(word ^ (word >>> 16), 0x85ebca6b)
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35)
  return (h ^ (h >>> 16)) | 0
}

/** Rank of a square matrix modulo a prime. */
function rankModulo(matrix: Float64Array, work: Float64Array, n: number, prime: number): number {
  for (let entry = 0; entry < matrix.length; entry++) work[entry] = matrix[entry] % prime
  let rank = 0
  for (let column = 0; column < n && rank < n; column++) {
    let pivot = rank
    while (pivot < n && work[pivot * n + column] === 0) pivot++
    if (pivot === n) continue
    if (pivot !== rank) {
      for (let c = column; c < n; c++) {
        const entry = work[pivot * n + c]
        work[pivot * n + c] = work[rank * n + c]
        work[rank * n + c] = entry
      }
    }
    const lead = work[rank * n + column]
    let inverse = 1
    while ((inverse * lead) % prime !== 1) inverse++
    for (let row = rank + 1; row < n; row++) {
      const factor = (work[row * n + column] * inverse) % prime
      if (factor === 0) continue
      for (let c = column; c < n; c++) {
        work[row * n + c] = (work[row * n + c] + (prime - factor) * work[rank * n + c]) % prime
      }
    }
    rank++
  }
  return rank
}
