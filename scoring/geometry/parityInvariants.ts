import type { IntegerRow } from './elementaryDivisors.ts'
import type { IntersectionNumbers } from './intersectionNumbers.ts'
import { productRows } from './productRows.ts'

/** Dimensions over the field of two elements, independent of a basis. */
export interface ParityInvariants {
  /** Rank of B(x, y) = kappa(x, x, y) modulo 2. */
  readonly rank: number
  /** B(x, x) = 0 for all x, in other words c2 is divisible by 4. */
  readonly alternating: boolean
  /** Dimension of the span of all kappa(r, x, .) modulo 2, r in the radical of B and x in L. */
  readonly radicalProducts: number
  /** The same with both factors in the radical. */
  readonly radicalSquares: number
}

/**
 * On a Calabi-Yau threefold kappa(x, x, y) = kappa(x, y, y) modulo 2 (from the integrality of the holomorphic Euler
 * characteristics), so B(x, y) = kappa(x, x, y) is additive in both arguments: a symmetric bilinear form on L / 2,
 * with B(x, x) = x^3 = c2 . x / 2. Its rank, its type, its radical R and what kappa makes of R are canonical.
 */
export function parityInvariants(form: IntersectionNumbers): ParityInvariants {
  const { cubes, edges, edgeNumbers, pointCount } = form
  const bilinear = Array.from({ length: pointCount }, () => emptyBits(pointCount))
  cubes.forEach((cube, i) => {
    if (isOdd(cube)) flipBit(bilinear[i], i)
  })
  for (let at = 0; at < edges.length; at += 2) {
    if (!isOdd(edgeNumbers[at])) continue
    flipBit(bilinear[edges[at]], edges[at + 1])
    flipBit(bilinear[edges[at + 1]], edges[at])
  }
  const radical = kernelOf(bilinear, pointCount)
  const products = new ProductTable(form)
  const all = new Span(pointCount)
  const squares = new Span(pointCount)
  for (const [a, r] of radical.entries()) {
    const rows = products.rowsOf(r)
    for (const row of rows) all.add(row)
    for (const s of radical.slice(a)) squares.add(combination(rows, s, pointCount))
  }
  return {
    rank: pointCount - radical.length,
    alternating: cubes.every((cube) => !isOdd(cube)),
    radicalProducts: all.rank,
    radicalSquares: squares.rank,
  }
}

type Bits = Uint32Array

const isOdd = (value: number): boolean => value % 2 !== 0
const emptyBits = (size: number): Bits => new Uint32Array((size + 31) >> 5)
const hasBit = (bits: Bits, at: number): boolean => ((bits[at >> 5] >>> (at & 31)) & 1) === 1
const flipBit = (bits: Bits, at: number): void => {
  bits[at >> 5] ^= 1 << (at & 31)
}
const addTo = (target: Bits, other: Bits): void => {
  for (let w = 0; w < target.length; w++) target[w] ^= other[w]
}

function leadOf(bits: Bits): number {
  for (let w = 0; w < bits.length; w++) {
    if (bits[w] !== 0) return 32 * w + (31 - Math.clz32(bits[w] & -bits[w]))
  }
  return -1
}

/** The sum of the rows that `choice` names. */
function combination(rows: readonly Bits[], choice: Bits, size: number): Bits {
  const sum = emptyBits(size)
  rows.forEach((row, i) => {
    if (hasBit(choice, i)) addTo(sum, row)
  })
  return sum
}

/** A subspace, by an echelon basis. */
class Span {
  readonly #byLead = new Map<number, Bits>()
  readonly #size: number

  constructor(size: number) {
    this.#size = size
  }

  get rank(): number {
    return this.#byLead.size
  }

  add(vector: Bits): void {
    if (this.rank === this.#size) return
    const rest = vector.slice()
    for (let lead = leadOf(rest); lead >= 0; lead = leadOf(rest)) {
      const known = this.#byLead.get(lead)
      if (known === undefined) {
        this.#byLead.set(lead, rest)
        return
      }
      addTo(rest, known)
    }
  }
}

/** A basis of the vectors x with sum_i x_i rows[i] = 0. */
function kernelOf(rows: readonly Bits[], size: number): Bits[] {
  const byLead = new Map<number, { row: Bits; history: Bits }>()
  const kernel: Bits[] = []
  rows.forEach((given, i) => {
    const row = given.slice()
    const history = emptyBits(size)
    flipBit(history, i)
    let lead = leadOf(row)
    for (; lead >= 0; lead = leadOf(row)) {
      const known = byLead.get(lead)
      if (known === undefined) break
      addTo(row, known.row)
      addTo(history, known.history)
    }
    if (lead >= 0) byLead.set(lead, { row, history })
    else kernel.push(history)
  })
  return kernel
}

/** kappa(D_i, D_j, .) modulo 2 for the pairs that meet. */
class ProductTable {
  readonly #partners: { j: number; row: Bits }[][]
  readonly #size: number

  constructor(form: IntersectionNumbers) {
    this.#size = form.pointCount
    this.#partners = Array.from({ length: form.pointCount }, () => [])
    const bits = productRows(form).map((row) => this.#bitsOf(row))
    for (let i = 0; i < form.pointCount; i++) this.#partners[i].push({ j: i, row: bits[i] })
    for (let e = 0; e < form.edges.length / 2; e++) {
      const [i, j] = [form.edges[2 * e], form.edges[2 * e + 1]]
      this.#partners[i].push({ j, row: bits[form.pointCount + e] })
      this.#partners[j].push({ j: i, row: bits[form.pointCount + e] })
    }
  }

  #bitsOf(row: IntegerRow): Bits {
    const bits = emptyBits(this.#size)
    for (const [column, value] of row) if (isOdd(value)) flipBit(bits, column)
    return bits
  }

  /** kappa(r, D_j, .) for all j. */
  rowsOf(r: Bits): Bits[] {
    const rows = Array.from({ length: this.#size }, () => emptyBits(this.#size))
    this.#partners.forEach((partners, i) => {
      if (hasBit(r, i)) for (const { j, row } of partners) addTo(rows[j], row)
    })
    return rows
  }
}
