import { describe, expect, it } from 'vitest'
import {
  checkRule,
  FormCache,
  formatRule,
  normalForm,
  nullSample,
  parseRule,
  polytopeFromPoints,
  polytopeSource,
} from '../../scoring/index.ts'
import { scopeSchema } from '../../shared/polytopes.ts'
import { createTargetSchema } from '../../shared/targets.ts'
import { starterTargets } from '../../shared/starterTargets.ts'
import { bundledEntries } from '../server/support/bundledSample.ts'

/** Bundled polytopes of the starters' scopes on which some candidates are feasible and some are not. */
const onPolytope: Record<string, string> = {
  'axion-range': 'w18-18-newton-4-5-5-6-7',
  'intersection-pattern': 'w12-30-newton-5-7-7-8-9',
  'rigid-divisors': 'w20-20-fan-3-5-6-7-7',
  'volume-hierarchy': 'w9-39-newton-7-7-8-9-11',
  'fibration-window': 'w7-47-newton-8-9-9-10-13',
}

/** Candidates of each null sample, drawn with seed 1; two of the polytopes have fewer classes. */
const size = 80

describe('starter targets', () => {
  it.each(starterTargets.map((starter) => [starter.name, starter] as const))(
    '“%s” checks without a warning, and tells candidates of its scope apart',
    (_name, { id, name, purpose, text, scope }) => {
      expect(createTargetSchema.safeParse({ name, text }).success).toBe(true)
      expect(purpose.endsWith('.')).toBe(true)
      const check = checkRule(text)
      expect(check.issues).toEqual([])
      if (!check.ok) return
      const { rule } = parseRule(text)
      expect(rule && checkRule(formatRule(rule)).ok).toBe(true)

      const [polytope] = bundledEntries('large', (entry) => entry === onPolytope[id])
      const { filter } = scopeSchema.parse(scope) as { filter: { h11Min: number; h11Max: number } }
      const points = polytopeFromPoints(polytope.vertices)
      expect(points.hodge.h11).toBeGreaterThanOrEqual(filter.h11Min)
      expect(points.hodge.h11).toBeLessThanOrEqual(filter.h11Max)
      const entries = [{ key: normalForm(points).key, vertices: polytope.vertices }]
      const source = polytopeSource(entries, new FormCache(1))
      const { summary } = nullSample({ polytopes: source, rule: check.rule }, 1, size)
      expect(summary.undefined).toBe(0)
      expect(summary.feasible).toBeGreaterThan(0)
      expect(summary.feasible).toBeLessThan(summary.evaluated)
    },
  )
})
