import { describe, expect, it } from 'vitest'
import { certify } from '../../../scoring/certificates/certify.ts'
import { recheck } from '../../../scoring/certificates/recheck.ts'
import type { Certificate } from '../../../scoring/certificates/schema.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { failed, plain, request } from './samples.ts'

const rule = 'score log10(metric.divisor.top) report v = volume'
const sample = plain(largePolytope('w20-17').vertices)
const good = certify(request(sample, rule))

/** A copy of the certificate with something changed. */
function altered(change: (copy: Certificate) => void): Certificate {
  const copy = structuredClone(good)
  change(copy)
  return copy
}

describe('a certificate', () => {
  it('passes, and passes again from its file', () => {
    expect(failed(good.checks)).toEqual([])
    expect(good.passed).toBe(true)
    const again = recheck(JSON.parse(JSON.stringify(good)))
    expect([again.passed, again.problems]).toEqual([true, []])
    const verdicts = (checks: typeof again.checks) => checks.map(({ id, result }) => [id, result])
    expect(verdicts(again.checks)).toEqual(verdicts(good.checks))
  })

  it('is rejected for a wrong triangle', () => {
    const fault = altered(({ numbers: { triangles } }) => {
      const at = triangles.length >> 1
      triangles[at] = [triangles[at][0], triangles[at][1], triangles[at][2] + 1]
    })
    const { passed, checks } = recheck(fault)
    expect(passed).toBe(false)
    expect(failed(checks)).toEqual(['triangles'])
  })

  it('is rejected for a point that no cone uses', () => {
    const inside = good.numbers.carriers.lastIndexOf(2)
    const fault = altered((copy) => (copy.heights[inside] += 2 ** 40))
    const { passed, checks } = recheck(fault)
    expect(passed).toBe(false)
    expect(failed(checks)).toContain('points-used')
    expect(checks.find(({ id }) => id === 'points-used')?.note).toMatch(`Point ${inside} `)
  })

  it('is rejected for a wrong intersection number', () => {
    const fault = altered(({ numbers: { intersections } }) => (intersections[40][3] += 1))
    const { passed, checks } = recheck(fault)
    expect(passed).toBe(false)
    expect(failed(checks)).toEqual(['intersection-numbers'])
  })
})

describe('the metric of a certificate', () => {
  it('is rejected when it is off by one part in a million', () => {
    const off = (list: number[], n: number): void => {
      list[n] *= 1 + 1e-6
    }
    const one = altered(({ numbers: { metric } }) => off(metric.divisorSpectrum, 7))
    expect(failed(recheck(one).checks)).toEqual(['divisor-spectrum', 'metric-differences'])
    const top = altered(({ numbers: { metric } }) => (metric.top *= 1 + 1e-6))
    expect(failed(recheck(top).checks)).toEqual(['top-eigenvalue'])
    const all = altered(({ numbers: { metric } }) =>
      metric.divisorSpectrum.forEach((_, n, list) => off(list, n)),
    )
    expect(failed(recheck(all).checks)).toEqual(['divisor-spectrum', 'metric-differences'])
    const basis = altered(({ numbers: { metric } }) => off(metric.basisSpectrum, 0))
    expect(failed(recheck(basis).checks)).toEqual(['basis-spectrum'])
  })

  it('is rejected at another Kaehler class', () => {
    const moved = altered(({ numbers: { reference } }) => (reference.weights[3] += 1e-5))
    expect(failed(recheck(moved).checks)).toEqual(['edge-curves'])
    const along = altered(({ numbers: { reference }, points }) => {
      reference.weights.forEach((weight, p, list) => (list[p] = weight + 1e-5 * points[p][0]))
    })
    expect(failed(recheck(along).checks)).toContain('reference-point')
    const scaled = altered(({ numbers: { reference } }) => {
      reference.weights.forEach((weight, p, list) => (list[p] = 1.001 * weight))
    })
    expect(failed(recheck(scaled).checks)).toContain('reference-point')
    const inward = altered(({ numbers: { reference } }) => {
      reference.weights.forEach((weight, p, list) => (list[p] = 0.999 * weight))
    })
    expect(failed(recheck(inward).checks)).toContain('edge-curves')
  })
})
