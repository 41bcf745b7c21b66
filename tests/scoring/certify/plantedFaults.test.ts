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
