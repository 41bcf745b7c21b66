import { memo, useEffect, useRef, type HTMLAttributes, type ReactNode } from 'react'
import { useVirtualizer } from '@tanstack/react-virtual'
import { Td, Th } from './Table.tsx'

export interface Column<Row> {
  key: string
  header: ReactNode
  numeric?: boolean
  sorted?: 'ascending' | 'descending'
  className?: string
  /** For cells only, not for the header. */
  cellClass?: string
  cell: (row: Row, index: number) => ReactNode
}

/** Rows of one table on paper. */
const printedRows = 14

interface VirtualTableProps<Row> {
  label: string
  count: number
  /** undefined while the row is still on its way. */
  rowAt: (index: number) => Row | undefined
  columns: readonly Column<Row>[]
  rowKey: (row: Row) => string
  rowProps?: (row: Row, index: number) => HTMLAttributes<HTMLTableRowElement> & { 'data-current'?: boolean }
  /** Told which rows are in view, to fetch them. */
  onVisible?: (first: number, last: number) => void
  /** Row that is kept in view. */
  current?: number
  className?: string
}

const rowHeight = 32
/** The head of the table, and a bar for scrolling sideways. */
const headAndBar = 49

/** A table of any length: only the rows in view are in the document, between two spacers. */
export function VirtualTable<Row>({
  label,
  count,
  rowAt,
  columns,
  rowKey,
  rowProps,
  onVisible,
  current,
  className = 'max-h-[70vh]',
}: VirtualTableProps<Row>) {
  'use no memo'
  const scroller = useRef<HTMLDivElement>(null)
  const virtualizer = useVirtualizer({
    count,
    getScrollElement: () => scroller.current,
    estimateSize: () => rowHeight,
    overscan: 4,
    // Rows that come into view are drawn with the next frame, not inside the event.
    useFlushSync: false,
    scrollPaddingStart: rowHeight,
    initialRect: { width: 800, height: 600 },
  })
  const items = virtualizer.getVirtualItems()
  const first = items[0]?.index ?? 0
  const last = items.at(-1)?.index ?? 0
  useEffect(() => onVisible?.(first, last), [onVisible, first, last])
  useEffect(() => {
    if (current !== undefined && current >= 0 && current < count) virtualizer.scrollToIndex(current)
  }, [virtualizer, current, count])
  const before = items[0]?.start ?? 0
  const printed = Math.min(items.length, printedRows)
  const after = virtualizer.getTotalSize() - (items.at(-1)?.end ?? 0)

  return (
    <>
      <div
        ref={scroller}
        tabIndex={0}
        role="group"
        aria-label={`${label}, scrolls`}
        // Its size is known and its ground opaque: scrolling lays out and paints nothing around it.
        className={`relative overflow-auto bg-paper contain-strict print:h-auto! print:max-h-none! print:overflow-visible print:bg-transparent print:[contain:none] ${className}`}
        style={{ height: virtualizer.getTotalSize() + headAndBar }}
      >
        <table
          aria-label={label}
          aria-rowcount={count + 1}
          className="w-full border-separate border-spacing-0 text-sm"
        >
          <thead className="sticky top-0 z-10 bg-paper">
            <tr aria-rowindex={1}>
              {columns.map((column) => (
                <Th
                  key={column.key}
                  numeric={column.numeric}
                  aria-sort={column.sorted}
                  className={column.className}
                >
                  {column.header}
                </Th>
              ))}
            </tr>
          </thead>
          <tbody>
            {before > 0 && (
              <tr aria-hidden="true" className="print:hidden">
                <td colSpan={columns.length} style={{ height: before }} className="p-0" />
              </tr>
            )}
            {items.map(({ index }, place) => {
              const row = rowAt(index)
              return (
                <tr
                  key={row ? rowKey(row) : `waiting-${index}`}
                  aria-rowindex={index + 2}
                  {...(row && rowProps?.(row, index))}
                  data-beyond-paper={place >= printedRows || undefined}
                >
                  {row ? (
                    <Cells row={row} index={index} columns={columns} />
                  ) : (
                    <Td colSpan={columns.length} className="text-soft">
                      …
                    </Td>
                  )}
                </tr>
              )
            })}
            {after > 0 && (
              <tr aria-hidden="true" className="print:hidden">
                <td colSpan={columns.length} style={{ height: after }} className="p-0" />
              </tr>
            )}
          </tbody>
        </table>
      </div>
      {count > printed && (
        <p className="hidden text-xs text-soft print:block">
          Printed: rows {first + 1} to {first + printed} of {count}.
        </p>
      )}
    </>
  )
}

/** The cells of a row: drawn again when row or columns change, not while one scrolls past them. */
const Cells = memo(function Cells<Row>({
  row,
  index,
  columns,
}: {
  row: Row
  index: number
  columns: readonly Column<Row>[]
}) {
  return columns.map((column) => (
    <Td
      key={column.key}
      numeric={column.numeric}
      className={`${column.className ?? ''} ${column.cellClass ?? ''}`}
    >
      {column.cell(row, index)}
    </Td>
  ))
}) as <Row>(props: { row: Row; index: number; columns: readonly Column<Row>[] }) => ReactNode
