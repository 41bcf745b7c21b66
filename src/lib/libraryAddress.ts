import { type z } from 'zod'
import { polytopeFilterSchema, polytopeQuerySchema, type PolytopeFilter } from '../../shared/polytopes.ts'

type LibrarySort = Pick<z.infer<typeof polytopeQuerySchema>, 'sort' | 'order'>

export const filterNames = [
  'h11Min',
  'h11Max',
  'h21Min',
  'h21Max',
  'pointsMax',
  'favourable',
  'origin',
  'text',
] as const

/** What the address says of the filter; a part that does not fit its form is left out. */
export function readFilter(search: URLSearchParams): PolytopeFilter {
  const filter: Record<string, unknown> = {}
  for (const name of filterNames) {
    const raw = search.get(name)
    if (raw === null || raw === '') continue
    const parsed = polytopeFilterSchema.shape[name].safeParse(raw)
    if (parsed.success) filter[name] = parsed.data
  }
  return filter as PolytopeFilter
}

export function readSort(search: URLSearchParams): LibrarySort {
  const { shape } = polytopeQuerySchema
  const sort = shape.sort.safeParse(search.get('sort') ?? undefined)
  const order = shape.order.safeParse(search.get('order') ?? undefined)
  return { sort: sort.success ? sort.data : 'h11', order: order.success ? order.data : 'asc' }
}
