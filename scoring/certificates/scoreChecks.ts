import type { CheckList, Verdict } from '../certify/check.ts'
import type { Certified } from '../certify/independentRoad.ts'
import { scoreEntry } from '../evaluation.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { evaluateRule } from '../rules/evaluate.ts'
import { certifiedCandidate } from './certifiedCandidate.ts'
import type { CertificateNumbers } from './schema.ts'

type Score = NonNullable<CertificateNumbers['score']>

/** Largest relative difference of two scores that are not integers. */
const tolerance = 1e-7
/** Rounding that cancellation may leave in a value that is not itself tiny. */
const cancellation = { slack: 1e-12, above: 1e-9 }

/** Evaluates the rule on certified numbers alone and compares score, hit and report with the claims. */
export function checkScore(
  rule: CheckedRule,
  claimed: Score,
  certified: Certified,
  candidateKey: string,
  checks: CheckList,
): void {
  const { polytope, fan, numbers, reference, metric } = certified
  if (!polytope || !fan || !numbers || !reference || !metric) return
  let own: Score | undefined
  checks.run('score', () => {
    const candidate = certifiedCandidate({ polytope, fan, numbers, reference, metric }, candidateKey)
    const entry = plainScore(scoreEntry(evaluateRule(rule, candidate), rule))
    own = entry
    return { ...compareOutcomes(claimed, entry, rule), tolerance }
  })
  if (own === undefined) return
  const score = own
  checks.run('hit', () => {
    const word = ({ hit }: Score): string =>
      hit === null ? 'undefined, or no hit line' : hit ? 'hit' : 'no hit'
    return { passed: claimed.hit === score.hit, fast: word(claimed), independent: word(score) }
  })
  checks.run('report', () => {
    const types = new Map(rule.report.map(({ name, type }) => [name, type]))
    const names = [...new Set([...Object.keys(claimed.report), ...Object.keys(score.report)])]
    const differing = names.find(
      (name) => !sameCell(claimed.report[name], score.report[name], types.get(name)),
    )
    const shown = (cell: Score['report'][string] | undefined): string =>
      cell === undefined ? 'absent' : typeof cell === 'object' ? 'undefined' : String(cell)
    return {
      passed: differing === undefined,
      fast: Object.keys(claimed.report).length,
      independent: Object.keys(score.report).length,
      tolerance,
      note:
        differing === undefined
          ? `${names.length} columns agree.`
          : `${differing}: ${shown(claimed.report[differing])} claimed, ${shown(score.report[differing])} found.`,
    }
  })
}

/** The plain data of a score. */
export function plainScore(entry: ReturnType<typeof scoreEntry>): Score {
  const { infeasible, ...rest } = entry
  return {
    ...rest,
    report: { ...entry.report },
    ...(infeasible && {
      infeasible: { ...infeasible, failed: infeasible.failed.map((part) => ({ ...part })) },
    }),
  }
}

function compareOutcomes(claimed: Score, own: Score, rule: CheckedRule): Verdict {
  const fast = shownOutcome(claimed)
  const independent = shownOutcome(own)
  const a = claimed.infeasible
  const b = own.infeasible
  const passed =
    claimed.value !== undefined && own.value !== undefined
      ? rule.score.type === 'integer'
        ? claimed.value === own.value
        : isNear(claimed.value, own.value)
      : a && b
        ? a.stage === b.stage &&
          isNear(a.shortfall, b.shortfall) &&
          a.failed.map(({ label }) => label).join('\n') === b.failed.map(({ label }) => label).join('\n')
        : claimed.undefined !== undefined && own.undefined !== undefined
  return {
    passed,
    fast,
    independent,
    note: b ? `Requirements fail in the stage ${b.stage}; shown are shortfalls.` : '',
  }
}

const shownOutcome = ({ value, infeasible }: Score): string | number =>
  value ?? infeasible?.shortfall ?? 'undefined'

type Cell = Score['report'][string]

function sameCell(a: Cell | undefined, b: Cell | undefined, type: string | undefined): boolean {
  if (typeof a === 'number' && typeof b === 'number') return type === 'integer' ? a === b : isNear(a, b)
  if (typeof a === 'object' && typeof b === 'object') return true
  return a === b
}

function isNear(a: number, b: number): boolean {
  const size = Math.max(Math.abs(a), Math.abs(b))
  const slack = size > cancellation.above ? cancellation.slack : 0
  return Math.abs(a - b) <= tolerance * size + slack
}
