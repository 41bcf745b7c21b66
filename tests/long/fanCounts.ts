/**
 * Counts the fine regular star triangulations, and the 2-face classes they give, of all polytopes with h11 = 5, and
 * compares with the published numbers. By hand; about a minute of one core:
 *
 *     node --import tsx tests/long/fanCounts.ts [--part 1/2]
 *
 * With `--part` only every n-th polytope is looked at, for as many runs at a time; their numbers add up. Ends with
 * status 1 when the whole differs from what was published.
 */
import { parseArgs } from 'node:util'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'
import { countFans, type FanCounts } from '../reference/fanCounting.ts'

// Altman, Gray, He, Jejjala, Nelson, arXiv:1411.1418 (from memory, and recounted).
const published: FanCounts = { fans: 57050, classes: 13635, favourableFans: 56714, favourableClasses: 13494 }

const { values } = parseArgs({ options: { part: { type: 'string', default: '1/1' } } })
const [part, parts] = values.part.split('/').map(Number)
const polytopes = bundledPolytopes('h11-5').filter((_, n) => n % parts === part - 1)
const begun = process.cpuUsage()
const counts = countFans(polytopes)
const { user, system } = process.cpuUsage(begun)
process.stdout.write(
  `${polytopes.length} polytopes with h11 = 5: ${counts.fans} fans in ${counts.classes} classes; on favourable ones ` +
    `${counts.favourableFans} in ${counts.favourableClasses}; ${((user + system) / 1e6).toFixed(0)} s of processor time\n`,
)
if (parts === 1) {
  const same = JSON.stringify(counts) === JSON.stringify(published)
  process.stdout.write(same ? 'as published\n' : `published: ${JSON.stringify(published)}\n`)
  if (!same) process.exitCode = 1
}
