/**
 * Intersection numbers by the global road, an oracle that shares no code with the product: vectors and heights
 * in, numbers out. All facets are triangulated, the whole fan is built, and the quadruple intersection numbers
 * of the toric variety are the solution of one linear system:
 *
 *     kappa_ijkl = 1 / |det(v_i, v_j, v_k, v_l)|          on maximal cones
 *     kappa = 0 when the points in it span no cone         (Stanley-Reisner ideal)
 *     sum_l <m, v_l> kappa_ijkl = 0                        for all i, j, k and all m (linear relations)
 *
 * and kappa_ijk = sum_l kappa_ijkl, because the hypersurface is anticanonical. (Fulton, Introduction to toric
 * varieties, section 5.2; Batyrev, alg-geom/9310003.)
 *
 * The system is solved modulo a large prime, where it has full rank, and lifted to rationals. The lift is then
 * put into every equation exactly; since full rank modulo a prime implies full rank over Q, a rational solution
 * that passes is the only one. Small cases only: facets and simplices are found by trying all subsets.
 */
export interface GlobalNumbers {
  /** kappa_ijk for i <= j <= k. */
  readonly triple: (i: number, j: number, k: number) => bigint
  /** Maximal cones, four points each, ascending. */
  readonly cones: readonly (readonly number[])[]
}

type Vector = readonly number[]

/** Undefined when the heights tie on a facet: draw others. Throws when the fan is not complete and fine. */
export function globalIntersectionNumbers(
  points: readonly Vector[],
  heights: readonly number[],
): GlobalNumbers | undefined {
  const cones = maximalCones(points, heights)
  if (cones === undefined) return undefined
  checkFan(points, cones)
  const quadruple = solveRing(points, cones)
  const triples = new Map<string, bigint>()
  const all = [...points.keys()]
  for (const [i, j, k] of multisets(all, 3)) {
    const sum = all.map((l) => quadruple(i, j, k, l)).reduce(add, ZERO)
    if (sum.under !== 1n) throw new Error(`kappa_${i},${j},${k} = ${sum.over}/${sum.under} is no integer`)
    triples.set(`${i},${j},${k}`, sum.over)
  }
  const triple = (...ijk: number[]): bigint => triples.get(ijk.sort((a, b) => a - b).join()) as bigint
  return { triple, cones }
}

/** Points on each supporting hyperplane <m, v> = c > 0 that holds four independent ones. */
function facetsOf(points: readonly Vector[]): number[][] {
  const found = new Map<string, number[]>()
  for (const quad of subsets([...points.keys()], 4)) {
    const scale = determinant(quad.map((p) => points[p]))
    if (scale === 0) continue
    // <m, v> = c: replace one row after another by v, c the determinant itself (Cramer).
    const level = (v: Vector): number =>
      quad.reduce((sum, _, n) => sum + determinant(quad.map((p, at) => (at === n ? v : points[p]))), 0) *
      Math.sign(scale)
    const levels = points.map(level)
    const top = Math.abs(scale)
    if (levels.some((value) => value > top)) continue
    const facet = [...points.keys()].filter((p) => levels[p] === top)
    found.set(facet.join(), facet)
  }
  return [...found.values()]
}

/** Simplices of the regular triangulation of every facet: below the lifted simplex lies no other point. */
function maximalCones(points: readonly Vector[], heights: readonly number[]): number[][] | undefined {
  const cones: number[][] = []
  for (const facet of facetsOf(points)) {
    for (const simplex of subsets(facet, 4)) {
      const scale = determinant(simplex.map((p) => points[p]))
      if (scale === 0) continue
      let lowest = true
      let tied = false
      for (const p of facet) {
        if (simplex.includes(p)) continue
        // v_p = sum_n c_n v_n with sum c_n = 1 on the facet; compare w_p with sum_n c_n w_n.
        let excess = BigInt(scale) * BigInt(heights[p])
        simplex.forEach((q, n) => {
          const share = determinant(simplex.map((s, at) => (at === n ? points[p] : points[s])))
          excess -= BigInt(share) * BigInt(heights[q])
        })
        if (excess === 0n) tied = true
        else if (excess > 0n !== scale > 0) lowest = false
      }
      if (!lowest) continue
      if (tied) return undefined
      cones.push(simplex)
    }
  }
  return cones
}

/** Every point is used and every wall lies between exactly two cones. */
function checkFan(points: readonly Vector[], cones: readonly number[][]): void {
  const used = new Set(cones.flat())
  if (used.size !== points.length) throw new Error(`the fan uses ${used.size} of ${points.length} points`)
  const walls = new Map<string, number>()
  for (const cone of cones) {
    for (const wall of subsets(cone, 3)) walls.set(wall.join(), (walls.get(wall.join()) ?? 0) + 1)
  }
  for (const [wall, sides] of walls) if (sides !== 2) throw new Error(`wall ${wall} has ${sides} sides`)
}

const PRIMES = [2n ** 61n - 1n, 2n ** 89n - 1n]

function solveRing(points: readonly Vector[], cones: readonly number[][]): (...ijkl: number[]) => Rational {
  const faces = new Set(
    cones.flatMap((cone) => [1, 2, 3, 4].flatMap((size) => subsets(cone, size).map((s) => s.join()))),
  )
  const known = new Map<string, Rational>()
  for (const cone of cones) {
    known.set(cone.join(), { over: 1n, under: BigInt(Math.abs(determinant(cone.map((p) => points[p])))) })
  }
  const all = [...points.keys()]
  const unknowns = multisets(all, 4).filter((set) => !known.has(set.join()) && faces.has(unique(set).join()))
  const column = new Map(unknowns.map((set, n) => [set.join(), n]))
  const equations: Equation[] = []
  for (const triple of multisets(all, 3)) {
    if (!faces.has(unique(triple).join())) continue
    for (let axis = 0; axis < 4; axis++) {
      const terms: [number, bigint][] = []
      let constant = ZERO
      for (const l of all) {
        const coefficient = BigInt(points[l][axis])
        const name = [...triple, l].sort((a, b) => a - b).join()
        const value = known.get(name)
        const at = column.get(name)
        if (value !== undefined)
          constant = add(constant, { over: coefficient * value.over, under: value.under })
        else if (at !== undefined && coefficient !== 0n) terms.push([at, coefficient])
      }
      equations.push({ terms, constant })
    }
  }
  for (const prime of PRIMES) {
    const solution = solveModulo(equations, unknowns.length, prime)?.map((value) => lift(value, prime))
    if (solution === undefined || !solution.every((value) => value !== undefined)) continue
    if (!equations.every((equation) => holds(equation, solution as Rational[]))) continue
    unknowns.forEach((set, n) => known.set(set.join(), solution[n] as Rational))
    return (...ijkl) => known.get(ijkl.sort((a, b) => a - b).join()) ?? ZERO
  }
  throw new Error('the intersection ring was not found modulo any of the primes')
}

interface Equation {
  readonly terms: readonly (readonly [number, bigint])[]
  readonly constant: Rational
}

function holds({ terms, constant }: Equation, solution: readonly Rational[]): boolean {
  const sum = terms.reduce(
    (total, [n, coefficient]) =>
      add(total, { over: coefficient * solution[n].over, under: solution[n].under }),
    constant,
  )
  return sum.over === 0n
}

/** The unique solution modulo the prime, undefined without full rank or when the equations contradict. */
function solveModulo(equations: readonly Equation[], size: number, prime: bigint): bigint[] | undefined {
  const pivots: (Map<number, bigint> | undefined)[] = new Array(size)
  for (const { terms, constant } of equations) {
    // Column `size` holds the constant.
    const row = new Map(terms.map(([n, value]) => [n, modulo(value, prime)]))
    row.set(size, modulo(constant.over * inverse(modulo(constant.under, prime), prime), prime))
    for (;;) {
      let lead = size
      for (const [n, value] of row) {
        if (value === 0n) row.delete(n)
        else if (n < lead) lead = n
      }
      if (lead === size) {
        if (row.has(size)) return undefined
        break
      }
      const factor = row.get(lead) as bigint
      const pivot = pivots[lead]
      if (pivot === undefined) {
        const scale = inverse(factor, prime)
        for (const [n, value] of row) row.set(n, (value * scale) % prime)
        pivots[lead] = row
        break
      }
      for (const [n, value] of pivot) row.set(n, modulo((row.get(n) ?? 0n) - factor * value, prime))
    }
  }
  const solution = new Array<bigint>(size)
  for (let n = size - 1; n >= 0; n--) {
    const pivot = pivots[n]
    if (pivot === undefined) return undefined
    let value = 0n
    for (const [m, coefficient] of pivot) {
      if (m !== n) value -= coefficient * (m === size ? 1n : solution[m])
    }
    solution[n] = modulo(value, prime)
  }
  return solution
}

/** The fraction with small numerator and denominator that a residue stands for (continued fractions). */
function lift(value: bigint, prime: bigint): Rational | undefined {
  let [r, s] = [prime, value]
  let [t, u] = [0n, 1n]
  while (s * s * 2n > prime) {
    const quotient = r / s
    ;[r, s] = [s, r - quotient * s]
    ;[t, u] = [u, t - quotient * u]
  }
  if (u * u * 2n > prime || u === 0n) return undefined
  return u < 0n ? { over: -s, under: -u } : { over: s, under: u }
}

interface Rational {
  readonly over: bigint
  readonly under: bigint
}

const ZERO: Rational = { over: 0n, under: 1n }

function add(a: Rational, b: Rational): Rational {
  const over = a.over * b.under + b.over * a.under
  const under = a.under * b.under
  let [p, q] = [over < 0n ? -over : over, under]
  while (q !== 0n) [p, q] = [q, p % q]
  return { over: over / p, under: under / p }
}

function modulo(value: bigint, prime: bigint): bigint {
  const rest = value % prime
  return rest < 0n ? rest + prime : rest
}

function inverse(value: bigint, prime: bigint): bigint {
  let [r, s] = [prime, value]
  let [t, u] = [0n, 1n]
  while (s !== 0n) {
    const quotient = r / s
    ;[r, s] = [s, r - quotient * s]
    ;[t, u] = [u, t - quotient * u]
  }
  return modulo(t, prime)
}

function determinant(rows: readonly Vector[]): number {
  if (rows.length === 1) return rows[0][0]
  return rows.reduce((sum, row, n) => {
    if (row[0] === 0) return sum
    const minor = rows.filter((_, m) => m !== n).map((other) => other.slice(1))
    return sum + (n % 2 === 0 ? 1 : -1) * row[0] * determinant(minor)
  }, 0)
}

function subsets(items: readonly number[], size: number): number[][] {
  if (size === 0) return [[]]
  return items.flatMap((item, n) => subsets(items.slice(n + 1), size - 1).map((rest) => [item, ...rest]))
}

function multisets(items: readonly number[], size: number): number[][] {
  if (size === 0) return [[]]
  return items.flatMap((item, n) => multisets(items.slice(n), size - 1).map((rest) => [item, ...rest]))
}

function unique(sorted: readonly number[]): number[] {
  return sorted.filter((item, n) => n === 0 || item !== sorted[n - 1])
}
