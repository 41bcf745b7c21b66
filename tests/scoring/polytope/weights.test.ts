import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { outerMonomials } from '../../../scoring/geometry/monomials.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { dualPolytope } from '../../../scoring/geometry/polytope.ts'
import { polytopeFromWeights } from '../../../scoring/geometry/weights.ts'
import { weightSystem } from '../../../scoring/geometry/weightSystem.ts'
import { rowsOfFour } from './unimodular.ts'

function refusal(weights: unknown): InputError {
  try {
    polytopeFromWeights(weights as number[], 'newton')
  } catch (error) {
    if (error instanceof InputError) return error
    throw error
  }
  throw new Error('the weights were accepted')
}

/** All exponents of the degree, by trying everything. */
function monomialsByDefinition(weights: readonly number[], degree: number): number[][] {
  if (weights.length === 1) return degree % weights[0] === 0 ? [[degree / weights[0]]] : []
  const found: number[][] = []
  for (let e = 0; e * weights[0] <= degree; e++) {
    for (const rest of monomialsByDefinition(weights.slice(1), degree - e * weights[0]))
      found.push([e, ...rest])
  }
  return found
}

const weight = fc.integer({ min: 1, max: 9 })
const fiveWeights = fc.tuple(weight, weight, weight, weight, weight)

describe('polytopeFromWeights', () => {
  it('counts the monomials as the lattice points of the Newton polytope', () => {
    let accepted = 0
    fc.assert(
      fc.property(fiveWeights, (given) => {
        const { weights, degree } = weightSystem(given)
        const monomials = monomialsByDefinition(weights, degree)
        try {
          const newton = polytopeFromWeights(given, 'newton')
          expect(newton.latticePoints).toBe(monomials.length)
          accepted++
        } catch (error) {
          if (!(error instanceof InputError)) throw error
          const inside =
            error.code !== 'weights.not-interior' && error.code !== 'weights.not-four-dimensional'
          expect(inside).toBe(false)
        }
      }),
    )
    expect(accepted).toBeGreaterThan(10)
  })

  it('gives dual polytopes on the two sides, and the same ones for the weights in another order', () => {
    for (const weights of [
      [1, 1, 2, 2, 2],
      [1, 1, 1, 6, 9],
      [1, 2, 3, 4, 5],
      [1, 1, 12, 28, 42],
      [7, 5, 3, 2, 4],
    ]) {
      const fan = polytopeFromWeights(weights, 'fan')
      const newton = polytopeFromWeights(weights, 'newton')
      expect(dualPolytope(newton)).toEqual(fan)
      const reversed = polytopeFromWeights([...weights].reverse(), 'fan')
      expect(normalForm(reversed).key).toBe(normalForm(fan).key)
    }
  })

  it('has the relation of the weights among the vertices of a simplex', () => {
    // All weights divide the degree: the fan polytope is a simplex with sum w_i v_i = 0.
    for (const weights of [
      [1, 1, 1, 1, 1],
      [1, 1, 2, 2, 2],
      [1, 1, 1, 6, 9],
      [1, 1, 12, 28, 42],
    ]) {
      const fan = polytopeFromWeights(weights, 'fan')
      expect(fan.vertexCount).toBe(5)
      const vertices = rowsOfFour(fan.points).slice(0, 5)
      const orders = permutations([0, 1, 2, 3, 4])
      const related = orders.some((order) =>
        [0, 1, 2, 3].every(
          (axis) => order.reduce((sum, v, i) => sum + weights[i] * vertices[v][axis], 0) === 0,
        ),
      )
      expect(related).toBe(true)
    }
  })

  it('divides by the common factor', () => {
    expect(polytopeFromWeights([4, 4, 8, 8, 8], 'fan')).toEqual(polytopeFromWeights([1, 1, 2, 2, 2], 'fan'))
  })

  it.each([
    ['four weights', [1, 1, 1, 1], 'weights.wrong-count', '', '5 weights; 4 were given'],
    ['no list', 'quintic', 'weights.wrong-count', '', 'none were given'],
    ['zero', [1, 1, 0, 1, 1], 'weights.not-positive-integers', '[2]', 'Weight 3 is 0'],
    ['a fraction', [1, 1, 1, 1, 0.5], 'weights.not-positive-integers', '[4]', 'Weight 5 is 0.5'],
    ['too heavy', [1, 1, 1, 1, 9997], 'weights.degree-too-large', '', 'd = 10001'],
    ['a flat Newton polytope', [5, 7, 7, 7, 7], 'weights.not-four-dimensional', '', 'only 3 of 4 dimensions'],
    ['a heavy weight', [1, 2, 3, 4, 11], 'weights.not-interior', '', 'satisfy e5 <= 1'],
    ['a heavy weight in front', [11, 2, 3, 4, 1], 'weights.not-interior', '', 'satisfy e1 <= 1'],
    ['a mixed inequality', [3, 3, 5, 5, 7], 'weights.not-interior', '', 'e1 + e2 - e5 >= 1'],
  ])('refuses %s', (_, weights, code, path, words) => {
    const error = refusal(weights)
    expect(error.code).toBe(code)
    expect(error.path).toBe(path)
    expect(error.message).toContain(words)
  })

  it('names an inequality that all monomials satisfy, with equality for the product of the variables', () => {
    let checked = 0
    fc.assert(
      fc.property(fiveWeights, (given) => {
        let inequality: string
        try {
          polytopeFromWeights(given, 'newton')
          return
        } catch (error) {
          if (!(error instanceof InputError) || error.code !== 'weights.not-interior') return
          inequality = String(error.found)
        }
        checked++
        const [, left, relation, level] = /^(.*) (<=|>=) (-?\d+)$/.exec(inequality)!
        const coefficients = [0, 0, 0, 0, 0]
        for (const [, sign, size, index] of left.matchAll(/(-?) ?(\d*) ?e(\d)/g)) {
          coefficients[Number(index) - 1] = Number(`${sign}${size === '' ? 1 : size}`)
        }
        const value = (e: readonly number[]): number => e.reduce((sum, x, i) => sum + x * coefficients[i], 0)
        expect(value([1, 1, 1, 1, 1])).toBe(Number(level))
        const { weights, degree } = weightSystem(given)
        const values = monomialsByDefinition(weights, degree).map(value)
        expect(values.every((x) => (relation === '<=' ? x <= Number(level) : x >= Number(level)))).toBe(true)
        expect(new Set(values).size).toBeGreaterThan(1)
      }),
      { numRuns: 150 },
    )
    expect(checked).toBeGreaterThan(30)
  })
})

describe('outerMonomials', () => {
  it('gives the ends of each line of monomials', () => {
    fc.assert(
      fc.property(fiveWeights, (given) => {
        const system = weightSystem(given)
        const { weights, degree } = system
        const all = monomialsByDefinition(weights, degree)
        const light = [0, 1, 2, 3, 4].sort((i, j) => weights[j] - weights[i] || i - j).slice(3)
        const lines = new Map<string, number[][]>()
        for (const e of all) {
          const key = e.map((x, i) => (light.includes(i) ? '' : x)).join()
          lines.set(key, [...(lines.get(key) ?? []), e])
        }
        const ends = [...lines.values()].flatMap((line) => {
          const sorted = line.sort((x, y) => x[light[0]] - y[light[0]])
          return sorted.length === 1 ? sorted : [sorted[0], sorted[sorted.length - 1]]
        })
        expect([...outerMonomials(system)].map(String).sort()).toEqual(ends.map(String).sort())
      }),
    )
  })
})

function permutations(items: readonly number[]): number[][] {
  if (items.length === 0) return [[]]
  return items.flatMap((item) =>
    permutations(items.filter((other) => other !== item)).map((rest) => [item, ...rest]),
  )
}
