import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { InvariantError } from '../../../scoring/errors.ts'
import type { Candidate } from '../../../scoring/observables/candidate.ts'
import {
  checkRule,
  evaluatePolytopeStage,
  evaluateRequires,
  evaluateRule,
  RULE_LIMITS,
} from '../../../scoring/rules/index.ts'
import { inventedCandidate } from './inventedCandidate.ts'

function ruleOf(text: string) {
  const checked = checkRule(text)
  if (!checked.ok) throw new Error(checked.issues.map((issue) => issue.message).join('; '))
  return checked.rule
}

const EXAMPLE = `# long axion range at controlled volume
at volume 10000
require favourable
require min(d in divisors : d.volume) >= 0.3     label "no small cycle"
let reach  = log10(metric.divisor.top)
let k3 = count(d in divisors : d.k3)
score reach + 0.1 * k3
report reach, k3, smallest = min(d in divisors : d.volume)
hit reach >= -4.6
`

describe('evaluateRule', () => {
  it('evaluates the example of the language', () => {
    const outcome = evaluateRule(ruleOf(EXAMPLE), inventedCandidate())
    const reach = Math.log10(0.01 * (10000 / 3.5) ** (-4 / 3))
    expect(outcome).toMatchObject({ kind: 'feasible', score: expect.closeTo(reach + 0.1, 12), hit: false })
    expect(outcome).toMatchObject({
      report: {
        reach: { value: expect.closeTo(reach, 12) },
        k3: { value: 1 },
        smallest: { value: expect.closeTo(0.5 * (10000 / 3.5) ** (2 / 3), 9) },
      },
    })
  })

  it('gives exactly the volume and the smallest divisor that `at` asks for', () => {
    for (const value of [1, 7, 1000, 12345.678]) {
      const byVolume = evaluateRule(ruleOf(`at volume ${value}\nscore volume`), inventedCandidate())
      const byDivisor = evaluateRule(
        ruleOf(`at smallest divisor ${value}\nscore min(d in divisors : d.volume)`),
        inventedCandidate(),
      )
      expect([byVolume, byDivisor]).toMatchObject([{ score: value }, { score: value }])
    }
  })

  it('leaves the report out when asked to', () => {
    const outcome = evaluateRule(ruleOf('score volume\nreport h11'), inventedCandidate(), { report: false })
    expect(outcome).toMatchObject({ kind: 'feasible', report: {} })
  })

  it('gives plain data that survives JSON', () => {
    const outcome = evaluateRule(ruleOf(EXAMPLE), inventedCandidate())
    expect(JSON.parse(JSON.stringify(outcome))).toEqual(outcome)
    expect(structuredClone(outcome)).toEqual(outcome)
  })
})

describe('laziness', () => {
  const callsOf = (text: string, change: Partial<Candidate> = {}) => {
    const candidate = inventedCandidate(change)
    evaluateRule(ruleOf(text), candidate)
    return candidate.calls
  }

  it('asks for nothing but the polytope when the rule mentions nothing else', () => {
    expect(
      callsOf('require favourable\nscore h11 + max(d in divisors : d.chi) + sum(f in faces : f.area)'),
    ).toEqual({})
  })

  it('asks for each thing once, however often it is mentioned', () => {
    expect(callsOf('let v = volume\nscore v + volume + sum(d in divisors : volume * d.volume * v)')).toEqual({
      volumes: 2,
    })
  })

  it('stops before the metric when a requirement of an earlier stage fails', () => {
    expect(callsOf('require metric.divisor.top > 0\nrequire volume > 100\nscore metric.divisor.top')).toEqual(
      {
        volumes: 1,
      },
    )
    expect(
      callsOf('require metric.divisor.top > 0\nrequire h11 > 100\nrequire volume > 100\nscore volume'),
    ).toEqual({})
  })

  it('does not compute the cone for `at volume` when nothing moves along the ray', () => {
    expect(callsOf('at volume 1000\nscore sum(d in divisors : d.cubic)')).toEqual({ numbers: 1 })
  })

  it('computes no side of `and`, `or` and `else` that is not needed', () => {
    expect(callsOf('require h11 > 0 or volume > 1\nscore h11 + (1 else volume)')).toEqual({})
  })

  it('uses the largest eigenvalue without the full spectrum', () => {
    expect(callsOf('score log10(metric.divisor.top)')).toEqual({ topEigenvalue: 1 })
  })
})

describe('undefined values', () => {
  const failing = () =>
    inventedCandidate({
      volumes: () => {
        throw new InvariantError('the point lies outside its cone')
      },
    })

  it('name the stage whose geometry failed', () => {
    expect(evaluateRule(ruleOf('score volume'), failing())).toEqual({
      kind: 'undefined',
      stage: 'cone',
      reason: 'the cone stage failed: the point lies outside its cone (line 1, column 7)',
    })
    expect(evaluateRule(ruleOf('score min(d in divisors : d.volume)'), failing())).toMatchObject({
      kind: 'undefined',
      stage: 'cone',
    })
    expect(evaluateRule(ruleOf('at volume 3\nscore metric.divisor.top'), failing())).toMatchObject({
      kind: 'undefined',
    })
  })

  it('can be caught with `else`', () => {
    expect(evaluateRule(ruleOf('score volume else -1'), failing())).toMatchObject({
      kind: 'feasible',
      score: -1,
    })
  })

  it('let bugs pass through', () => {
    const broken = inventedCandidate({
      volumes: () => {
        throw new TypeError('a bug')
      },
    })
    expect(() => evaluateRule(ruleOf('score volume else 1'), broken)).toThrow(TypeError)
  })

  it('never come out as NaN or an infinity', () => {
    const strange = inventedCandidate({
      topEigenvalue: () => NaN,
      divisorSpectrum: () => Float64Array.of(Infinity, 1),
    })
    expect(evaluateRule(ruleOf('score metric.divisor.top'), strange)).toMatchObject({
      kind: 'undefined',
      stage: 'metric',
    })
    expect(evaluateRule(ruleOf('score max(x in metric.divisor.spectrum : x)'), strange)).toMatchObject({
      kind: 'undefined',
    })
  })
})

describe('three-valued logic', () => {
  type Formula = { readonly text: string; readonly swapped: string; readonly truth: boolean | null }
  const formulas = fc.letrec<{ formula: Formula }>((tie) => {
    const leaf = (text: string, truth: boolean | null): Formula => ({ text, swapped: text, truth })
    const binary = (word: 'and' | 'or') =>
      fc.tuple(tie('formula'), tie('formula')).map(([a, b]): Formula => {
        const decisive = word === 'or'
        const truth =
          a.truth === decisive || b.truth === decisive
            ? decisive
            : a.truth === null || b.truth === null
              ? null
              : !decisive
        return {
          text: `(${a.text} ${word} ${b.text})`,
          swapped: `(${b.swapped} ${word} ${a.swapped})`,
          truth,
        }
      })
    return {
      formula: fc.oneof(
        { maxDepth: 4 },
        fc.constant(leaf('true', true)),
        fc.constant(leaf('h11 > 5', false)),
        fc.constant(leaf('log10(0) > 1', null)),
        tie('formula').map((a): Formula => ({
          text: `(not ${a.text})`,
          swapped: `(not ${a.swapped})`,
          truth: a.truth === null ? null : !a.truth,
        })),
        binary('and'),
        binary('or'),
      ),
    }
  }).formula

  it('follows the tables, whatever the order of the operands', () => {
    fc.assert(
      fc.property(formulas, ({ text, swapped, truth }) => {
        for (const condition of [text, swapped]) {
          const outcome = evaluateRule(ruleOf(`score 1\nreport value = ${condition}`), inventedCandidate())
          expect(outcome).toMatchObject({ report: { value: { value: truth } } })
        }
      }),
      { numRuns: 200 },
    )
  })

  it('gives requirements a shortfall of zero exactly when they hold', () => {
    fc.assert(
      fc.property(formulas, ({ text, truth }) => {
        const outcome = evaluateRule(ruleOf(`require ${text}\nscore 1`), inventedCandidate())
        expect(outcome.kind).toBe(truth === null ? 'undefined' : truth ? 'feasible' : 'infeasible')
        if (outcome.kind === 'infeasible') expect(outcome.shortfall).toBeGreaterThan(0)
      }),
      { numRuns: 200 },
    )
  })

  it('gives quantifiers a value that does not depend on the order of the elements', () => {
    fc.assert(
      fc.property(fc.array(fc.constantFrom(-1, 0, 1), { minLength: 1, maxLength: 6 }), (values) => {
        const found = [values, [...values].reverse()].map((ordered) => {
          const candidate = inventedCandidate({ divisorSpectrum: () => Float64Array.from(ordered) })
          const text =
            'score 1\nreport a = any(x in metric.divisor.spectrum : 1 / x > 0), b = all(x in metric.divisor.spectrum : 1 / x > 0), c = count(x in metric.divisor.spectrum : 1 / x > 0)'
          const outcome = evaluateRule(ruleOf(text), candidate)
          return outcome.kind === 'feasible'
            ? [outcome.report.a.value, outcome.report.b.value, outcome.report.c.value]
            : []
        })
        const unknown = values.includes(0)
        const any = values.includes(1) ? true : unknown ? null : false
        const all = values.includes(-1) ? false : unknown ? null : true
        const count = unknown ? null : values.filter((value) => value > 0).length
        expect(found).toEqual([
          [any, all, count],
          [any, all, count],
        ])
      }),
    )
  })
})

describe('the step limit', () => {
  const many = () => inventedCandidate({ divisorSpectrum: () => new Float64Array(400).fill(1) })
  const deep =
    'sum(x in metric.divisor.spectrum : sum(y in metric.divisor.spectrum : sum(z in metric.divisor.spectrum : x * y * z)))'

  it('is stated where it is hit', () => {
    expect(evaluateRule(ruleOf(`score ${deep}`), many())).toEqual({
      kind: 'undefined',
      stage: 'metric',
      reason: expect.stringMatching(
        /^this `sum` passes the limit of 10,000,000 steps .*\(line 1, column 77\)$/,
      ),
    })
  })

  it('cannot be caught with `else`', () => {
    expect(evaluateRule(ruleOf(`score ${deep} else 0`), many())).toMatchObject({ kind: 'undefined' })
  })

  it('empties the cell of a report and leaves the score alone', () => {
    expect(evaluateRule(ruleOf(`score volume\nreport ${deep}`), many())).toMatchObject({
      kind: 'feasible',
      score: 3.5,
      report: { [deep]: { value: null, reason: expect.stringContaining('10,000,000 steps') } },
    })
  })

  it('makes an undefined candidate when a requirement hits it', () => {
    expect(evaluateRule(ruleOf(`require ${deep} > 0\nscore 1`), many())).toMatchObject({
      kind: 'undefined',
      stage: 'metric',
    })
  })

  it('can be set lower', () => {
    const rule = ruleOf('score sum(d in divisors : d.volume)')
    expect(evaluateRule(rule, inventedCandidate(), { stepLimit: 14 })).toMatchObject({ kind: 'undefined' })
    expect(evaluateRule(rule, inventedCandidate(), { stepLimit: 15 })).toMatchObject({ kind: 'feasible' })
  })

  it('counts a closed fold inside another fold once', () => {
    const rule = ruleOf(
      'score count(x in metric.divisor.spectrum : x >= mean(y in metric.divisor.spectrum : y))',
    )
    expect(evaluateRule(rule, many(), { stepLimit: 4000 })).toMatchObject({ kind: 'feasible', score: 400 })
    expect(RULE_LIMITS.steps).toBeGreaterThan(4000)
  })

  it('lets chains of names be evaluated once each', () => {
    const lets = Array.from({ length: 60 }, (_, at) => `let b${at + 1} = b${at} and b${at}`).join('\n')
    const rule = ruleOf(`let b0 = volume > 100\n${lets}\nrequire b60\nscore 1`)
    expect(evaluateRule(rule, inventedCandidate())).toMatchObject({ kind: 'infeasible', stage: 'cone' })
  })
})

describe('evaluateRequires', () => {
  it('looks at every requirement', () => {
    const rule = ruleOf('require h11 > 5 label "a"\nrequire volume > 1\nrequire log10(0) > 1\nscore 1')
    expect(evaluateRequires(rule, inventedCandidate())).toEqual([
      { label: 'a', stage: 'polytope', holds: false },
      { label: 'volume > 1', stage: 'cone', holds: true },
      { label: 'log10(0) > 1', stage: 'polytope', holds: null, reason: expect.stringContaining('log10') },
    ])
  })
})

describe('evaluatePolytopeStage', () => {
  const view = (change: Partial<Candidate> = {}) => {
    const { polytope, symmetryOrder } = inventedCandidate(change)
    return { polytope, symmetryOrder }
  }

  it('says what evaluateRule would say of every candidate', () => {
    for (const condition of [
      'h11 > 5',
      'any(d in divisors : d.h2 > 7)',
      'log10(0) > 1',
      'polytope.symmetry >= 9',
    ]) {
      const rule = ruleOf(`require ${condition}\nrequire volume > 100\nscore 1`)
      expect(evaluatePolytopeStage(rule, view())).toEqual(evaluateRule(rule, inventedCandidate()))
    }
  })

  it('lets pass what later stages decide', () => {
    expect(evaluatePolytopeStage(ruleOf('require volume > 100\nscore 1'), view())).toBeNull()
    expect(evaluatePolytopeStage(ruleOf('require h11 < 5\nrequire volume > 100\nscore 1'), view())).toBeNull()
    expect(evaluatePolytopeStage(ruleOf('score 1'), view())).toBeNull()
  })
})
