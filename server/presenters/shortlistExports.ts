import { caution } from '../../shared/caution.ts'
import type { Cell } from '../../shared/outcomes.ts'
import type { ShortlistDetail, ShortlistRow } from '../../shared/shortlists.ts'

/** What every export says about its numbers. */
export const conventions = [
  "Einstein-frame volumes in units 2 pi sqrt(alpha') = 1, factors of g_s dropped, leading order in alpha' and g_s.",
  'Field-space metric G_ij in units of M_pl^2: L = -G_ij (d tau_i d tau_j + d theta_i d theta_j), axions of period 1.',
  'The divisor spectrum is taken over all prime toric divisors and does not depend on a basis.',
  'Quantities are taken on the ray through the reference point, at the place the rule names with "at" (scale 1 without).',
  'h11 is counted on the side whose points become divisors. Candidate and polytope keys are permanent addresses.',
]

const heightsConvention =
  'Vertices are in normal-form coordinates; heights refer to the points of the polytope in normal form, in the order of its page.'

/** Units of the fixed columns; report columns carry the unit of their expression in the rule. */
const units = {
  rank: '1 is the best',
  candidate: 'key',
  polytope: 'key',
  polytopeName: 'text',
  h11: 'count',
  h21: 'count',
  outcome: 'feasible, infeasible or undefined',
  score: 'as the rule defines it',
  hit: 'yes, no or empty',
  verdict: 'verified, verified by override, rejected, undecided or empty',
  reviewer: 'text',
  reason: 'text',
  certificate: 'passed, failed, waiting or none, of this scoring by the independent road',
}

type FixedColumn = keyof typeof units

export function fileName(shortlist: ShortlistDetail, extension: 'csv' | 'json'): string {
  const words = shortlist.name.toLowerCase().replace(/[^a-z0-9]+/g, '-')
  return `shortlist-${words.replace(/^-|-$/g, '') || 'export'}.${extension}`
}

/** What a candidate is made from: enough to import it elsewhere. */
export interface ExportedCandidate {
  readonly candidateKey: string
  readonly polytopeKey: string
  /** In normal-form coordinates. */
  readonly vertices: readonly (readonly number[])[]
  /** On the points of the polytope in normal form, in the order in which its page lists them. */
  readonly heights: readonly number[]
}

/** Re-importable JSON with schema version, units and conventions. */
export function shortlistDocument(
  shortlist: ShortlistDetail,
  candidates: readonly ExportedCandidate[],
  version: string,
): object {
  return {
    schema: 'tessellary.shortlist/1',
    software: { name: 'Tessellary', version, engine: shortlist.engineVersion },
    caution,
    conventions: [...conventions, heightsConvention],
    units,
    shortlist,
    candidates,
  }
}

/** Comma-separated values (RFC 4180), introduced by comment lines that begin with "#". */
export function shortlistTable(shortlist: ShortlistDetail): string {
  const remarks = [
    'Tessellary shortlist, schema tessellary.shortlist-table/1',
    caution,
    ...conventions,
    `Shortlist: ${shortlist.name}; target: ${shortlist.targetName}, version ${shortlist.targetVersion}`,
    `Searches: ${shortlist.searches.map(({ name, seed }) => `${name} (seed ${seed})`).join('; ')}`,
    `Scoring hash: ${shortlist.scoringHash}; engine: ${shortlist.engineVersion}`,
    `Units: ${Object.entries(units)
      .map(([column, unit]) => `${column}: ${unit}`)
      .join('; ')}; report columns: as the rule defines them`,
    'Rule:',
    ...shortlist.rule.split(/\r\n|\r|\n/).map((line) => `  ${line}`),
  ]
  const fixed = Object.keys(units) as FixedColumn[]
  const lines = [
    ...remarks.map((remark) => `# ${oneLine(remark)}`),
    [...fixed, ...shortlist.columns.map((column) => `report: ${column}`)].map(text).join(','),
    ...shortlist.rows.map((row) => {
      const values = fixedValues(row)
      return [
        ...fixed.map((column) => values[column]),
        ...shortlist.columns.map((column) => reportCell(row, column)),
      ].join(',')
    }),
  ]
  return lines.join('\r\n') + '\r\n'
}

function fixedValues({ outcome, verdict, ...row }: ShortlistRow): Record<FixedColumn, string> {
  const hit = outcome.kind === 'feasible' ? outcome.hit : null
  return {
    rank: String(row.rank),
    candidate: row.candidateKey,
    polytope: row.polytopeKey,
    polytopeName: text(row.polytopeName),
    h11: String(row.h11),
    h21: String(row.h21),
    outcome: outcome.kind,
    score: outcome.kind === 'feasible' ? String(outcome.score) : '',
    hit: hit === null ? '' : hit ? 'yes' : 'no',
    verdict: verdict === null ? '' : verdict.override ? 'verified by override' : verdict.value,
    reviewer: text(verdict?.author ?? ''),
    reason: text(verdict?.reason ?? ''),
    certificate: row.certificate.state,
  }
}

function reportCell({ outcome }: ShortlistRow, column: string): string {
  if (outcome.kind !== 'feasible') return ''
  const cell: Cell | undefined = outcome.report[column]
  if (cell === undefined || typeof cell === 'object') return ''
  return typeof cell === 'boolean' ? (cell ? 'yes' : 'no') : String(cell)
}

/** Quotes where needed; a leading sign of a spreadsheet formula is disarmed, since people typed these words. */
function text(value: string): string {
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

const oneLine = (value: string) => value.replace(/[\r\n]+/g, ' ')
