/**
 * How well two regressions foretell, out of sample, how candidates of an annealing run fare: ridge on the surrogate's
 * features, and Gaussian kernel regression on the same. Each is fitted after every 32 evaluations to the last 256
 * (normal scores of their order) and predicts the next 32. Prints, per task, the rank correlation of all predictions
 * with the scores, the median over runs, and the processor time of a fit. By hand:
 *
 *     nice node --import tsx tests/long/surrogateSkill.ts [--seeds N] [--budget N] [--task NAME]
 */
import { parseArgs } from 'node:util'
import { CholeskyDecomposition, Matrix } from 'ml-matrix'
import { fineClass } from '../../scoring/geometry/twoFaceClass.ts'
import { advance, startState } from '../../scoring/search/advance.ts'
import { classFeatures } from '../../scoring/search/surrogate/classFeatures.ts'
import { midranks, normalScores, rankCorrelation } from '../../scoring/search/surrogate/ranks.ts'
import { fitRidge, type RidgeModel } from '../../scoring/search/surrogate/ridge.ts'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'
import { problemOf } from '../scoring/search/problems.ts'

const { values } = parseArgs({
  options: {
    seeds: { type: 'string', default: '3' },
    budget: { type: 'string', default: '300' },
    task: { type: 'string' },
  },
})
const [seeds, budget] = [values.seeds, values.budget].map(Number)
const [interval, lookBack] = [32, 256]

const top = 'score log10(metric.divisor.top)'
const topological = 'score sum(d in divisors : max(0, d.cubic)) + 3 * count(d in divisors : d.delPezzo)'
const fourth = bundledPolytopes('small').filter(({ h11 }) => h11 === 4)
const tasks: Record<string, { readonly ids: readonly string[]; readonly rule: string }> = {
  '50-7': { ids: ['w50-7-newton-2-2-3-3-7'], rule: top },
  '50-7 topology': { ids: ['w50-7-newton-2-2-3-3-7'], rule: topological },
  '100-10': { ids: ['w100-10-newton-1-2-5-5-13'], rule: top },
  'h11-4': { ids: fourth.map(({ id }) => id), rule: top },
}

type Fit = (rows: readonly Float32Array[], targets: readonly number[]) => RidgeModel

/** Kernel exp(-|z - z'|^2 / 2 d) on d standardised features, with noise 0.1. */
const fitKernel: Fit = (rows, targets) => {
  const width = rows[0].length
  const means = Array.from(
    { length: width },
    (_, c) => rows.reduce((sum, row) => sum + row[c], 0) / rows.length,
  )
  const spreads = means.map((mean, c) =>
    Math.sqrt(rows.reduce((sum, row) => sum + (row[c] - mean) ** 2, 0) / rows.length),
  )
  const standard = (row: ArrayLike<number>): number[] =>
    means.map((mean, c) => (spreads[c] > 1e-9 ? (row[c] - mean) / spreads[c] : 0))
  const known = rows.map(standard)
  const varying = spreads.filter((spread) => spread > 1e-9).length
  const kernel = (a: readonly number[], b: readonly number[]): number =>
    Math.exp(-a.reduce((sum, x, c) => sum + (x - b[c]) ** 2, 0) / (2 * varying))
  const matrix = new Matrix(known.map((a, r) => known.map((b, c) => kernel(a, b) + (r === c ? 0.1 : 0))))
  const weights = new CholeskyDecomposition(matrix).solve(Matrix.columnVector([...targets])).to1DArray()
  return {
    predict(row) {
      const z = standard(row)
      return weights.reduce((sum, weight, n) => sum + weight * kernel(z, known[n]), 0)
    },
  }
}
const models: Record<string, Fit> = { ridge: fitRidge, kernel: fitKernel }

const ascending = (a: number, b: number): number => a - b
const median = (list: readonly number[]): number => [...list].sort(ascending)[list.length >> 1]

for (const [name, { ids, rule }] of Object.entries(tasks)) {
  if (values.task !== undefined && values.task !== name) continue
  const problem = problemOf(ids, rule, 'annealing', { budget })
  const runs = Array.from({ length: seeds }, (_, n) => {
    const lessons: { features: Float32Array; score: number }[] = []
    advance(problem, startState(problem, n + 1), Infinity, {
      observe: ({ form, outcome, heights }) => {
        const cls = fineClass(form.polytope, heights())
        if (outcome.kind !== 'feasible' || cls === undefined) return
        lessons.push({ features: classFeatures(form, cls), score: outcome.score })
      },
    })
    return lessons
  })
  for (const [model, fit] of Object.entries(models)) {
    let [fits, time] = [0, 0]
    const skills = runs.map((lessons) => {
      const [said, came]: number[][] = [[], []]
      for (let at = interval; at < lessons.length; at += interval) {
        const before = lessons.slice(Math.max(0, at - lookBack), at)
        const scores = normalScores(
          midranks(
            before.map(({ score }) => score),
            ascending,
          ),
        )
        const begun = process.cpuUsage().user
        const fitted = fit(
          before.map(({ features }) => features),
          scores,
        )
        time += (process.cpuUsage().user - begun) / 1000
        fits++
        for (const { features, score } of lessons.slice(at, at + interval)) {
          said.push(fitted.predict(features))
          came.push(score)
        }
      }
      return rankCorrelation(midranks(said, ascending), midranks(came, ascending))
    })
    process.stdout.write(
      `${name.padEnd(14)} ${model.padEnd(7)} skill ${median(skills).toFixed(2)} ` +
        `(${skills.map((skill) => skill.toFixed(2)).join(', ')}), ${(time / fits).toFixed(1)} ms a fit\n`,
    )
  }
}
