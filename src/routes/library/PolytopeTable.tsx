import { useCallback, useState } from 'react'
import { Link } from 'react-router-dom'
import { keepPreviousData, useQueries } from '@tanstack/react-query'
import { polytopeNumbers, type PolytopeNumberName } from '../../../shared/polytopeNumbers.ts'
import { type PolytopeRow } from '../../../shared/polytopes.ts'
import {
  libraryPageSize,
  polytopePageQuery,
  type LibraryFilter,
  type LibrarySort,
} from '../../api/polytopes.ts'
import { Failure } from '../../components/ui/States.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { SortButton } from '../../components/ui/Table.tsx'
import { VirtualTable, type Column } from '../../components/ui/VirtualTable.tsx'

interface PolytopeTableProps {
  filter: LibraryFilter
  sort: LibrarySort
  total: number
  shown: readonly PolytopeNumberName[]
  onSort: (sort: LibrarySort) => void
  selected: ReadonlySet<string>
  onSelect: (key: string, on: boolean) => void
}

/** The library as a table of any length: rows are fetched by the hundred as they come into view. */
export function PolytopeTable({
  filter,
  sort,
  total,
  shown,
  onSort,
  selected,
  onSelect,
}: PolytopeTableProps) {
  const [range, setRange] = useState({ first: 0, last: 0 })
  const onVisible = useCallback((first: number, last: number) => setRange({ first, last }), [])
  const firstPage = Math.floor(range.first / libraryPageSize)
  const pageCount = Math.floor(range.last / libraryPageSize) - firstPage + 1
  const pages = useQueries({
    queries: Array.from({ length: pageCount }, (_, offset) => ({
      ...polytopePageQuery(filter, sort, firstPage + offset),
      placeholderData: keepPreviousData,
    })),
  })
  const failed = pages.find((page) => page.isError)
  if (failed) {
    return (
      <Failure title="Could not load these rows." error={failed.error} retry={() => void failed.refetch()} />
    )
  }
  const rowAt = (index: number): PolytopeRow | undefined =>
    pages[Math.floor(index / libraryPageSize) - firstPage]?.data?.rows[index % libraryPageSize]

  const sortable = (by: LibrarySort['sort'], name: string, title?: string) => ({
    header: (
      <SortButton
        active={by === sort.sort}
        title={title}
        order={sort.order}
        onClick={() => onSort({ sort: by, order: by === sort.sort && sort.order === 'asc' ? 'desc' : 'asc' })}
      >
        {name}
      </SortButton>
    ),
    sorted: by === sort.sort ? (`${sort.order}ending` as 'ascending' | 'descending') : undefined,
  })

  const columns: Column<PolytopeRow>[] = [
    {
      key: 'selected',
      header: <span className="sr-only">Selected</span>,
      className: 'w-8',
      cell: (row) => (
        <input
          type="checkbox"
          aria-label={`Select ${row.name}`}
          checked={selected.has(row.key)}
          onChange={(event) => onSelect(row.key, event.target.checked)}
        />
      ),
    },
    {
      key: 'name',
      ...sortable('name', 'Name'),
      cell: (row) => (
        <Link
          className="text-action hover:underline"
          to={`/library/${row.key}${filter.campaign ? `?campaign=${filter.campaign}` : ''}`}
        >
          {row.name}
        </Link>
      ),
    },
    ...shown.map((key): Column<PolytopeRow> => ({
      key,
      numeric: true,
      ...sortable(key, polytopeNumbers[key].label, polytopeNumbers[key].description),
      cell: (row) => <Num value={row[key]} />,
    })),
    { key: 'favourable', header: 'Favourable', cell: (row) => (row.favourable ? 'yes' : 'no') },
    {
      key: 'origin',
      header: 'Origin',
      className: 'text-soft',
      cell: (row) => (
        <>
          {row.origin}
          {row.weights && <span className="font-mono text-xs"> ({row.weights.join(',')})</span>}
        </>
      ),
    },
  ]

  return (
    <VirtualTable
      label="Polytopes"
      count={total}
      rowAt={rowAt}
      rowKey={(row) => row.key}
      columns={columns}
      onVisible={onVisible}
      rowProps={(row) => ({ className: selected.has(row.key) ? 'bg-action-wash' : 'hover:bg-action-wash' })}
    />
  )
}
