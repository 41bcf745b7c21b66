import { Matrix, pseudoInverse } from 'ml-matrix'
import { sampleRankCorrelation } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { RandomStream, seededState } from '../../../../scoring/search/randomStream.ts'
import { midranks, normalScores, rankCorrelation } from '../../../../scoring/search/surrogate/ranks.ts'
import { fitRidge } from '../../../../scoring/search/surrogate/ridge.ts'

const ascending = (a: number, b: number): number => a - b

describe('ridge regression', () => {
  const stream = new RandomStream(seededState(6))
  const rows = Array.from({ length: 40 }, () => [
    10 + stream.gaussian(),
    stream.gaussian(),
    7,
    100 * stream.gaussian(),
  ])

  it('gives the least squares solution of the problem with the penalty written as further rows', () => {
    const targets = rows.map((row) => row[0] - 2 * row[1] + stream.gaussian())
    const mean = targets.reduce((sum, y) => sum + y, 0) / targets.length
    const centred = targets.map((y) => y - mean)
    // Standardised columns over sqrt(lambda) times the unit matrix, solved by singular values.
    const columns = [0, 1, 3]
    const [means, spreads] = [[], []] as [number[], number[]]
    for (const c of columns) {
      const m = rows.reduce((sum, row) => sum + row[c], 0) / rows.length
      means.push(m)
      spreads.push(Math.sqrt(rows.reduce((sum, row) => sum + (row[c] - m) ** 2, 0) / rows.length))
    }
    const standard = (row: readonly number[]): number[] =>
      columns.map((c, n) => (row[c] - means[n]) / spreads[n])
    const lambda = 3 + 0.02 * rows.length
    const system = [
      ...rows.map(standard),
      ...columns.map((_, r) => columns.map((__, c) => (r === c ? Math.sqrt(lambda) : 0))),
    ]
    const slopes = pseudoInverse(new Matrix(system)).mmul(Matrix.columnVector([...centred, 0, 0, 0]))
    const model = fitRidge(rows, centred)
    for (const row of [...rows, [9, 3, 7, -50]]) {
      const expected = standard(row).reduce((sum, z, n) => sum + z * slopes.get(n, 0), 0)
      expect(model.predict(row)).toBeCloseTo(expected, 10)
    }
  })

  it('gives no say to a feature that never varied', () => {
    const model = fitRidge(
      rows,
      normalScores(
        midranks(
          rows.map(([x]) => x),
          ascending,
        ),
      ),
    )
    expect(model.predict([10, 0, 1e6, 0])).toBe(model.predict([10, 0, 7, 0]))
    expect(fitRidge([[1, 2]], [0]).predict([5, 5])).toBe(0)
  })
})

describe('ranks', () => {
  it('are shared by equal values', () => {
    expect(midranks([3, 1, 3, 2, 3], ascending)).toEqual([3, 0, 3, 1, 3])
    expect(midranks([], ascending)).toEqual([])
  })

  it('give the rank correlation of another implementation where nothing ties', () => {
    const stream = new RandomStream(seededState(7))
    const one = Array.from({ length: 30 }, () => stream.gaussian())
    const other = one.map((x) => x ** 3 + stream.gaussian())
    const ours = rankCorrelation(midranks(one, ascending), midranks(other, ascending))
    expect(ours).toBeCloseTo(sampleRankCorrelation(one, other), 12)
    expect(rankCorrelation([0, 1, 2], [1, 1, 1])).toBe(0)
  })

  it('become normal scores of mean zero, symmetric and in order', () => {
    const scores = normalScores([0, 1, 2, 3, 4])
    expect(scores[2]).toBeCloseTo(0, 12)
    expect(scores[4]).toBeCloseTo(-scores[0], 12)
    // 90 % point of the standard normal law, tables; the library's approximation is good to three digits.
    expect(scores[4]).toBeCloseTo(1.2816, 2)
    expect([...scores].sort(ascending)).toEqual(scores)
  })
})
