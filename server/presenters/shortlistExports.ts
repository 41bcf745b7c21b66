import { caution } from '../../shared/caution.ts'
import type { Cell } from '../../shared/outcomes.ts'
import type { ShortlistDetail, ShortlistRow } from '../../shared/shortlists.ts'
import { verdictWord } from '../../shared/verdicts.ts'

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

const externalConvention =
  'External columns were brought along by people; neither rules nor searches can read them.'

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
  verdict: 'verified, verified by one reader, either by override, rejected, undecided or empty',
  reviewer: 'text',
  reason: 'text',
  certificate: 'passed, failed, waiting or none, of this scoring by the independent road',
  verdictVersion: 'version of the target for which the verdict was given',
  front: 'number of the Pareto front, or empty',
  previousRank: 'in the list that was scored anew, or empty',
  rankChange: 'places gained by the new scoring, or empty',
  previousScore: 'by the rule of the list that was scored anew, or empty',
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
    schema: 'tessellary.shortlist/2',
    software: { name: 'Tessellary', version, engine: shortlist.engineVersion },
    caution,
    conventions: [...conventions, heightsConvention, externalConvention],
    units,
    shortlist,
    candidates,
  }
}

/** Comma-separated values (RFC 4180), introduced by comment lines that begin with "#". */
export function shortlistTable(shortlist: ShortlistDetail): string {
  const remarks = [
    'Tessellary shortlist, schema tessellary.shortlist-table/2',
    caution,
    ...conventions,
    `Shortlist: ${shortlist.name}; target: ${shortlist.targetName}, version ${shortlist.targetVersion}`,
    ...provenanceRemarks(shortlist),
    `Scoring hash: ${shortlist.scoringHash}; engine: ${shortlist.engineVersion}`,
    `Units: ${Object.entries(units)
      .map(([column, unit]) => `${column}: ${unit}`)
      .join('; ')}; report columns: as the rule defines them`,
    ...externalRemarks(shortlist),
    'Rule:',
    ...shortlist.rule.split(/\r\n|\r|\n/).map((line) => `  ${line}`),
  ]
  const fixed = Object.keys(units) as FixedColumn[]
  const lines = [
    ...remarks.map((remark) => `# ${oneLine(remark)}`),
    [
      ...fixed,
      ...shortlist.columns.map((column) => `report: ${column}`),
      ...shortlist.external.map(({ name }) => `external: ${name}`),
    ]
      .map(text)
      .join(','),
    ...shortlist.rows.map((row) => {
      const values = fixedValues(row)
      return [
        ...fixed.map((column) => values[column]),
        ...shortlist.columns.map((column) => reportCell(row, column)),
        ...row.external.map((value) => (typeof value === 'string' ? text(value) : String(value ?? ''))),
      ].join(',')
    }),
  ]
  return lines.join('\r\n') + '\r\n'
}

/** What the list was made from, in words; lists of before name their searches only. */
function provenanceRemarks({ provenance, searches }: ShortlistDetail): string[] {
  if (provenance === null) {
    return [`Searches: ${searches.map(({ name, seed }) => `${name} (seed ${seed})`).join('; ')}`]
  }
  const { assembly, counts, from } = provenance
  const { pareto, perPolytope, apart, perInvariants, feasibleOnly } = assembly
  const limits = [
    `at most ${assembly.size}`,
    ...(feasibleOnly ? ['feasible only'] : []),
    ...(perPolytope === null ? [] : [`at most ${perPolytope} of a polytope`]),
    ...(perInvariants === null ? [] : [`at most ${perInvariants} of equal invariants`]),
    ...(apart === null ? [] : [`at least ${apart} triangles apart on a polytope`]),
  ]
  const order = pareto
    ? `by Pareto fronts of ${pareto.map(({ column, direction }) => `${direction} ${column}`).join(', ')}`
    : 'by score'
  const left = Object.entries(counts.leftOut).filter(([, count]) => count > 0)
  return [
    ...provenance.searches.map(
      (one) =>
        `Search: ${one.name}; ${one.method}, seed ${one.seed}, ${one.evaluations} evaluations over ${one.polytopes} polytopes; target ${one.targetName}, version ${one.targetVersion}; scoring hash ${one.scoringHash}; engine ${one.engineVersion}; ${
          one.null === null
            ? 'no null sample yet'
            : `null sample of ${one.null.evaluated}, seed ${one.null.seed}, ${one.null.law}`
        }`,
    ),
    ...(from
      ? [
          `Scored anew from: ${from.name} (${from.size} candidates; ${from.targetName}, version ${from.targetVersion}; scoring hash ${from.scoringHash})`,
        ]
      : []),
    ...(provenance.takenOut === undefined
      ? []
      : [`Rows of an earlier issue taken out by hand since it was drawn: ${provenance.takenOut}`]),
    `Drawn from ${counts.distinct} distinct candidates of ${counts.finds} finds, ranked ${order}: ${limits.join(', ')}; left out: ${
      left.map(([why, count]) => `${count} ${why}`).join(', ') || 'none'
    }`,
  ]
}

function externalRemarks({ external }: ShortlistDetail): string[] {
  if (external.length === 0) return []
  return [
    externalConvention,
    `External columns: ${external
      .map(({ name, tableName, author, createdAt }) => `${name} from ${tableName} (${author}, ${createdAt})`)
      .join('; ')}`,
  ]
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
    verdict: verdict === null ? '' : verdictWord(verdict),
    reviewer: text(verdict?.readers?.map(({ name }) => name).join(' and ') ?? verdict?.author ?? ''),
    reason: text(verdict?.reason ?? ''),
    certificate: row.certificate.state,
    verdictVersion: verdict === null ? '' : String(verdict.targetVersion),
    front: String(row.front ?? ''),
    previousRank: String(row.previous?.rank ?? ''),
    rankChange: row.previous === null ? '' : String(row.previous.rank - row.rank),
    previousScore: String(row.previous?.score ?? ''),
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
