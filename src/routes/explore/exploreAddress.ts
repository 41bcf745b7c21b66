import {
  explorationColumnLimit,
  explorationSizeLimit,
  placeOnRaySchema,
  type ExplorationRequest,
  type Place,
} from '../../../shared/explorations.ts'
import { filterNames, type Scope } from '../../../shared/polytopes.ts'
import { readFilter } from '../../lib/libraryAddress.ts'

/** An interval of a column's values; an end that is left out is open. */
export interface Range {
  readonly low?: number
  readonly high?: number
}

/** All that the page shows, as its address says it. */
export interface ExploreView {
  /** A search whose sample of evaluations is shown, in place of a null sample. */
  readonly search: string | null
  readonly scope: Scope
  readonly size: number
  readonly seed: number
  readonly at: Place
  /** Texts of the columns; the first three are drawn. */
  readonly columns: readonly string[]
  /** Places of columns on a logarithmic axis. */
  readonly log: readonly number[]
  /** What is selected, by place of the column. */
  readonly ranges: ReadonlyMap<number, Range>
  /** Place of the column by which members are ordered. */
  readonly by: number
}

export const startColumns = ['log10(metric.divisor.top)', 'max(d in divisors : d.cubic)']
const startScope: Scope = { kind: 'filter', filter: { h11Max: 4 } }
const startPlace: Place = { kind: 'scale', value: 1 }

function readScope(address: URLSearchParams): Scope {
  const keys = (address.get('polytopes') ?? '').split(',').filter((key) => /^[0-9a-f]{32}$/.test(key))
  const kind = address.get('scope')
  if (kind === 'polytopes' || (kind === null && keys.length > 0)) return { kind: 'polytopes', keys }
  if (kind === 'collection') return { kind, collection: address.get('collection') ?? '' }
  const filter = readFilter(address)
  if (kind === 'filter' || Object.keys(filter).length > 0) return { kind: 'filter', filter }
  return startScope
}

function writeScope(address: URLSearchParams, scope: Scope): void {
  for (const name of ['scope', 'polytopes', ...filterNames]) address.delete(name)
  address.set('scope', scope.kind)
  if (scope.kind === 'polytopes') address.set('polytopes', scope.keys.join(','))
  else if (scope.kind === 'collection') address.set('collection', scope.collection)
  else for (const [name, value] of Object.entries(scope.filter)) address.set(name, String(value))
}

const whole = (text: string | null, low: number, high: number, otherwise: number): number =>
  text !== null && /^\d+$/.test(text) ? Math.min(high, Math.max(low, Number(text))) : otherwise

function readPlace(text: string | null): Place {
  const [kind, value] = (text ?? '').split(':')
  const parsed = placeOnRaySchema.safeParse({ kind, value: Number(value) })
  return parsed.success ? parsed.data : startPlace
}

/** `0:-5:` is column 0 from -5 on. */
function readRanges(texts: readonly string[]): Map<number, Range> {
  const ranges = new Map<number, Range>()
  for (const text of texts) {
    const [place = '', low = '', high = ''] = text.split(':')
    if (!/^\d$/.test(place)) continue
    const end = (word: string) => (word !== '' && Number.isFinite(Number(word)) ? Number(word) : undefined)
    ranges.set(Number(place), { low: end(low), high: end(high) })
  }
  return ranges
}

/** What an address says; a part that does not fit its form is as at the start. */
export function readExplore(address: URLSearchParams): ExploreView {
  const named = address.getAll('c').slice(0, explorationColumnLimit)
  const columns = named.length > 0 ? named : startColumns
  return {
    search: address.get('search'),
    scope: readScope(address),
    size: whole(address.get('size'), 10, explorationSizeLimit, 500),
    seed: whole(address.get('seed'), 0, 2 ** 31, 1),
    at: readPlace(address.get('at')),
    columns,
    log: (address.get('log') ?? '')
      .split(',')
      .filter((word) => /^\d$/.test(word))
      .map(Number),
    ranges: readRanges(address.getAll('range')),
    by: whole(address.get('by'), 0, columns.length - 1, 0),
  }
}

/** The address with some parts changed; other columns bring their own selection and axes. */
export function changedExplore(address: URLSearchParams, change: Partial<ExploreView>): URLSearchParams {
  const next = new URLSearchParams(address)
  if (change.scope) writeScope(next, change.scope)
  if (change.size !== undefined) next.set('size', String(change.size))
  if (change.seed !== undefined) next.set('seed', String(change.seed))
  if (change.at) next.set('at', `${change.at.kind}:${change.at.value}`)
  if (change.columns) {
    next.delete('c')
    for (const text of change.columns) next.append('c', text)
  }
  if (change.log) next.set('log', change.log.join(','))
  if (change.ranges) {
    next.delete('range')
    for (const [place, { low, high }] of change.ranges)
      if (low !== undefined || high !== undefined) next.append('range', `${place}:${low ?? ''}:${high ?? ''}`)
  }
  if (change.by !== undefined) next.set('by', String(change.by))
  for (const [name, value] of [...next]) if (value === '' && name !== 'polytopes') next.delete(name)
  return next
}

export function requestOf({ search, scope, size, seed, at, columns }: ExploreView): ExplorationRequest {
  return {
    source: search === null ? { kind: 'null', scope, seed, size } : { kind: 'search', search },
    at,
    columns: [...columns],
  }
}
