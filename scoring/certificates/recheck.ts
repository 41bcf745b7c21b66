import { caution } from '../caution.ts'
import type { Check } from '../certify/check.ts'
import { certifierVersion, independentRoad } from '../certify/independentRoad.ts'
import { InputError } from '../errors.ts'
import { evaluationUnits } from '../evaluation.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { scoringHash } from '../rules/hash.ts'
import { engineVersion } from '../version.ts'
import { notCertified } from './notCertified.ts'
import { checkScore } from './scoreChecks.ts'
import { certificateSchema, type Certificate } from './schema.ts'

/** What re-checking a certificate file found. */
export interface Recheck {
  /** The file is well-formed, says that it passed, and every check passes again on its own numbers. */
  readonly passed: boolean
  readonly problems: readonly CertificateProblem[]
  readonly checks: readonly Check[]
}

/** Something wrong with the file itself. `path` is the JSON path of the place. */
export interface CertificateProblem {
  readonly code: string
  readonly message: string
  readonly path: string
}

/**
 * Re-checks a certificate from the file alone: its form, its rule and hash, and the independent road on its
 * vertices and heights, compared with the numbers in the file. Needs no database and not the run that made it.
 *
 * @param raw parsed JSON
 * @param clock milliseconds from any origin
 */
export function recheck(raw: unknown, clock: () => number = () => 0): Recheck {
  const parsed = certificateSchema.safeParse(raw)
  if (!parsed.success) {
    const problems = parsed.error.issues.map(({ message, path }) => ({
      code: path.length === 1 && path[0] === 'schema' ? 'certificate.other-schema' : 'certificate.malformed',
      message: `${path.length === 0 ? 'The file' : pathText(path)}: ${message}.`,
      path: pathText(path),
    }))
    return { passed: false, problems, checks: [] }
  }
  const certificate = parsed.data
  const problems: CertificateProblem[] = []
  const problem = (code: string, path: string, message: string): void => {
    problems.push({ code: `certificate.${code}`, message, path })
  }
  const rule = checkRule(certificate, problem)
  checkFrame(certificate, rule, problem)
  const { checks, certified } = independentRoad(certificate, clock)
  const { score } = certificate.numbers
  if (rule && score) checkScore(rule, score, certified, certificate.candidateKey, checks)
  const list = checks.list(certificate.rule === null ? 'score' : undefined)
  compareVerdicts(certificate, list, problem)
  return {
    passed: problems.length === 0 && list.every(({ result }) => result === 'pass'),
    problems,
    checks: list,
  }
}

type Report = (code: string, path: string, message: string) => void

function checkFrame(certificate: Certificate, rule: CheckedRule | null, problem: Report): void {
  const expected = [
    ['other-engine', 'engineVersion', engineVersion],
    ['other-certifier', 'certifierVersion', certifierVersion],
    ['text-altered', 'caution', caution],
    ['text-altered', 'units', evaluationUnits],
  ] as const
  for (const [code, field, value] of expected) {
    if (certificate[field] !== value)
      problem(
        code,
        field,
        `${field} is ${JSON.stringify(certificate[field])}, here ${JSON.stringify(value)}.`,
      )
  }
  const stated = certificate.notCertified.map(({ what }) => what)
  const own = notCertified(certificate.numbers.favourable, rule).map(({ what }) => what)
  const hidden = own.find((what) => !stated.includes(what))
  if (hidden !== undefined) problem('reservation-missing', 'notCertified', `It does not list: ${hidden}.`)
}

/** The rule of the file, with its hash; null when there is none or it cannot be used. */
function checkRule(certificate: Certificate, problem: Report): CheckedRule | null {
  const { rule: text, scoringHash: hash } = certificate
  if ((text === null) !== (hash === null) || (text === null) !== (certificate.numbers.score === null)) {
    problem('rule-incomplete', 'rule', 'Rule, scoring hash and score must all be there, or none of them.')
  }
  if (text === null) return null
  try {
    const rule = ruleOfInput(text)
    const own = scoringHash(rule, engineVersion)
    if (own === hash) return rule
    problem('rule-altered', 'rule', `The scoring hash of this rule is ${own}, not ${hash}.`)
  } catch (error) {
    if (!(error instanceof InputError)) throw error
    problem('rule-broken', 'rule', error.message)
  }
  return null
}

/** The verdicts in the file must be those found again. */
function compareVerdicts(certificate: Certificate, checks: readonly Check[], problem: Report): void {
  const stated = new Map(certificate.checks.map((check, n) => [check.id, { check, n }]))
  for (const { id, result } of checks) {
    const found = stated.get(id)
    if (found === undefined) problem('check-missing', 'checks', `The check ${id} is missing.`)
    else if (found.check.result !== result) {
      problem(
        'check-differs',
        `checks[${found.n}].result`,
        `The file says ${found.check.result} for ${id}; found again: ${result}.`,
      )
    }
  }
  const passed = certificate.checks.every(({ result }) => result === 'pass')
  if (certificate.passed !== passed) {
    problem('verdict-altered', 'passed', `passed is ${certificate.passed}, against the file's own checks.`)
  } else if (!passed) problem('failed', 'passed', 'This is the certificate of a failure.')
}

function pathText(parts: readonly PropertyKey[]): string {
  return parts.reduce<string>(
    (path, part) =>
      typeof part === 'number' ? `${path}[${part}]` : path === '' ? String(part) : `${path}.${String(part)}`,
    '',
  )
}
