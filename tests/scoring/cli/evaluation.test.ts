import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { caution } from '../../../scoring/caution.ts'
import { InputError } from '../../../scoring/errors.ts'
import { evaluateInput, type Evaluation } from '../../../scoring/evaluation.ts'
import { evaluationParts } from '../../../scoring/evaluation/input.ts'
import { bundledEntry } from '../search/problems.ts'

const elliptic = { weights: [1, 1, 1, 6, 9], side: 'fan' }

describe('evaluation of an input', () => {
  it('says everything about the degree-18 hypersurface in P(1,1,1,6,9)', () => {
    // Candelas, Font, Katz, Morrison 1994 (hep-th/9403187): h = (2, 272); the section E has E^3 = 9, c2.E = -6.
    const evaluation = evaluateInput(elliptic)
    expect(evaluation.schema).toBe('tessellary.evaluation/1')
    expect(evaluation.caution).toBe(caution)
    expect(evaluation.hodge).toEqual({ h11: 2, h21: 272, euler: -540 })
    expect([evaluation.favourable, evaluation.fine]).toEqual([true, true])
    const section = evaluation.c2?.indexOf(-6) ?? -1
    expect(evaluation.intersections).toContainEqual([section, section, section, 9])
    expect(evaluation.divisors?.[section]).toMatchObject({ chi: 1, h1: 0, h2: 0, components: 1, rigid: true })
    // V = 3.5 and tau = 24, 16, 2.5, 2.5, 2.5, 0.5 at the reference point: by hand from those numbers.
    expect(evaluation.reference?.volume).toBeCloseTo(3.5, 9)
    const volumes = evaluation.divisors?.map(({ volume }) => volume ?? NaN).sort((a, b) => a - b) ?? []
    for (const [n, tau] of [0.5, 2.5, 2.5, 2.5, 16, 24].entries()) expect(volumes[n]).toBeCloseTo(tau, 9)
    expect(evaluation.metric?.divisorSpectrum.length).toBe(2)
    expect(evaluation.metric?.basis.length).toBe(2)
    expect(evaluation).not.toHaveProperty('score')
  })

  it('prints only what was asked for', () => {
    const evaluation = evaluateInput({ ...elliptic, show: ['c2'] })
    expect(evaluation).toHaveProperty('c2')
    for (const part of ['triangles', 'intersections', 'divisors', 'curves', 'reference', 'metric'])
      expect(evaluation).not.toHaveProperty(part)
  })

  it('moves volumes and metric with the scale', () => {
    const [one, two] = [evaluateInput(elliptic), evaluateInput({ ...elliptic, scale: 2 })]
    expect(two.reference?.scale).toBe(2)
    expect(two.reference?.volume).toBeCloseTo(8 * (one.reference?.volume ?? 0), 9)
    expect(two.divisors?.[0].volume).toBeCloseTo(4 * (one.divisors?.[0].volume ?? 0), 9)
    expect(two.metric?.divisorSpectrum[0]).toBeCloseTo((one.metric?.divisorSpectrum[0] ?? 0) / 16, 12)
  })

  it('names the points left out and leaves undefined what is not defined', () => {
    const { points } = evaluateInput({ ...elliptic, show: [] })
    const values = points.map((_, p) => (p === 5 ? 1000 : 0))
    const evaluation = evaluateInput({ ...elliptic, heights: { points, values }, rule: 'score volume' })
    expect(evaluation).toMatchObject({
      fine: false,
      unused: [5],
      classKey: null,
      intersections: null,
      c2: null,
      curves: null,
      reference: null,
      metric: null,
      score: null,
    })
    expect(evaluation.divisors?.[5]).toEqual({
      chi: 1,
      h1: 0,
      h2: 0,
      components: 1,
      rigid: true,
      volume: null,
    })
  })

  it('scores by a rule, with report and hit', () => {
    const rule =
      'require volume > 1 score log10(volume) report v = volume, bad = log10(-volume) hit volume > 3'
    const { score } = evaluateInput({ ...elliptic, rule, show: [] })
    expect(score?.value).toBeCloseTo(Math.log10(3.5), 9)
    expect(score?.hit).toBe(true)
    expect(score?.report.v).toBeCloseTo(3.5, 9)
    expect(score?.report.bad).toHaveProperty('undefined')
    expect(score?.scoringHash).toMatch(/^[0-9a-f]{64}$/)
    const refused = evaluateInput({ ...elliptic, rule: 'require volume > 7 score volume', show: [] }).score
    expect(refused?.infeasible?.stage).toBe('cone')
    expect(refused?.infeasible?.shortfall).toBeCloseTo(0.5, 9)
    const nothing = evaluateInput({ ...elliptic, rule: 'score log10(-volume)', show: [] }).score
    expect(nothing?.undefined).toMatch(/log10/)
  })
})

describe('labels', () => {
  /** Products of elementary matrices: changes of basis of Z^4. */
  const changes = fc.array(
    fc.record({
      to: fc.integer({ min: 0, max: 3 }),
      from: fc.integer({ min: 0, max: 3 }),
      by: fc.integer({ min: -2, max: 2 }),
    }),
    { maxLength: 4 },
  )

  it('belong to the input: a change of coordinates and another order change nothing else', () => {
    const ids = ['r4-0500', 'w8-44-newton-7-7-9-10-11', 'w12-62-fan-1-3-3-4-7']
    const parts = [...evaluationParts]
    fc.assert(
      fc.property(fc.constantFrom(...ids), changes, fc.nat(1000), (id, steps, seed) => {
        const { vertices } = bundledEntry(id)
        const image = (point: readonly number[]): number[] => {
          const moved = [...point]
          for (const { to, from, by } of steps) if (to !== from) moved[to] += by * moved[from]
          return moved
        }
        const first = evaluateInput({ vertices, heights: { seed, noise: 0.4 }, show: parts })
        const moved = evaluateInput({
          vertices: vertices.map(image).reverse(),
          heights: { points: first.points.map(image).reverse(), values: [...first.heights].reverse() },
          show: parts,
        })
        expect(moved.classKey).toBe(first.classKey)
        expect(moved.polytopeKey).toBe(first.polytopeKey)
        const index = new Map(moved.points.map((point, p) => [point.join(), p]))
        const to = first.points.map((point) => index.get(image(point).join()) ?? -1)
        expect(integersIn(first, to)).toEqual(integersIn(moved, null))
        // Where an automorphism fixes the class, the labels are fixed up to it, and numbers up to rounding.
        const [one, other] = [numbersIn(first, to), numbersIn(moved, null)]
        expect(other.length).toBe(one.length)
        for (const [n, value] of one.entries()) expect(other[n] / value).toBeCloseTo(1, 8)
      }),
      { numRuns: 30 },
    )
  })
})

/** The exact parts of an evaluation after a relabelling, lists sorted. */
function integersIn(evaluation: Evaluation, to: readonly number[] | null): unknown {
  const name = (p: number): number => (to === null ? p : to[p])
  const sorted = (points: readonly number[]): number[] => points.map(name).sort((i, j) => i - j)
  return {
    triangles: evaluation.triangles?.map((triangle) => sorted(triangle).join()).sort(),
    intersections: evaluation.intersections
      ?.map((entry) => [...sorted(entry.slice(0, 3)), entry[3]].join())
      .sort(),
    c2: relabelled(evaluation.c2 ?? [], to),
    divisors: relabelled(evaluation.divisors ?? [], to).map(({ chi, h1, h2, components, rigid }) => [
      chi,
      h1,
      h2,
      components,
      rigid,
    ]),
    curves: evaluation.curves
      ?.map((row) =>
        row
          .map(([k, coefficient]) => `${name(k)}: ${coefficient}`)
          .sort()
          .join(),
      )
      .sort(),
    spectrumBits: [evaluation.metric?.divisorSpectrum, evaluation.metric?.basisSpectrum],
    basisSize: evaluation.metric?.basis.length,
  }
}

/** The rounded numbers per point, after a relabelling. */
function numbersIn(evaluation: Evaluation, to: readonly number[] | null): number[] {
  const volumes = evaluation.divisors?.map(({ volume }) => volume ?? NaN) ?? []
  return [...relabelled(volumes, to), ...relabelled(evaluation.reference?.heights ?? [], to)]
}

function relabelled<T>(values: readonly T[], to: readonly number[] | null): T[] {
  const list: T[] = []
  values.forEach((value, p) => (list[to === null ? p : to[p]] = value))
  return list
}

describe('bad input', () => {
  const { points } = evaluateInput({ ...elliptic, show: [] })
  const values = points.map((_, p) => p * p)
  const heights = { points, values }
  const cases: [name: string, input: unknown, code: string, path: string][] = [
    ['no object', 7, 'input.not-an-object', ''],
    ['unknown field', { ...elliptic, sides: 1 }, 'input.unknown-field', 'sides'],
    ['no polytope', {}, 'input.no-polytope', ''],
    ['both polytopes', { ...elliptic, vertices: [[1, 0, 0, 0]] }, 'input.two-polytopes', 'weights'],
    ['no side', { weights: [1, 1, 1, 1, 1] }, 'input.no-side', 'side'],
    ['wrong side', { weights: [1, 1, 1, 1, 1], side: 'up' }, 'input.wrong-type', 'side'],
    ['short point', { vertices: [[1, 0, 0]] }, 'polytope.wrong-shape', 'vertices[0]'],
    ['text for a number', { vertices: [[1, 0, 0, 'x']] }, 'polytope.not-integers', 'vertices[0][3]'],
    ['fraction', { vertices: [[1, 0.5, 0, 0]] }, 'polytope.not-integers', 'vertices[0][1]'],
    ['no list', { vertices: 5 }, 'input.wrong-type', 'vertices'],
    ['few points', { vertices: [[1, 0, 0, 0]] }, 'polytope.too-few-points', 'vertices'],
    ['zero weight', { weights: [1, 1, 0, 1, 1], side: 'fan' }, 'weights.not-positive-integers', 'weights[2]'],
    ['large noise', { ...elliptic, heights: { noise: 0.7 } }, 'heights.noise', 'heights.noise'],
    ['wrong seed', { ...elliptic, heights: { seed: 0.5 } }, 'heights.seed', 'heights.seed'],
    [
      'missing point',
      { ...elliptic, heights: { points: points.slice(1), values: values.slice(1) } },
      'heights.missing-point',
      'heights.points',
    ],
    [
      'foreign point',
      { ...elliptic, heights: { points: [...points, [9, 9, 9, 9]], values: [...values, 1] } },
      'heights.no-such-point',
      'heights.points[6]',
    ],
    [
      'point twice',
      { ...elliptic, heights: { points: [...points, points[2]], values: [...values, 1] } },
      'heights.point-twice',
      'heights.points[6]',
    ],
    [
      'fewer values',
      { ...elliptic, heights: { points, values: values.slice(1) } },
      'heights.wrong-count',
      'heights.values',
    ],
    [
      'fractional height',
      { ...elliptic, heights: { ...heights, values: [0.5, ...values.slice(1)] } },
      'heights.not-integers',
      'heights.values[0]',
    ],
    [
      'huge height',
      { ...elliptic, heights: { points, values: values.map(() => 2 ** 50) } },
      'heights.too-large',
      'heights.values[0]',
    ],
    ['negative scale', { ...elliptic, scale: -1 }, 'input.wrong-type', 'scale'],
    ['unknown part', { ...elliptic, show: ['c2', 'c3'] }, 'input.wrong-type', 'show[1]'],
    ['rule with an error', { ...elliptic, rule: 'score volum' }, 'rule.unknown-name', 'rule'],
  ]

  it.each(cases)('%s', (_, input, code, path) => {
    let thrown: unknown
    try {
      evaluateInput(input)
    } catch (error) {
      thrown = error
    }
    expect(thrown).toBeInstanceOf(InputError)
    expect(thrown).toMatchObject({ code, path })
  })

  it('locates the error of a rule', () => {
    expect(() => evaluateInput({ ...elliptic, rule: 'require volume > 1\nscore volum' })).toThrow(
      /^line 2, column 7: .*volume/s,
    )
  })
})
