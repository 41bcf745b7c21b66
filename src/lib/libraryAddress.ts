import { type z } from 'zod'
import {
  filterNames,
  polytopeFilterSchema,
  polytopeQuerySchema,
  type PolytopeFilter,
} from '../../shared/polytopes.ts'
import {
  polytopeNumberNames,
  polytopeNumbers,
  type PolytopeNumberName,
} from '../../shared/polytopeNumbers.ts'

type LibrarySort = Pick<z.infer<typeof polytopeQuerySchema>, 'sort' | 'order'>

/** What the address says of the filter; a part that does not fit its form is left out. */
export function readFilter(search: URLSearchParams): PolytopeFilter {
  return changedFilter(
    {},
    Object.fromEntries(filterNames.map((name) => [name, search.get(name) ?? undefined])),
  )
}

/** A filter with some of its parts written anew; an empty one, or one that does not fit its form, is left out. */
export function changedFilter(
  filter: PolytopeFilter,
  changes: Record<string, string | undefined>,
): PolytopeFilter {
  const next: Record<string, unknown> = { ...filter }
  for (const name of filterNames) {
    if (!(name in changes)) continue
    const raw = changes[name]
    const parsed = raw === undefined || raw === '' ? null : polytopeFilterSchema.shape[name].safeParse(raw)
    if (parsed?.success) next[name] = parsed.data
    else delete next[name]
  }
  return next as PolytopeFilter
}

export function readSort(search: URLSearchParams): LibrarySort {
  const { shape } = polytopeQuerySchema
  const sort = shape.sort.safeParse(search.get('sort') ?? undefined)
  const order = shape.order.safeParse(search.get('order') ?? undefined)
  return { sort: sort.success ? sort.data : 'h11', order: order.success ? order.data : 'asc' }
}

const usualColumns = polytopeNumberNames.filter((name) => polytopeNumbers[name].usual)

/** The columns an address names, in the library's order; the usual ones when it names none. */
export function readColumns(search: URLSearchParams): PolytopeNumberName[] {
  const named = search.get('columns')
  if (named === null) return usualColumns
  const wanted = named.split(',')
  return polytopeNumberNames.filter((name) => wanted.includes(name))
}

/** The columns as an address names them; undefined for the usual ones. */
export function columnsText(columns: readonly PolytopeNumberName[]): string | undefined {
  const usual = columns.length === usualColumns.length && usualColumns.every((name) => columns.includes(name))
  return usual ? undefined : columns.join(',') || 'none'
}
