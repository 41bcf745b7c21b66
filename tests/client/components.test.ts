import { describe, expect, it } from 'vitest'
import {
  canonicalClass,
  classFromHeights,
  normalForm,
  polytopeFromPoints,
  quadraticHeights,
} from '../../scoring/index.ts'
import { candidateGeometry } from '../../server/jobs/compute/candidateGeometry.ts'
import { componentLabels, splitRows } from '../../src/routes/candidate/ComponentSection.tsx'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'

function geometryOf(id: string) {
  const entry = bundledPolytopes('small').find((polytope) => polytope.id === id)
  const form = normalForm(polytopeFromPoints(entry?.vertices ?? []))
  const { polytope } = form
  // Heights that are their own class's canonical representative: the first among a few seeds.
  for (let seed = 0; seed < 50; seed++) {
    const heights = [...quadraticHeights(polytope, { seed, noise: 0.4 })]
    const outcome = classFromHeights(polytope, heights)
    if (!outcome.fine) continue
    const canonical = canonicalClass(form, outcome.class)
    if (canonical.class !== outcome.class) continue
    const vertices = Array.from({ length: polytope.vertexCount }, (_, v) => [
      ...polytope.points.subarray(4 * v, 4 * v + 4),
    ])
    return { hodge: polytope.hodge, ...candidateGeometry({ key: canonical.key, vertices, heights }) }
  }
  throw new Error('no seed gives a canonical representative')
}

describe('components on the dossier', () => {
  const favourable = bundledPolytopes('small').filter((entry) => entry.favourable)
  const split = bundledPolytopes('small').filter((entry) => !entry.favourable)

  it('are left out on a favourable polytope', () => {
    expect(geometryOf(favourable[40].id).components).toBeNull()
  })

  it.each(split.slice(0, 4).map(({ id }) => id))('span all of H11, and add up to the divisors: %s', (id) => {
    const { components, divisors, secondChern, intersections, hodge } = geometryOf(id)
    if (!components) throw new Error('it is not favourable')
    expect(components.pointOf).toHaveLength(hodge.h11 + 4)
    divisors.forEach((divisor, p) => {
      const own = components.pointOf.flatMap((point, c) => (point === p ? [c] : []))
      expect(own).toHaveLength(divisor.components)
      const total = (values: number[]) => own.reduce((sum, c) => sum + (values[c] ?? 0), 0)
      expect([total(components.cubes), total(components.secondChern)]).toEqual([divisor.cube, secondChern[p]])
      expect(total(components.volumes)).toBeCloseTo(divisor.volume, 12)
    })
    const sum = (rows: [number, number, number, number][], of: (c: number) => number) => {
      const table = new Map<string, number>()
      for (const [i, j, k, value] of rows) {
        // Ordered triples, so that sums over the components of several corners come out right.
        const times = i === j && j === k ? 1 : i === j || j === k ? 3 : 6
        const name = [i, j, k]
          .map(of)
          .sort((a, b) => a - b)
          .join()
        table.set(name, (table.get(name) ?? 0) + times * value)
      }
      return Object.fromEntries([...table].filter(([, value]) => value !== 0))
    }
    expect(sum(components.intersections, (c) => components.pointOf[c] ?? -1)).toEqual(
      sum(intersections, (p) => p),
    )
    const { parts, numbers } = splitRows(components)
    expect(parts.length).toBe(
      divisors.filter((divisor) => divisor.components > 1).reduce((count, { components: n }) => count + n, 0),
    )
    expect(parts.every(({ cube, c2 }) => 2 * cube + c2 === 12)).toBe(true)
    expect(numbers.length).toBeGreaterThan(0)
    // Different components of one divisor do not meet.
    for (const { labels } of numbers) {
      const sheets = labels.filter((label) => label.includes('.'))
      expect(new Set(sheets.map((label) => label.split('.')[1])).size).toBe(1)
    }
  })

  it('are called by their divisor and a number', () => {
    expect(componentLabels({ pointOf: [0, 1, 1, 2], sheetOf: [0, 0, 1, 0] })).toEqual([
      '0',
      '1.1',
      '1.2',
      '2',
    ])
  })
})
