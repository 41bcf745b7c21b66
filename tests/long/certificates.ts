/**
 * Certifies and re-checks: a candidate on every bundled polytope with h11 <= 3, random candidates with h11 4-12 and
 * 20-100, and one at h11 = 491. By hand:
 *
 *     node --import tsx tests/long/certificates.ts [--middle N] [--large N] [--skip small,middle,large,largest]
 *
 * Prints a line per group, and every check that failed; ends with status 1 when there is one.
 */
import { parseArgs } from 'node:util'
import {
  canonicalClass,
  certify,
  classFromHeights,
  normalForm,
  polytopeFromPoints,
  quadraticHeights,
  recheck,
} from '../../scoring/index.ts'
import { bundledPolytopes, type BundledPolytope } from '../reference/bundledPolytopes.ts'

const { values } = parseArgs({
  options: {
    middle: { type: 'string', default: '100' },
    large: { type: 'string', default: '10' },
    skip: { type: 'string', default: '' },
  },
})
const skipped = new Set(values.skip.split(','))
const rule = `require volume > 0
score log10(metric.divisor.top) + count(d in divisors : d.rigid) / 100
report k3 = count(d in divisors : d.k3), basis = metric.basis.top, most = max(d in divisors : d.volume)
hit count(c in curves : c.volume < 1.5) > 3`

const small = bundledPolytopes('small')
const five = bundledPolytopes('h11-5')
const large = bundledPolytopes('large')
const every = <T>(list: readonly T[], count: number): T[] =>
  Array.from({ length: count }, (_, n) => list[Math.floor((n * list.length) / count)])

const between = (list: readonly BundledPolytope[], low: number, high: number): BundledPolytope[] =>
  list.filter(({ h11 }) => h11 >= low && h11 <= high)
const middleCount = Number(values.middle)
const six = between(large, 6, 12)
const groups: Readonly<Record<string, BundledPolytope[]>> = {
  small: between(small, 1, 3),
  middle: [
    ...every(between(small, 4, 4), Math.floor(middleCount / 3)),
    ...every(five, Math.floor(middleCount / 3)),
    // Several candidates on each of the few bundled ones beyond.
    ...Array.from({ length: middleCount - 2 * Math.floor(middleCount / 3) }, (_, n) => six[n % six.length]),
  ],
  large: every(between(large, 20, 100), Number(values.large)),
  largest: between(large, 491, 491),
}

const print = (line: string): boolean => process.stdout.write(`${line}\n`)

let failures = 0
for (const [group, polytopes] of Object.entries(groups)) {
  if (skipped.has(group)) continue
  let made = 0
  let checked = 0
  let notFavourable = 0
  const slowest = new Map<string, number>()
  for (const [n, { id, vertices, favourable }] of polytopes.entries()) {
    const form = normalForm(polytopeFromPoints(vertices))
    const { polytope } = form
    const heights = quadraticHeights(polytope, { seed: n + 1, noise: 0.45 })
    const outcome = classFromHeights(polytope, heights)
    if (!outcome.fine) throw new Error('quadratic heights are fine')
    if (!favourable) notFavourable++
    const corners = Array.from({ length: polytope.vertexCount }, (_, v) => [
      ...polytope.points.subarray(4 * v, 4 * v + 4),
    ])
    const candidateKey = canonicalClass(form, outcome.class).key
    const start = performance.now()
    const clock = (): number => performance.now()
    const certificate = certify({ vertices: corners, heights, candidateKey, rule }, clock)
    const middle = performance.now()
    const again = recheck(JSON.parse(JSON.stringify(certificate)), clock)
    made += middle - start
    checked += performance.now() - middle
    for (const { id: check, milliseconds } of certificate.checks)
      slowest.set(check, Math.max(milliseconds, slowest.get(check) ?? 0))
    if (certificate.passed && again.passed) continue
    failures++
    const wrong = certificate.checks.filter(({ result }) => result !== 'pass')
    print(`${group} ${id}: ${JSON.stringify({ wrong, problems: again.problems })}`)
  }
  const top = [...slowest].sort((a, b) => b[1] - a[1]).slice(0, 4)
  print(
    `${group}: ${polytopes.length} certified (${notFavourable} not favourable), ${(made / polytopes.length).toFixed(0)} ms each, ` +
      `re-checked in ${(checked / polytopes.length).toFixed(0)} ms; slowest checks ` +
      top.map(([check, ms]) => `${check} ${ms.toFixed(0)} ms`).join(', '),
  )
}
process.exitCode = failures === 0 ? 0 : 1
