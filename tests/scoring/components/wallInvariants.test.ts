import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { elementaryDivisors } from '../../../scoring/geometry/elementaryDivisors.ts'
import { gcdOf } from '../../../scoring/geometry/integers.ts'
import {
  intersectionNumbers,
  type IntersectionNumbers,
} from '../../../scoring/geometry/intersectionNumbers.ts'
import { latticeForm } from '../../../scoring/geometry/latticeForm.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { transportClass } from '../../../scoring/geometry/transport.ts'
import { formInvariants, wallInvariants } from '../../../scoring/geometry/wallInvariants.ts'
import { bundledPolytopes, largePolytope } from '../../reference/bundledPolytopes.ts'
import { classOf } from '../cone/stages.ts'
import { transformed, unimodular } from '../polytope/unimodular.ts'
import { dense, onVectors, sparse } from './denseForm.ts'

const small = bundledPolytopes('small')
const wallOf = (vertices: number[][], seed = 0) => {
  const cls = classOf(vertices, seed)
  return wallInvariants(cls, intersectionNumbers(cls))
}
const formOf = (vertices: number[][]): IntersectionNumbers => {
  const cls = classOf(vertices, 1)
  return latticeForm(cls, intersectionNumbers(cls))
}

/** Products of elementary operations on n rows. */
const changeOfBasis = (n: number): fc.Arbitrary<number[][]> =>
  fc
    .array(
      fc.record({
        to: fc.nat({ max: n - 1 }),
        from: fc.nat({ max: n - 1 }),
        factor: fc.integer({ min: -3, max: 3 }),
      }),
      { maxLength: 6 },
    )
    .map((operations) => {
      const rows = Array.from({ length: n }, (_, i) =>
        Array.from({ length: n }, (_entry, j): number => (i === j ? 1 : 0)),
      )
      for (const { to, from, factor } of operations) {
        if (to === from) rows[to] = rows[to].map((entry) => 0 - entry)
        else rows[to] = rows[to].map((entry, j) => entry + factor * rows[from][j])
      }
      return rows
    })

describe('the invariants of a form', () => {
  // Ranks 1 to 4, favourable and not, and polytopes whose points generate a sublattice of N.
  const some = small.filter(({ favourable }, at) => at % 197 === 3 || (!favourable && at % 9 === 0))
  const forms = some.map(({ vertices }) => formOf(vertices))

  it('do not depend on the basis', () => {
    fc.assert(
      fc.property(
        fc
          .constantFrom(...forms)
          .chain((form) => fc.tuple(fc.constant(form), changeOfBasis(form.pointCount))),
        ([form, rows]) => {
          expect(formInvariants(sparse(onVectors(dense(form), rows)))).toEqual(formInvariants(form))
        },
      ),
      { numRuns: 40, seed: 5 },
    )
  })

  it('include gcds for which generators do, with dependent ones among them', () => {
    for (const form of forms) {
      const n = form.pointCount
      const unit = (i: number) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0))
      const more = [
        ...Array.from({ length: n }, (_, i) => unit(i)),
        unit(0).map((e, j) => 2 * e - (j === n - 1 ? 3 : 0)),
      ]
      const { triple, square, cube, chern, chi, products } = formInvariants(form)
      expect(formInvariants(sparse(onVectors(dense(form), more)))).toMatchObject({
        triple,
        square,
        cube,
        chern,
        chi,
        products,
      })
    }
  })

  it('take the gcds over the values on all vectors, as found by trying', () => {
    for (const form of forms.filter(({ pointCount }) => pointCount <= 3)) {
      const n = form.pointCount
      // A polynomial of degree three is determined by its values here, also modulo anything.
      const box = Array.from({ length: 4 ** n }, (_, at) =>
        Array.from({ length: n }, (_entry, i) => Math.floor(at / 4 ** i) % 4),
      ).filter((x) => x.reduce((sum, entry) => sum + entry, 0) <= 3)
      const { kappa, chern } = onVectors(dense(form), box)
      const { triple, square, cube, chern: c2, chi } = formInvariants(form)
      expect(gcdOf(kappa.flat(2))).toBe(triple)
      expect(gcdOf(kappa.flatMap((slice, a) => slice[a]))).toBe(square)
      expect(gcdOf(kappa.map((slice, a) => slice[a][a]))).toBe(cube)
      expect(gcdOf(chern)).toBe(c2)
      expect(gcdOf(kappa.map((slice, a) => (2 * slice[a][a] + chern[a]) / 12))).toBe(chi)
    }
  })

  it('would not include the gcd of the cubes of a basis: that depends on it', () => {
    // H^2 L = 2, H^3 = 4, H L^2 = L^3 = 0 (weights (1,1,2,2,6)): the cubes of H and L have gcd 4, H + L has 10.
    const form = formOf(largePolytope('w2-128-fan').vertices)
    const values = dense(form)
    const cubes = (rows: number[][]) => gcdOf(onVectors(values, rows).kappa.map((slice, a) => slice[a][a]))
    const found = new Set(
      [-2, -1, 0, 1, 2].flatMap((s) => [
        cubes([
          [1, 0],
          [s, 1],
        ]),
        cubes([
          [1, s],
          [0, 1],
        ]),
      ]),
    )
    expect(found.size).toBeGreaterThan(1)
  })
})

describe('the key', () => {
  it('is the same for other coordinates, other orders of points and classes related by an automorphism', () => {
    const symmetric = small.filter(({ id }) => ['r2-0030', 'r3-0100', 'r4-0500'].includes(id))
    expect(symmetric).toHaveLength(3)
    for (const { vertices } of symmetric) {
      const cls = classOf(vertices, 2)
      const { key } = wallInvariants(cls, intersectionNumbers(cls))
      const form = normalForm(cls.polytope)
      const inForm = transportClass(cls, form.relabelling, form.polytope)
      for (const automorphism of form.automorphisms.slice(0, 6)) {
        const image = transportClass(inForm, automorphism, form.polytope)
        expect(wallInvariants(image, intersectionNumbers(image)).key).toBe(key)
      }
    }
  })

  it('is the same after a change of coordinates of N', () => {
    fc.assert(
      fc.property(fc.constantFrom(...small.slice(5, 60)), unimodular(4, 2), ({ vertices }, operations) => {
        const keyOf = (rows: number[][]) => {
          const form = normalForm(polytopeFromPoints(rows))
          const cls = classOf(
            Array.from({ length: form.polytope.vertexCount }, (_, v) => [
              ...form.polytope.points.subarray(4 * v, 4 * v + 4),
            ]),
          )
          return wallInvariants(cls, intersectionNumbers(cls)).key
        }
        expect(keyOf(transformed(vertices, operations))).toBe(keyOf(vertices))
      }),
      { numRuns: 10, seed: 3 },
    )
  })

  it('is final under its version: stored ones are compared with new ones', () => {
    expect(wallOf(small[0].vertices)).toMatchObject({ h11: 1, fundamentalGroup: 5 })
    expect(wallOf(largePolytope('w2-272-fan').vertices).key).toBe('8bfe5badc7eb8a7ba20d96556aa054d0')
    expect(wallOf(largePolytope('w20-17-newton').vertices).key).toBe('a13b5f1a8cd51a8c883e7d1b547f1240')
  })

  it('knows the quintic from its free quotient, and published integers', () => {
    // H^3 = 5, c2 . H = 50 (Candelas, de la Ossa, Green, Parkes 1991).
    expect(wallOf(largePolytope('w1-101-fan').vertices)).toMatchObject({
      h11: 1,
      h21: 101,
      fundamentalGroup: 1,
      triple: 5,
      square: 5,
      cube: 5,
      chern: 50,
      chi: 5,
      products: ['5'],
    })
    // H^3 = 9, H^2 L = 3, H L^2 = 1, c2.H = 102, c2.L = 36 (Candelas, Font, Katz, Morrison 1994), H = 3 L + E: on
    // L, E: L^2 E = 1, L E^2 = -3, E^3 = 9, c2 . E = -6. By hand: 3 (L^2 E + L E^2) = -6, 3 (L^2 E - L E^2) = 12.
    expect(wallOf(largePolytope('w2-272-fan').vertices)).toMatchObject({
      triple: 1,
      square: 1,
      cube: 3,
      chern: 6,
      chi: 1,
      products: [],
    })
  })

  it('is made in time at h11 = 491, where no number is left out of the rank', () => {
    const cls = classOf(largePolytope('w491-11').vertices)
    const numbers = intersectionNumbers(cls)
    const form = latticeForm(cls, numbers)
    expect(form.pointCount).toBe(491)
    expect(wallInvariants(cls, numbers)).toMatchObject({ h11: 491, products: [], triple: 1 })
  })
})

describe('elementary divisors', () => {
  const matrix = fc.integer({ min: 1, max: 4 }).chain((columns) =>
    fc.array(fc.array(fc.integer({ min: -6, max: 6 }), { minLength: columns, maxLength: columns }), {
      minLength: 1,
      maxLength: 5,
    }),
  )
  const rowsOf = (rows: number[][]) =>
    rows.map((row) => new Map([...row.entries()].filter(([, entry]) => entry !== 0)))

  /** By minors: the product of the first r is the gcd of all r x r minors. */
  function byMinors(rows: number[][]): bigint[] {
    const subsets = (size: number, of: number, from = 0): number[][] =>
      size === 0
        ? [[]]
        : Array.from({ length: Math.max(0, of - from) }, (_, n) => from + n).flatMap((first) =>
            subsets(size - 1, of, first + 1).map((rest) => [first, ...rest]),
          )
    const determinant = (m: number[][]): number =>
      m.length === 0
        ? 1
        : m[0].reduce(
            (sum, entry, c) =>
              sum +
              (c % 2 ? -1 : 1) * entry * determinant(m.slice(1).map((row) => row.filter((_, k) => k !== c))),
            0,
          )
    const products = [1]
    for (let size = 1; size <= Math.min(rows.length, rows[0].length); size++) {
      const minors = subsets(size, rows.length).flatMap((r) =>
        subsets(size, rows[0].length).map((c) => determinant(r.map((a) => c.map((b) => rows[a][b])))),
      )
      const product = gcdOf(minors)
      if (product === 0) break
      products.push(product)
    }
    return products.slice(1).map((product, i) => BigInt(product / products[i]))
  }

  it('are the quotients of the gcds of minors', () => {
    fc.assert(
      fc.property(matrix, (rows) => {
        expect(elementaryDivisors(rowsOf(rows))).toEqual(byMinors(rows))
      }),
      { numRuns: 150, seed: 7 },
    )
  })

  it('stay exact where doubles would not', () => {
    const big = 2 ** 52 + 1
    expect(
      elementaryDivisors([
        new Map([
          [0, 1],
          [1, big],
        ]),
        new Map([
          [0, big],
          [1, 1],
        ]),
      ]),
    ).toEqual([1n, BigInt(big) ** 2n - 1n])
  })
})
