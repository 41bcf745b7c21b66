import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InputError } from '../../../scoring/errors.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { affineDimension } from '../../../scoring/geometry/polytopeInput.ts'
import { facetsByDefinition } from './facetsByDefinition.ts'
import { quintic, transformed, unimodular } from './unimodular.ts'

function refusal(rows: unknown): InputError {
  try {
    polytopeFromPoints(rows as number[][])
  } catch (error) {
    if (error instanceof InputError) return error
    throw error
  }
  throw new Error('the points were accepted')
}

const replaced = (index: number, row: unknown[]): unknown[] =>
  quintic.map((point, i) => (i === index ? row : point))

describe('polytopes that are refused', () => {
  it.each([
    [
      'no integers',
      replaced(2, [0, 0, 1.5, 0]),
      'polytope.not-integers',
      '[2][2]',
      'Coordinate 3 of point 3 is 1.5',
    ],
    ['text', replaced(0, [1, 'a', 0, 0]), 'polytope.not-integers', '[0][1]', 'the text "a"'],
    ['not a number', replaced(0, [NaN, 0, 0, 0]), 'polytope.not-integers', '[0][0]', 'is NaN'],
    ['infinite', replaced(0, [Infinity, 0, 0, 0]), 'polytope.not-integers', '[0][0]', 'is Infinity'],
    [
      'beyond 2^53',
      replaced(4, [-(2 ** 53), -1, -1, -1]),
      'polytope.unsafe-integers',
      '[4][0]',
      '9007199254740991',
    ],
    ['three coordinates', replaced(3, [0, 0, 1]), 'polytope.wrong-shape', '[3]', 'Point 4 has 3 coordinates'],
    [
      'five coordinates',
      replaced(3, [0, 0, 1, 0, 0]),
      'polytope.wrong-shape',
      '[3]',
      'Point 4 has 5 coordinates',
    ],
    ['no row', [1, 2, 3, 4, 5], 'polytope.wrong-shape', '[0]', 'Point 1 is no list of coordinates'],
    ['nothing', [], 'polytope.too-few-points', '', '0 distinct points'],
    ['four points', quintic.slice(0, 4), 'polytope.too-few-points', '', '4 distinct points'],
    [
      'repeated points',
      replaced(4, [0, 0, 0, 1]),
      'polytope.too-few-points',
      '',
      '4 distinct points were given (1 repeated)',
    ],
  ])('%s', (_, rows, code, path, words) => {
    const error = refusal(rows)
    expect(error.code).toBe(code)
    expect(error.path).toBe(path)
    expect(error.message).toContain(words)
  })

  it('points that span fewer than four dimensions, saying how many', () => {
    const line = [1, 2, 3, 4, 5].map((t) => [t, 2 * t, 0, 1])
    expect(refusal(line)).toMatchObject({ code: 'polytope.not-four-dimensional', found: 1 })
    const solid = [...quintic.slice(0, 4), [1, 1, 0, -1], [2, -1, 1, -1]]
    const error = refusal(solid)
    expect(error).toMatchObject({ code: 'polytope.not-four-dimensional', found: 3 })
    expect(error.message).toContain('span only 3 dimensions')
  })

  it('the origin on the boundary or outside, with the inequality in the coordinates given', () => {
    const boundary = refusal([[0, 0, 0, 0], ...quintic.slice(0, 4)])
    expect(boundary.code).toBe('polytope.origin-not-interior')
    expect(boundary.message).toMatch(/^The origin lies on the boundary: all points satisfy x\d >= 0,/)
    const outside = refusal([
      [2, 1, 1, 1],
      [1, 2, 1, 1],
      [1, 1, 2, 1],
      [1, 1, 1, 2],
      [2, 2, 2, 2],
    ])
    expect(outside.message).toContain('lies outside')
  })

  it('a facet at another distance, with its vertices and normal in the coordinates given', () => {
    const error = refusal(replaced(4, [-2, -1, -1, -1]).concat([[-1, 2, 0, 0]]))
    expect(error.code).toBe('polytope.facet-distance')
    const found = error.found as { normal: string[]; distance: number; vertices: number[][] }
    expect(found.vertices.length).toBeGreaterThanOrEqual(4)
    for (const vertex of found.vertices) {
      expect(vertex.reduce((sum, x, axis) => sum + x * Number(found.normal[axis]), 0)).toBe(-found.distance)
    }
    expect(error.message).toContain(`at lattice distance ${found.distance}`)
    expect(error.message).toContain(`normal (${found.normal.join(', ')})`)
  })

  it('names the same facet when the polytope is sheared', () => {
    const points = [...quintic.slice(0, 4), [-3, -1, -1, -1]]
    const plain = refusal(points).found as { distance: number }
    fc.assert(
      fc.property(unimodular(8, 50), (operations) => {
        const sheared = transformed(points, operations)
        fc.pre(sheared.flat().every((x) => Math.abs(x) < 2 ** 31))
        const found = refusal(sheared).found as { normal: string[]; distance: number; vertices: number[][] }
        expect(found.distance).toBe(plain.distance)
        for (const vertex of found.vertices) {
          const value = vertex.reduce((sum, x, axis) => sum + BigInt(x) * BigInt(found.normal[axis]), 0n)
          expect(value).toBe(BigInt(-found.distance))
        }
      }),
      { numRuns: 40 },
    )
  })

  it('coordinates that are too large, in a reduced basis or as given', () => {
    const reduced = refusal(quintic.map((point) => point.map((x) => 5000 * x)))
    expect(reduced.code).toBe('polytope.coordinates-too-large')
    expect(reduced.message).toContain('in a reduced lattice basis')
    const given = refusal(quintic.map(([a, b, c, d]) => [a + 1e12 * b, b, c, d]))
    expect(given.code).toBe('polytope.coordinates-too-large')
    expect(given.message).toContain('(-1000000000001, -1, -1, -1)')
  })

  it('more vertices than a reflexive polytope can have', () => {
    const sphere = Array.from({ length: 9 ** 4 }, (_, i) =>
      [0, 1, 2, 3].map((axis) => (Math.floor(i / 9 ** axis) % 9) - 4),
    ).filter((point) => point.reduce((sum, x) => sum + x * x, 0) === 26)
    expect(refusal(sphere).code).toBe('polytope.too-many-vertices')
  })

  it('exactly those whose facets say so', () => {
    const entry = fc.integer({ min: -1, max: 1 })
    const cloud = fc.uniqueArray(fc.tuple(entry, entry, entry, entry), {
      minLength: 5,
      maxLength: 11,
      selector: String,
    })
    const outcomes = new Map<string, number>()
    fc.assert(
      fc.property(cloud, (points) => {
        let expected = 'accepted'
        if (affineDimension(points) < 4) expected = 'polytope.not-four-dimensional'
        else {
          const offsets = facetsByDefinition(points).map((facet) => Number(facet.split(',')[4]))
          if (offsets.some((offset) => offset <= 0)) expected = 'polytope.origin-not-interior'
          else if (offsets.some((offset) => offset > 1)) expected = 'polytope.facet-distance'
        }
        let found = 'accepted'
        try {
          polytopeFromPoints(points)
        } catch (error) {
          if (!(error instanceof InputError)) throw error
          found = error.code
        }
        expect(found).toBe(expected)
        outcomes.set(found, (outcomes.get(found) ?? 0) + 1)
      }),
      { numRuns: 1500 },
    )
    expect([...outcomes.keys()]).toEqual(
      expect.arrayContaining(['accepted', 'polytope.origin-not-interior', 'polytope.facet-distance']),
    )
  })
})
