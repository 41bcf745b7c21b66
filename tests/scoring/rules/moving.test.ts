import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { classOfMesh, meshOfClass } from '../../../scoring/geometry/classMesh.ts'
import { copyMesh } from '../../../scoring/geometry/faceMesh.ts'
import { LineMotion } from '../../../scoring/geometry/moving/lineMotion.ts'
import { MovingNumbers } from '../../../scoring/geometry/moving/movingNumbers.ts'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { buildCandidate } from '../../../scoring/observables/buildCandidate.ts'
import { checkRule, evaluateRule, type CheckedRule } from '../../../scoring/rules/index.ts'
import { isTopological, MovingEvaluation } from '../../../scoring/rules/moving/movingEvaluation.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../scoring/search/sampling.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { everyReading, patterns } from './everyReading.ts'

const folder = new URL('./cases/', import.meta.url)

interface Case {
  readonly rule?: string
  readonly expr?: string
}

/** Every way to use an expression that has a type: as score, and in a condition. */
function rulesOf(expr: string): string[] {
  return [
    `score ${expr}`,
    `require ${expr}\nscore h11`,
    `score h11\nhit ${expr}`,
    `require ${expr} >= 3\nscore 1`,
  ]
}

/** The rules of the language's cases, and every reading of every observable, as far as they are topological. */
function topologicalRules(): CheckedRule[] {
  const texts = readdirSync(folder).flatMap((name) => {
    const { cases } = JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as { cases: Case[] }
    return cases.flatMap(({ rule, expr }) => (rule !== undefined ? [rule] : rulesOf(expr ?? '')))
  })
  const all = [...texts, ...[...everyReading, ...patterns].flatMap(rulesOf), ...further]
  return [...new Set(all)].flatMap((text) => {
    const checked = checkRule(text)
    return checked.ok && isTopological(checked.rule) ? [checked.rule] : []
  })
}

/** What the cases do not have: conditions inside folds, undefined elements, sums of rounded numbers, failing `all`. */
const further = [
  'score sum(d in divisors where d.cubic > 0 : d.c2) - max(d in divisors where d.carrier == 2 : d.euler) else 7',
  'score count(d in divisors where d.delPezzoDegree > 2 : d.c2 > 4) else count(d in divisors : d.delPezzo)',
  'score mean(p in pairs where p.genus > 0 : p.aab * p.abb) else -1',
  'score sum(p in pairs : sqrt(abs(p.aab) + 0.5))',
  'score min(p in pairs : p.aab / p.abb) else min(p in pairs where p.abb != 0 : p.aab / p.abb)',
  'require all(c in curves : c.least >= -2)\nrequire any(d in divisors : d.k3)\nscore max(c in curves : c.greatest)',
  'require count(c in curves : c.negative == 2) <= 20\nscore min(c in curves : c.least + 0.1 * c.greatest)',
  'let k = count(d in divisors : d.k3)\nscore k + 0.01 * count(d in divisors where d.rigid : d.cubic + k > 3)',
  'score count(t in triangles where t.face.dualLength > 1 : true) + max(t in triples : t.number)',
  'score count(p in pairs where p.a.carrier == 0 : p.b.rigid and p.aab < 0)',
  'score h11\nhit all(p in pairs : p.genus >= 0) and any(p in pairs : p.genus == 1)',
  'score count(t in triples : all(d in t.divisors : d.cubic > 0)) + count(t in triangles : any(d in t.divisors : d.k3))',
  'score max(c in curves where c.negative == 2 : sum(d in c.divisors : d.c2)) else 0',
  'score count(p in pairs : p.a.cubic < p.b.cubic and p.aab >= 0) - sum(p in pairs : p.a.euler * p.genus)',
  'score sum(t in triples : t.number * min(d in t.divisors where d.cubic > -2 : d.c2)) else -1',
  'score quantile(0.9, d in divisors : d.c2)',
]

const followed = topologicalRules()

interface Comparison {
  readonly rules: number
  walls: number
  compared: number
  left: number
}

/** Evaluates all rules along a line, in motion and on the canonical representative. */
function compareAlong(id: string, seed: number, most: number, rules: readonly CheckedRule[]): Comparison {
  const form = normalForm(polytopeFromPoints(largePolytope(id).vertices))
  const stream = new RandomStream(seededState(seed))
  const from = drawNull(form.polytope, stream)
  const to = drawNull(form.polytope, stream)
  const moving = new MovingNumbers(from.class)
  const evaluations = rules.map((rule) => new MovingEvaluation(rule, form, moving))
  const direction = to.heights.map((height, p) => height - from.heights[p])
  const mesh = copyMesh(meshOfClass(from.class))
  const motion = new LineMotion(mesh, from.heights, direction, (i, j, k, l, face) => {
    moving.exchange(i, j, k, l, face)
    for (const evaluation of evaluations) evaluation.exchanged()
  })
  const seen = { rules: rules.length, walls: 0, compared: 0, left: 0 }
  for (; seen.walls < most && motion.ahead !== undefined; seen.walls++) {
    if (motion.cross() !== 'crossed') break
    const { class: canonical, key } = canonicalClass(form, classOfMesh(copyMesh(mesh)))
    const candidate = buildCandidate(form, canonical, key)
    rules.forEach((rule, n) => {
      // Not every class is asked for, so that what follows an exchange must not depend on it.
      if ((n + seen.walls) % 3 === 0) return
      const outcome = evaluations[n].outcome()
      if (outcome === undefined) {
        seen.left++
        return
      }
      seen.compared++
      const usual = evaluateRule(rule, candidate, { report: false })
      // toEqual would print a thousand rules; equality is to the bit.
      if (JSON.stringify(outcome) !== JSON.stringify(usual))
        expect([rule.text, outcome]).toEqual([rule.text, usual])
    })
  }
  return seen
}

describe('a rule that follows a class in motion', () => {
  it('is met in all cases of the language up to the topology', () => {
    expect(followed.length).toBeGreaterThan(500)
  })

  it.each([
    ['w35-65', 'no automorphism', 10],
    ['w25-109', 'no automorphism', 6],
    ['w20-17', 'four automorphisms', 8],
    ['w50-74', 'not favourable, two automorphisms', 8],
    ['w30-48', 'not favourable, two automorphisms', 8],
  ])('gives the same to the bit as on the canonical representative: %s, %s', (id, _what, most) => {
    const seen = compareAlong(id, 5, most, followed)
    expect(seen.walls).toBeGreaterThan(1)
    expect(seen.compared).toBeGreaterThan(0.5 * seen.rules)
    expect(seen.left).toBeLessThan(seen.compared)
  })

  it('does so at h11 = 491 for the further rules', () => {
    const rules = followed.filter(({ text }) => further.includes(text))
    expect(rules.length).toBe(further.length)
    expect(compareAlong('w491-11', 2, 12, rules).compared).toBeGreaterThan(40)
  })
})
