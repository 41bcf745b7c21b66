/**
 * Does a guided search find the best of all? On five polytopes with 1,000 to 10,000 classes and three rules the optimum
 * is known from the exhaustive method; then many seeds search with a tenth of the candidates as their budget. By hand:
 *
 *     nice node --import tsx tests/long/exactOptimum.ts [--method NAME] [--seeds N] [--from SEED] [--polytope NAME] [--rule NAME]
 *
 * Prints how many seeds found it, with the median of evaluations; ends with status 1 when fewer than 95 % did somewhere.
 * Outcomes are shared among the searches of a rule, which spares time and alters no result.
 */
import { parseArgs } from 'node:util'
import { methodNames, isMethodName } from '../../scoring/search/methods.ts'
import { exactOptimum, namedPolytopes, optimumRules, searchFor } from '../scoring/search/exactOptimum.ts'

const { values } = parseArgs({
  options: {
    method: { type: 'string', default: 'annealing' },
    seeds: { type: 'string', default: '100' },
    from: { type: 'string', default: '1' },
    polytope: { type: 'string' },
    rule: { type: 'string' },
  },
})
const { method } = values
if (!isMethodName(method)) throw new Error(`The methods are ${methodNames.join(', ')}.`)
const seeds = Array.from({ length: Number(values.seeds) }, (_, n) => Number(values.from) + n)
const print = (line: string): boolean => process.stdout.write(`${line}\n`)

for (const polytope of namedPolytopes) {
  if (values.polytope !== undefined && values.polytope !== polytope.name) continue
  for (const [name, rule] of Object.entries(optimumRules)) {
    if (values.rule !== undefined && values.rule !== name) continue
    const optimum = exactOptimum(polytope, rule)
    const found = seeds
      .map((seed) => searchFor(optimum, method, seed))
      .filter((evaluations) => evaluations !== null)
      .sort((a, b) => a - b)
    const kept = found.length >= 0.95 * seeds.length
    if (!kept) process.exitCode = 1
    print(
      `${polytope.name.padEnd(22)} ${name.padEnd(8)} best of ${optimum.candidates}: ${optimum.best.toFixed(5)}; ` +
        `found by ${found.length} of ${seeds.length} with ${optimum.budget} evaluations, median ` +
        `${found[found.length >> 1] ?? '-'}${kept ? '' : '  MISSED'}`,
    )
  }
}
