/**
 * `npm run bench`: medians of repeated runs beside the figures they must keep. Exit status 1 when one is above
 * 1.5 times its figure.
 */
import { fanFromHeights } from './geometry/fans/fan.ts'
import { isStrict } from './geometry/fans/fanWalls.ts'
import { quadraticHeights } from './geometry/heights.ts'
import { intersectionNumbers } from './geometry/intersectionNumbers.ts'
import { normalForm, type NormalForm } from './geometry/normalForm.ts'
import { classFromHeights } from './geometry/twoFaceClass.ts'
import { polytopeFromWeights } from './geometry/weights.ts'
import { evaluationMemory } from './bench/memory.ts'
import { alongFlips } from './bench/alongFlips.ts'
import { candidateOf, hundred, largest, small, twentyVertices, workload } from './bench/workloads.ts'

interface Measure {
  readonly name: string
  /** What the median may be; the bench fails above 1.5 times this. */
  readonly figure: number
  readonly unit: 'ms' | 'MB'
  readonly runs: number
  /** One measured value; `run` counts up from 0 and may serve as a seed. */
  readonly measure: (run: number) => number
}

const tolerated = 1.5
/** Runs before the measured ones, so that the code is compiled; as a share of the runs. */
const warmUp = 0.5

const large = workload(largest).form
const middle = workload(hundred).form
const little = workload(small).form

const measures: readonly Measure[] = [
  {
    name: 'h11 = 491: polytope set-up',
    figure: 50,
    unit: 'ms',
    runs: 20,
    measure: () => milliseconds(() => polytopeFromWeights(largest, 'newton')),
  },
  {
    name: '20 vertices: normal form',
    figure: 20,
    unit: 'ms',
    runs: 40,
    measure: (run) => {
      const polytope = twentyVertices(run)
      return milliseconds(() => normalForm(polytope))
    },
  },
  {
    name: 'h11 = 491: heights to simplices, and that none tie',
    figure: 60,
    unit: 'ms',
    runs: 20,
    measure: (run) => {
      const heights = quadraticHeights(large.polytope, { seed: run, noise: 0.45 })
      return milliseconds(() => {
        const fan = fanFromHeights(large.polytope, heights)
        return fan !== undefined && isStrict(fan, heights)
      })
    },
  },
  {
    name: 'h11 = 491: heights to triangles, intersection numbers, c2',
    figure: 3,
    unit: 'ms',
    runs: 40,
    measure: (run) => {
      const heights = quadraticHeights(large.polytope, { seed: run, noise: 0.45 })
      return milliseconds(() => {
        const outcome = classFromHeights(large.polytope, heights)
        return outcome.fine && intersectionNumbers(outcome.class)
      })
    },
  },
  {
    name: 'h11 = 491: reference point',
    figure: 200,
    unit: 'ms',
    runs: 20,
    measure: (run) => {
      const candidate = candidateOf(large, run)
      candidate.numbers()
      return milliseconds(() => candidate.reference())
    },
  },
  {
    name: 'h11 = 491: metric with top eigenvalue',
    figure: 80,
    unit: 'ms',
    runs: 20,
    measure: (run) => {
      const candidate = candidateOf(large, run)
      candidate.reference()
      return milliseconds(() => candidate.topEigenvalue())
    },
  },
  wholeCandidate('h11 = 491', large, 100, 20),
  wholeCandidate('h11 = 100', middle, 5, 100),
  wholeCandidate('h11 = 10', little, 0.5, 400),
  followed('divisors', 'score count(d in divisors : d.k3) + 0.01 * max(d in divisors : d.cubic)'),
  followed('pairs, curves', 'score min(p in pairs : p.genus) + count(c in curves : c.least < -2)'),
  followed('nested', 'score count(t in triples : all(d in t.divisors : d.cubic > 0))'),
  {
    name: 'h11 = 491: memory of an evaluation',
    figure: 150,
    unit: 'MB',
    runs: 1,
    measure: evaluationMemory,
  },
]

/** From heights to the top eigenvalue of the metric: what a rule on it costs per candidate. */
function wholeCandidate(name: string, form: NormalForm, figure: number, runs: number): Measure {
  return {
    name: `${name}: heights to top eigenvalue`,
    figure,
    unit: 'ms',
    runs,
    measure: (run) => milliseconds(() => candidateOf(form, run).topEigenvalue()),
  }
}

/** A topological rule at h11 = 491 along flips: 50 ms for a thousand classes are 20,000 a second. */
function followed(name: string, rule: string): Measure {
  return {
    name: `h11 = 491: 1,000 classes along flips, rule on ${name}`,
    figure: 50,
    unit: 'ms',
    runs: 9,
    measure: (run) => alongFlips(large, rule, run, milliseconds),
  }
}

/**
 * Time on one core: the processor time of the process or the time on the clock, whichever is less. The first
 * counts compiler and collector threads too, the second waits for other processes.
 */
function milliseconds(work: () => unknown): number {
  const clock = performance.now()
  const processor = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(processor)
  return Math.min(performance.now() - clock, (user + system) / 1000)
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return (sorted[(sorted.length - 1) >> 1] + sorted[sorted.length >> 1]) / 2
}

function medianOf({ runs, measure }: Measure): number {
  for (let run = 0; run < Math.floor(warmUp * runs); run++) measure(run)
  return median(Array.from({ length: runs }, (_, run) => measure(run)))
}

let slow = 0
for (const measure of measures) {
  const value = medianOf(measure)
  const kept = value <= tolerated * measure.figure
  if (!kept) slow++
  const columns = [
    measure.name.padEnd(60),
    `${value.toFixed(2)} ${measure.unit}`.padStart(11),
    `figure ${measure.figure} ${measure.unit}`.padStart(15),
    `${measure.runs} runs`.padStart(10),
    kept ? 'kept' : 'MISSED',
  ]
  process.stdout.write(`${columns.join('  ')}\n`)
}
if (slow > 0) {
  process.stdout.write(`${slow} of ${measures.length} above ${tolerated} times the figure\n`)
  process.exitCode = 1
}
