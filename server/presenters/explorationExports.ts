import { heightsOfCode } from '../../scoring/index.ts'
import { caution } from '../../shared/caution.ts'
import type { Exploration } from '../../shared/explorations.ts'
import type { Cell } from '../../shared/outcomes.ts'
import type { ReadRows } from '../jobs/explorations.ts'
import { nameOf, type OpenedSource } from '../services/explorationSources.ts'
import { conventions } from './shortlistExports.ts'

/** An exploration with all its rows. */
export interface ExplorationTable extends ReadRows {
  readonly view: Exploration
  readonly opened: Pick<OpenedSource, 'names' | 'seed'>
}

const undefinedConvention = 'An empty cell is undefined; its reason stands in the JSON form of the table.'
const heightsConvention =
  'Heights refer to the points of the polytope in normal form, in the order of its page; they give the candidate, and may tie in facets.'

/** Units of the columns that every table has. */
const fixedUnits = {
  candidate: 'key',
  polytope: 'key',
  polytopeName: 'text',
  h11: 'count',
  h21: 'count',
}
const searchUnits = { island: 'number', score: 'as the rule of the search defines it' }

export function tableName({ view }: ExplorationTable, extension: 'csv' | 'json'): string {
  const words = (view.search?.name ?? '').toLowerCase().replace(/[^a-z0-9]+/g, '-')
  const name = words.replace(/^-|-$/g, '')
  return view.search === null
    ? `null-sample.${extension}`
    : `evaluations-${name || 'of-a-search'}.${extension}`
}

/** How the rows came to be, one fact a line. */
function provenance({ view, opened }: ExplorationTable, version: string): Record<string, string | number> {
  const { search, evaluated, size } = view
  return {
    software: `Tessellary ${version}, engine ${view.engineVersion}`,
    sample: view.law,
    ...(search === null
      ? { polytopes: view.polytopes, seed: opened.seed }
      : {
          search: `${search.name} (${search.id})`,
          islands: search.islands
            .map((island, n) => `${n + 1}: ${island.rows} of ${island.evaluations} evaluations`)
            .join('; '),
        }),
    rows: evaluated < size ? `${evaluated} of ${size}; the rest is not computed yet` : evaluated,
    place: `at ${view.at.kind} ${view.at.value}`,
  }
}

/** JSON with schema version, units, conventions and heights: enough to build each candidate again. */
export function explorationDocument(table: ExplorationTable, version: string): object {
  const { view, opened, candidates, cells } = table
  const units = { ...fixedUnits, ...(view.search === null ? {} : searchUnits), heights: 'integers' }
  return {
    schema: 'tessellary.exploration/1',
    caution,
    conventions: [...conventions, heightsConvention],
    provenance: provenance(table, version),
    units,
    columns: view.columns.map((column) => ({ ...column, unit: unitOf(column) })),
    rows: candidates.map((candidate, at) => ({
      candidate: candidate.candidateKey,
      polytope: candidate.polytopeKey,
      ...withPolytopeName(nameOf(opened.names, candidate.polytopeKey)),
      ...(view.search === null ? {} : { island: islandNumber(candidate.island), score: candidate.score }),
      cells: cells[at],
      heights: [...heightsOfCode(candidate.heights)],
    })),
  }
}

/** Comma-separated values (RFC 4180), introduced by comment lines that begin with "#". */
export function explorationTable(table: ExplorationTable, version: string): string {
  const { view, opened, candidates, cells } = table
  const units = { ...fixedUnits, ...(view.search === null ? {} : searchUnits) }
  const remarks = [
    'Tessellary table of observables, schema tessellary.exploration-table/1',
    caution,
    ...conventions,
    undefinedConvention,
    ...Object.entries(provenance(table, version)).map(([name, value]) => `${name}: ${value}`),
    `Units: ${Object.entries(units)
      .map(([column, unit]) => `${column}: ${unit}`)
      .join('; ')}`,
    ...view.columns.map((column) => `Column ${column.name}: ${column.expression}; unit: ${unitOf(column)}`),
  ]
  const lines = [
    ...remarks.map((remark) => `# ${remark.replace(/[\r\n]+/g, ' ')}`),
    [...Object.keys(units), ...view.columns.map(({ name }) => name)].map(text).join(','),
    ...candidates.map((candidate, at) => {
      const { name, h11, h21 } = nameOf(opened.names, candidate.polytopeKey)
      const ofSearch = [islandNumber(candidate.island) ?? '', candidate.score ?? '']
      return [
        ...[candidate.candidateKey, candidate.polytopeKey, text(name), h11, h21],
        ...(view.search === null ? [] : ofSearch),
        ...cells[at].map(cellText),
      ].join(',')
    }),
  ]
  return lines.join('\r\n') + '\r\n'
}

const unitOf = ({ unit }: Exploration['columns'][number]) =>
  unit === null ? 'as the expression defines it' : unit === '1' ? 'pure number' : unit

const withPolytopeName = ({ name, h11, h21 }: ReturnType<typeof nameOf>) => ({ polytopeName: name, h11, h21 })

/** Islands are counted from 1 where people read. */
const islandNumber = (island: number | null) => (island === null ? null : island + 1)

function cellText(cell: Cell): string {
  if (typeof cell === 'object') return ''
  return typeof cell === 'boolean' ? (cell ? 'yes' : 'no') : String(cell)
}

/** Quotes where needed; a leading sign of a spreadsheet formula is disarmed, since people typed these words. */
function text(value: string): string {
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}
