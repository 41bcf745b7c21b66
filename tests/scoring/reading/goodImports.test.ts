import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { certify } from '../../../scoring/index.ts'
import { evaluateInput } from '../../../scoring/evaluation.ts'
import { circuits, isGeneric } from '../../../scoring/geometry/circuits.ts'
import { isFacetGeneric } from '../../../scoring/geometry/fans/facetGenericHeights.ts'
import { fanFromHeights } from '../../../scoring/geometry/fans/fan.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import type { GivenCandidate } from '../../../scoring/reading/given.ts'
import { placeCandidate } from '../../../scoring/reading/placeCandidate.ts'
import { readCandidates } from '../../../scoring/reading/readCandidates.ts'
import { transformed, unimodular } from '../polytope/unimodular.ts'

const quintic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -1'
const octic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-2 -2 -2 -1\n-1 -1 -1 0'

/** h = (28, 12); one of very many classes. */
const evaluated = evaluateInput({
  weights: [3, 3, 4, 5, 7],
  side: 'newton',
  heights: { seed: 4, noise: 0.4 },
  show: ['triangles'],
})
const points = evaluated.points.map((row) => [...row])
const triangles = (evaluated.triangles ?? []).map((row) => [...row])
const simplices = (() => {
  const fan = fanFromHeights(polytopeFromPoints(points), evaluated.heights)
  if (fan === undefined) throw new Error('The heights are fine.')
  return Array.from(fan.facetOf, (_, s) => [...fan.simplices.subarray(4 * s, 4 * s + 4)])
})()

const rows = (list: readonly (readonly number[])[]) => list.map((row) => row.join(' ')).join('\n')
const columns = (list: readonly (readonly number[])[]) =>
  list[0].map((_, c) => list.map((row) => row[c]).join(' ')).join('\n')

/** Keys of the candidates of a text, which must hold no problem. */
function keysOf(text: string): string[] {
  const { candidates, problems, ambiguous } = readCandidates(text)
  expect([problems, ambiguous]).toEqual([[], []])
  return candidates.map(keyOf)
}

function keyOf(given: GivenCandidate): string {
  const { placed, problem } = placeCandidate(given)
  expect(problem).toBeUndefined()
  return placed?.candidateKey ?? ''
}

describe('a candidate', () => {
  const same: [string, string][] = [
    ['points and heights in sections', `vertices\n${rows(points)}\nheights\n${evaluated.heights.join(' ')}`],
    ['without headings', `found on a walk\n\n${rows(points)}\n\n${evaluated.heights.join(', ')}`],
    ['points by columns', `${columns(points)}\n\n${evaluated.heights.join('\n')}`],
    [
      'lifted points by columns',
      `lifted points\n${columns(points.map((row, i) => [...row, evaluated.heights[i]]))}`,
    ],
    ['nested lists', `vertices = ${JSON.stringify(points)}\nheights = ${JSON.stringify(evaluated.heights)}`],
    ['triangles', `points\n${rows(points)}\ntriangles\n${rows(triangles)}`],
    [
      'triangles by columns, without a heading for the points',
      `${rows(points)}\n\ntriangles\n${columns(triangles)}`,
    ],
    ['triangles without a heading', `${rows(points)}\n\n${rows(triangles)}`],
    ['simplices', `points\n${rows(points)}\nsimplices\n${rows(simplices)}`],
    [
      'simplices with the origin, counted from 1',
      `points\n0 0 0 0\n${rows(points)}\nindices from 1\nsimplices\n${rows(simplices.map((s) => [...s.map((i) => i + 2), 1]))}`,
    ],
    [
      'a table',
      `name,vertices,heights\n"a, b","${points.map((row) => row.join(' ')).join('; ')}",${evaluated.heights.join(' ')}`,
    ],
    [
      'a table of points with other columns',
      `# made by hand\nx1;x2;x3;x4;height;note\n${points.map((row, i) => `${row.join(';')};${evaluated.heights[i]};n`).join('\r\n')}`,
    ],
    ['the output of an evaluation', JSON.stringify(evaluated)],
    [
      'the input of an evaluation',
      JSON.stringify({
        vertices: points,
        heights: { points, values: evaluated.heights },
        rule: 'score volume',
      }),
    ],
    [
      'weights and seeded heights',
      JSON.stringify({ weights: [3, 3, 4, 5, 7], side: 'newton', heights: { seed: 4, noise: 0.4 } }),
    ],
    [
      'triangles with their points',
      JSON.stringify({ triangles: triangles.map((t) => t.map((i) => points[i])), vertices: points }),
    ],
    [
      'simplices with their points',
      JSON.stringify([
        { points, simplices: simplices.map((s) => [...s.map((i) => points[i]), [0, 0, 0, 0]]) },
      ]),
    ],
    [
      'our own list',
      JSON.stringify(
        {
          schema: 'tessellary.candidates/1',
          candidates: [
            {
              name: 'n',
              vertices: points,
              indexFrom: 1,
              triangles: triangles.map((t) => t.map((i) => i + 1)),
            },
          ],
        },
        null,
        2,
      ),
    ],
  ]
  it.each(same)('is read from %s', (_, text) => {
    expect(keysOf(text)).toEqual([evaluated.classKey])
  })

  it('is read from a certificate', () => {
    const { form, candidateKey, heights } = (() => {
      const { placed } = placeCandidate(readCandidates(`${octic}\n\n3 1 4 1 5 0`).candidates[0])
      if (!placed) throw new Error('not placed')
      return placed
    })()
    const { vertexCount, points: flat } = form.polytope
    const vertices = Array.from({ length: vertexCount }, (_, v) => [...flat.subarray(4 * v, 4 * v + 4)])
    const certificate = certify({ vertices, heights: [...heights], candidateKey, rule: null })
    expect(keysOf(JSON.stringify(certificate, null, 1))).toEqual([candidateKey])
  })

  it('is stored with heights that give its canonical class and tie nowhere, facets included', () => {
    const { placed } = placeCandidate(readCandidates(`${rows(points)}\n\n${rows(triangles)}`).candidates[0])
    if (!placed) throw new Error('not placed')
    const { form, heights, candidateKey } = placed
    const cls = fineClass(form.polytope, heights)
    if (!cls) throw new Error('not fine')
    const canonical = canonicalClass(form, cls)
    expect([canonical.key, canonical.class]).toEqual([candidateKey, cls])
    expect(circuits(cls).count).toBeGreaterThan(10)
    expect([isGeneric(cls, heights), isFacetGeneric(cls, heights)]).toEqual([true, true])
    expect(heights.every((height) => Number.isSafeInteger(height))).toBe(true)
  })

  it('keeps its key in other coordinates, far beyond 32 bits, and with its points in another order', () => {
    fc.assert(
      fc.property(
        unimodular(9, 40),
        fc.nat(1000),
        fc.constantFrom('heights', 'triangles', 'simplices'),
        (steps, turn, kind) => {
          const order = points
            .map((_, i) => i)
            .sort((i, j) => ((i * 7919 + turn) % 31) - ((j * 7919 + turn) % 31))
          const place = order.map((_, n) => order.indexOf(n))
          const moved = transformed(points, steps)
          fc.pre(moved.flat().every((x) => Number.isSafeInteger(x)))
          const body =
            kind === 'heights'
              ? order.map((i) => evaluated.heights[i]).join(' ')
              : rows((kind === 'triangles' ? triangles : simplices).map((row) => row.map((i) => place[i])))
          expect(keysOf(`points\n${rows(order.map((i) => moved[i]))}\n${kind}\n${body}`)).toEqual([
            evaluated.classKey,
          ])
        },
      ),
      { numRuns: 12 },
    )
    // A shear by 2^40.
    const sheared = points.map(([a, b, c, d]) => [a + 2 ** 40 * b, b, c, d])
    expect(keysOf(`points\n${rows(sheared)}\ntriangles\n${rows(triangles)}`)).toEqual([evaluated.classKey])
  })

  it('may list the origin and points inside facets, and give the origin a height that is low enough', () => {
    const text = `points\n0 0 0 0\n${octic}\nheights -9 3 1 4 1 5 0`
    expect(keysOf(text)).toEqual(keysOf(`${octic}\n\n3 1 4 1 5 0`))
    // (0, 0, 0, -1) lies inside a facet of the dual of the quintic's polytope.
    const vertices = [0, 1, 2, 3, 4].map((n) => [0, 1, 2, 3].map((axis) => (axis === n ? 4 : -1)))
    const dual = evaluateInput({ vertices, heights: { seed: 1 }, show: [] })
    const all = [...dual.points, [0, 0, 0, -1]]
    expect(dual.points).not.toContainEqual([0, 0, 0, -1])
    expect(keysOf(JSON.stringify({ vertices, points: all, heights: [...dual.heights, 17] }))).toEqual([
      dual.classKey,
    ])
  })
})

describe('several candidates', () => {
  it('may stand on one polytope, and follow one another', () => {
    const text = [
      'candidate one\nvertices',
      octic,
      'heights 3 1 4 1 5 0\n',
      'candidate two\nheights 1 1 1 1 1 0\n',
      'heights 2 2 2 2 2 0\n',
      quintic,
      '',
      '0 0 0 0 0',
    ].join('\n')
    const { candidates, problems } = readCandidates(text)
    expect(problems).toEqual([])
    expect(candidates.map(({ line, name }) => [line, name])).toEqual([
      [1, 'one'],
      [11, 'two'],
      [14, null],
      [16, null],
    ])
    const keys = candidates.map(keyOf)
    expect(new Set(keys.slice(0, 3)).size).toBe(1)
    expect(keys[3]).not.toBe(keys[0])
  })

  it('come from the lines of a search, each once', () => {
    const { polytopeKey, classKey, heights } = evaluateInput({
      weights: [1, 1, 1, 1, 1],
      side: 'fan',
      show: [],
    })
    const vertices = quintic.split('\n').map((row) => row.split(' ').map(Number))
    const find = { polytopeKey, classKey, score: { value: 1 }, heights, vertices }
    const lines = [
      { kind: 'start', schema: 'tessellary.search/1' },
      { kind: 'progress', island: 0, evaluations: 12 },
      { kind: 'find', island: 0, ...find },
      { kind: 'final', schema: 'tessellary.search/1', top: [find] },
    ]
    const { candidates, problems, format } = readCandidates(
      lines.map((line) => JSON.stringify(line)).join('\n'),
    )
    expect([problems, format]).toEqual([[], 'tessellary.search/1, JSON Lines'])
    expect(candidates.map(({ line, entry }) => [line, entry])).toEqual([[3, '']])
    expect(keyOf(candidates[0])).toBe(classKey)
  })

  it.each([1, 2])(
    'come from the export of a shortlist (schema %i): complete or by their addresses',
    (version) => {
      const placed = placeCandidate(readCandidates(JSON.stringify(evaluated)).candidates[0]).placed
      if (!placed) throw new Error('not placed')
      const { polytope, key: polytopeKey } = placed.form
      const { candidateKey, heights } = placed
      const vertices = Array.from({ length: polytope.vertexCount }, (_, v) => [
        ...polytope.points.subarray(4 * v, 4 * v + 4),
      ])
      const rowsOfList = [
        { rank: 1, candidateKey, polytopeKey },
        { rank: 2, candidateKey: '0'.repeat(32), polytopeKey },
      ]
      const document = {
        schema: `tessellary.shortlist/${version}`,
        shortlist: { name: 'Best', rows: rowsOfList },
        candidates: [{ candidateKey, polytopeKey, vertices, heights }],
      }
      const { candidates } = readCandidates(JSON.stringify(document, null, 1))
      expect(candidates.map(({ name, triangulation }) => [name, triangulation.kind])).toEqual([
        ['Best, rank 1', 'heights'],
        ['Best, rank 2', 'address'],
      ])
      expect(keyOf(candidates[0])).toBe(candidateKey)
      const table = readCandidates(`# remark\nrank,candidate,polytope\n1,${'0'.repeat(32)},${polytopeKey}\n`)
      expect(table.candidates.map(({ claims }) => claims.candidateKey)).toEqual(['0'.repeat(32)])
    },
  )

  it('nothing else is taken for data: such lines are listed', () => {
    const { candidates, skipped, problems } = readCandidates(
      `Candidates of March\n${quintic}\n\nheights:\n0 0 0 0 0\nthe end, 2 pages\n// a comment\n`,
    )
    expect([candidates.length, problems]).toEqual([1, []])
    expect(skipped).toEqual([
      { line: 1, text: 'Candidates of March' },
      { line: 10, text: 'the end, 2 pages' },
    ])
  })
})
