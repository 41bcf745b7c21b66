import { useCallback, useMemo } from 'react'
import { useSearchParams } from 'react-router-dom'
import { filterNames } from '../../../shared/polytopes.ts'
import { readColumns, readFilter, readSort } from '../../lib/libraryAddress.ts'

/** Filter, order and columns of the library, kept in the address so that a view can be linked to. */
export function useLibraryState() {
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readFilter(search), [search])
  const sort = useMemo(() => readSort(search), [search])
  const columns = useMemo(() => readColumns(search), [search])

  const change = useCallback(
    (changes: Record<string, string | number | undefined>) => {
      setSearch(
        (before) => {
          const next = new URLSearchParams(before)
          for (const [name, value] of Object.entries(changes)) {
            if (value === undefined || value === '') next.delete(name)
            else next.set(name, String(value))
          }
          return next
        },
        { replace: true },
      )
    },
    [setSearch],
  )
  const clear = useCallback(
    () => change(Object.fromEntries(filterNames.map((name) => [name, undefined]))),
    [change],
  )
  return { filter, sort, columns, change, clear, filtered: Object.keys(filter).length > 0 }
}
