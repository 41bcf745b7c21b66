import { describe, expect, it } from 'vitest'
import { certify } from '../../../scoring/certificates/certify.ts'
import { certifiedNames, reservation } from '../../../scoring/certificates/notCertified.ts'
import { recheck } from '../../../scoring/certificates/recheck.ts'
import type { Certificate } from '../../../scoring/certificates/schema.ts'
import { facetsAreGeneric } from '../../../scoring/certify/facetTriangulation.ts'
import { examineFan } from '../../../scoring/certify/fan.ts'
import { liftedPoints } from '../../../scoring/certify/liftedSimplex.ts'
import { readPolytope } from '../../../scoring/certify/polytopeReading.ts'
import { intersectionList, sortedTriangles } from '../../../scoring/evaluation/relabelled.ts'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { flip, flippableEdges } from '../../../scoring/geometry/flips.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { isRegular } from '../../../scoring/geometry/regularity.ts'
import { fineClass, referenceClass, type TwoFaceClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { OBSERVABLES } from '../../../scoring/observables/registry.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { failed, genericHeights, plain, request } from './samples.ts'

const rule = `
require min(d in divisors : d.volume) >= 0.3
score log10(metric.divisor.top) + count(d in divisors : d.rigid) / 10
report v = volume, rigid = count(d in divisors : d.rigid), order = polytope.symmetry
hit volume > 1000`
const sample = plain(largePolytope('w20-17').vertices)
const good = certify(request(sample, rule))

/** A copy of the certificate with something changed. */
function altered(change: (copy: Certificate) => void): Certificate {
  const copy = structuredClone(good)
  change(copy)
  return copy
}

/** Flips picked by number, regular or not. */
function wander(cls: TwoFaceClass, picks: readonly number[]): TwoFaceClass {
  return picks.reduce((at, pick) => {
    const edges = flippableEdges(at)
    return edges.length === 0 ? at : (flip(at, edges[pick % edges.length]) ?? at)
  }, cls)
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

describe('heights that tie', () => {
  it('are replaced by others in general position inside the class', () => {
    const form = normalForm(sample.polytope)
    // The heights of one class, rounded until some circuit of a facet or a 2-face is zero.
    const { heights } = request(sample, null, 3)
    const coarse = [...Array(20).keys()]
      .map((n) => Array.from(heights, (height) => Math.round(height / 2 ** (21 - n)) * 2 ** (21 - n)))
      .findLast(
        (list) => fineClass(form.polytope, list) && !facetsAreGeneric(sample.vertices, sample.points, list),
      )
    const cls = coarse && fineClass(form.polytope, coarse)
    if (!cls) throw new Error('none ties')
    const candidateKey = canonicalClass(form, cls).key
    const { passed, heightsReplaced } = certify({ ...request(sample, null), heights: coarse, candidateKey })
    expect([passed, heightsReplaced, good.heightsReplaced]).toEqual([true, true, false])
  })
})

describe('the triangulation of a certificate', () => {
  it('is rejected when the heights were altered', () => {
    // The heights of another candidate of the same polytope.
    const other = request(sample, null, 7)
    const fault = altered((copy) => (copy.heights = [...Array.from(other.heights)]))
    const { passed, checks } = recheck(fault)
    expect(passed).toBe(false)
    expect(failed(checks)).toEqual(['simplices', 'triangles', 'candidate-key'])
  })

  it('is rejected when the heights tie, and says so', () => {
    const squares = good.points.map((point) => point.reduce((sum, entry) => sum + entry * entry, 0))
    const { checks } = recheck(altered((copy) => (copy.heights = squares)))
    expect(failed(checks)).toEqual(['heights-generic'])
    expect(checks.find(({ id }) => id === 'volume')?.result).toBe('not-done')
  })

  it('is rejected for a class that no heights give, however consistent its numbers', () => {
    const form = normalForm(sample.polytope)
    const irregular = [...Array(200).keys()]
      .map((n) =>
        wander(referenceClass(form.polytope), [n, 3 * n + 1, 7 * n + 2, 5, n, n + 1, 2 * n, 11, 3, n]),
      )
      .find((cls) => !isRegular(cls).regular)
    if (irregular === undefined) throw new Error('none found')
    const { class: cls, key } = canonicalClass(form, irregular)
    const candidate = buildCandidate(form, cls, key)
    const identity = Int32Array.from(sample.points.keys())
    const fault = altered((copy) => {
      copy.candidateKey = key
      copy.numbers.triangles = sortedTriangles(cls.triangles, null) as typeof copy.numbers.triangles
      copy.numbers.intersections = intersectionList(candidate, {
        to: identity,
        back: identity,
      }) as typeof copy.numbers.intersections
      copy.numbers.c2 = [...candidate.numbers().secondChern]
    })
    const { passed, checks } = recheck(fault)
    expect(passed).toBe(false)
    expect(failed(checks)).toEqual(['triangles', 'candidate-key'])
  })

  it('is rejected for cones that the heights do not make convex', () => {
    const { vertices, points } = sample
    const normals = readPolytope(vertices).normals
    const cones = good.numbers.simplices ?? []
    const own = examineFan(liftedPoints(points, good.heights), normals, cones)
    expect([own.flat.length, own.uneven.length, own.unused.length]).toEqual([0, 0, 0])
    const other = examineFan(liftedPoints(points, genericHeights(sample, 7)), normals, cones)
    expect(other.flat.length).toBeGreaterThan(0)
    const torn = examineFan(liftedPoints(points, good.heights), normals, cones.slice(1))
    expect([torn.uneven.length, own.volume - torn.volume > 0]).toEqual([4, true])
  })
})

describe('the rule of a certificate', () => {
  it('is rejected when the score was altered', () => {
    const score = altered(({ numbers }) => {
      if (numbers.score?.value !== undefined) numbers.score.value += 1e-5
    })
    expect(failed(recheck(score).checks)).toEqual(['score'])
    const cell = altered(({ numbers }) => {
      if (numbers.score) numbers.score.report.rigid = 1 + Number(numbers.score.report.rigid)
    })
    expect(failed(recheck(cell).checks)).toEqual(['report'])
    const hit = altered(({ numbers }) => {
      if (numbers.score) numbers.score.hit = false
    })
    expect(failed(recheck(hit).checks)).toEqual(['hit'])
  })

  it('is rejected when it was altered itself', () => {
    const problems = (change: (copy: Certificate) => void): string[] => {
      const { passed, problems: list } = recheck(altered(change))
      expect(passed).toBe(false)
      return list.map(({ code, path }) => `${code} ${path}`)
    }
    const swapped = rule.replace('0.3', '0.2')
    expect(problems((copy) => (copy.rule = swapped))).toContain('certificate.rule-altered rule')
    expect(problems((copy) => (copy.rule = 'score volum'))).toContain('certificate.rule-broken rule')
    expect(problems((copy) => (copy.rule = null))).toContain('certificate.rule-incomplete rule')
  })

  it('names the observables it uses that are not certified', () => {
    expect(good.notCertified.map(({ what }) => what)).toContain('polytope.symmetry')
    expect(good.notCertified.map(({ what }) => what)).not.toContain('divisors.rigid')
    const hiding = altered((copy) => (copy.notCertified = copy.notCertified.slice(1)))
    expect(recheck(hiding).problems.map(({ code }) => code)).toEqual(['certificate.reservation-missing'])
  })

  it('gives a reason for every observable that is not known to be certified', () => {
    const names = OBSERVABLES.flatMap((entry) => [
      entry.name,
      ...(entry.kind === 'records' ? entry.fields.map((field) => `${entry.name}.${field.name}`) : []),
    ])
    expect(certifiedNames.filter((name) => !names.includes(name))).toEqual([])
    expect(reservation('divisors.volume')).toBeNull()
    expect(reservation('faces.area')).toMatch(/fast road/)
    expect(reservation('something.new')).toMatch(/fast road/)
  })
})

describe('a certificate file', () => {
  const codes = (raw: unknown): string[] => recheck(raw).problems.map(({ code, path }) => `${code} ${path}`)

  it('is refused with the place when it is no certificate', () => {
    expect(codes(null)).toEqual(['certificate.malformed '])
    expect(codes({ ...good, schema: 'tessellary.certificate/9' })).toEqual([
      'certificate.other-schema schema',
    ])
    const cut = altered((copy) => copy.heights.pop())
    expect(failed(recheck(cut).checks)).toEqual(['heights-generic'])
    const { numbers, ...rest } = good
    expect(codes(rest)).toEqual(['certificate.malformed numbers'])
    expect(codes({ ...good, numbers: { ...numbers, c2: ['1'] } })).toEqual([
      'certificate.malformed numbers.c2[0]',
    ])
    expect(recheck(rest).checks).toEqual([])
  })

  it('is refused when its words, versions or verdicts were altered', () => {
    expect(codes({ ...good, caution: 'All is well.' })).toEqual(['certificate.text-altered caution'])
    expect(codes({ ...good, engineVersion: '0' })).toContain('certificate.other-engine engineVersion')
    expect(codes({ ...good, passed: false })).toEqual(['certificate.verdict-altered passed'])
    expect(codes({ ...good, checks: good.checks.slice(1) })).toEqual(['certificate.check-missing checks'])
    const claimed = altered((copy) => (copy.numbers.c2[0] += 12))
    expect(codes(claimed)).toEqual([
      `certificate.check-differs checks[${good.checks.findIndex(({ id }) => id === 'second-chern')}].result`,
    ])
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
