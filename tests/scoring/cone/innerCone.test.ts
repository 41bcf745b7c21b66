import { describe, expect, it } from 'vitest'
import { InnerCone } from '../../../scoring/geometry/innerCone.ts'
import { leastNormPoint } from '../../../scoring/geometry/quadraticProgram.ts'
import { referencePoint } from '../../../scoring/geometry/referencePoint.ts'
import { distinctRows } from '../../../scoring/geometry/sparseRows.ts'
import { largePolytope } from '../../reference/bundledPolytopes.ts'
import { circuitsByMinors } from './circuitsByMinors.ts'
import { rowLists, sparseRows, valueOf } from './randomPrograms.ts'
import { classOf, someVertices, topologyOf } from './stages.ts'

const byText = (rows: readonly (readonly (readonly [number, number])[])[]): string[] =>
  [...new Set(rows.map((row) => JSON.stringify(row)))].sort()

describe('inner cone', () => {
  const classes = someVertices(60).map(({ vertices }) => classOf(vertices, 5))
  const small = classes.filter(({ polytope }) => polytope.pointCount <= 16)

  it('has the circuits that determinants give', () => {
    for (const cls of small) {
      expect(byText(rowLists(new InnerCone(cls).allCircuits()))).toEqual(byText(circuitsByMinors(cls)))
    }
  })

  it('gives the point of the program with all circuits listed at once', () => {
    let needed = 0
    for (const cls of small) {
      const { numbers, curves } = topologyOf(cls)
      const found = referencePoint(cls, numbers, curves)
      const all = sparseRows([...rowLists(curves), ...circuitsByMinors(cls)])
      const expected = leastNormPoint(numbers.pointCount, distinctRows(all)).point
      const size = Math.max(...expected.map(Math.abs))
      found.weights.forEach((w, p) => expect(Math.abs(w - expected[p])).toBeLessThan(1e-10 * size))
      expect(found.edgeCurvesSuffice).toBe(found.rounds === 0)
      needed += found.edgeCurvesSuffice ? 0 : 1
    }
    expect(needed).toBeGreaterThan(small.length / 4)
    expect(needed).toBeLessThan(small.length)
  })

  it('finds of every triangle the worst violated circuit, and only violated ones', () => {
    for (const cls of small) {
      const { numbers, curves } = topologyOf(cls)
      const weights = leastNormPoint(numbers.pointCount, distinctRows(curves)).point
      const violated = rowLists(new InnerCone(cls).violatedCircuits(weights, 1 - 1e-8)).map((row) =>
        valueOf(row, weights),
      )
      const all = circuitsByMinors(cls).map((row) => valueOf(row, weights))
      expect(violated.every((value) => value < 1)).toBe(true)
      const worst = Math.min(...all)
      if (worst < 1 - 1e-7) expect(Math.min(...violated)).toBeCloseTo(worst, 9)
      else expect(violated.filter((value) => value < 1 - 1e-7)).toEqual([])
    }
  })

  it('leaves no circuit violated where the edge curves are far from enough', () => {
    const cls = classOf(largePolytope('w75-10').vertices, 1)
    const { numbers, curves } = topologyOf(cls)
    const { weights } = referencePoint(cls, numbers, curves)
    for (const row of rowLists(curves)) expect(valueOf(row, weights)).toBeGreaterThan(1 - 1e-9)
    expect(new InnerCone(cls).violatedCircuits(weights, 1 - 1e-7).points).toHaveLength(0)
  })
})
