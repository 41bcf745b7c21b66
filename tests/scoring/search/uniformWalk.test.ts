import { EigenvalueDecomposition, Matrix } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { circuits } from '../../../scoring/geometry/circuits.ts'
import { enumerateClasses } from '../../../scoring/geometry/enumeration.ts'
import { flip } from '../../../scoring/geometry/flips.ts'
import { advance, startState } from '../../../scoring/search/advance.ts'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'
import { uniformProposal, walkStart } from '../../../scoring/search/uniformWalk.ts'
import { problemOf } from './problems.ts'

const { polytopes } = problemOf(['w10-64-fan-1-2-4-5-5'], 'score volume', 'random', { budget: 1 })
const { polytope } = polytopes.at(0)
const { classes } = enumerateClasses(polytope)
const indexOf = new Map(classes.map(({ triangles }, n) => [triangles.join(), n]))

/** ways[a][b]: proposals, out of all edges inside 2-faces, that lead from class a to class b or leave it at a. */
const ways = classes.map((cls, from) => {
  const row = new Array<number>(classes.length).fill(0)
  const { count, i, j } = circuits(cls)
  for (let e = 0; e < count; e++) {
    const to = flip(cls, { i: i[e], j: j[e] })
    row[(to && indexOf.get(to.triangles.join())) ?? from]++
  }
  return row
})
const edges = circuits(classes[0]).count

describe('uniform walk', () => {
  it('has a symmetric matrix of proposals with the same number in every row', () => {
    for (const [from, row] of ways.entries()) {
      expect(row.reduce((a, b) => a + b)).toBe(edges)
      for (const to of row.keys()) expect(row[to]).toBe(ways[to][from])
    }
  })

  it('visits all classes equally often', () => {
    const stream = new RandomStream(seededState(2))
    const visits = classes.map(() => 0)
    // Steps after which a visit remembers less than 2 % of an earlier one: from the second eigenvalue of the walk.
    const { realEigenvalues } = new EigenvalueDecomposition(new Matrix(ways).div(edges))
    const second = realEigenvalues.sort((a, b) => b - a)[1]
    const spacing = Math.ceil(Math.log(0.02) / Math.log(second))
    const samples = 450
    let place = walkStart(polytope)
    for (let n = 0; n < samples * spacing; n++) {
      const proposal = uniformProposal(place, stream)
      const heights = proposal?.heights()
      if (proposal !== undefined && heights !== undefined) place = { class: proposal.class, heights }
      if (n % spacing === 0) visits[indexOf.get(place.class.triangles.join()) ?? -1]++
    }
    const expected = samples / classes.length
    const square = visits.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0)
    // 29 degrees of freedom: mean 29, standard deviation 7.6, 99.9 % quantile 58.3.
    expect(classes.length).toBe(30)
    expect(spacing).toBeLessThan(300)
    expect(square).toBeLessThan(58.3)
    expect(square).toBeGreaterThan(8)
  })

  it('is refused where it would be too slow or too wide', () => {
    const large = problemOf(['w149-1-newton-1-1-1-1-4'], 'score h11', 'uniform', { budget: 10 })
    expect(() => advance(large, startState(large, 1), 1)).toThrow(/149/)
  })
})
