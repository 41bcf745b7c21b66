import { useState } from 'react'
import { Button } from '../../components/ui/Button.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'

const first = 24

/** Integer vectors, numbered from 0 as everywhere; long lists open on request. */
export function VectorTable({
  label,
  name,
  rows,
  columns = [],
  cells,
}: {
  label: string
  name: string
  rows: readonly (readonly number[])[]
  /** Heads of further columns, and whether they hold numbers. */
  columns?: readonly (readonly [head: string, numeric: boolean])[]
  cells?: (index: number) => readonly string[]
}) {
  const [all, setAll] = useState(false)
  const shown = all ? rows : rows.slice(0, first)
  return (
    <>
      <Table label={label} className={`font-mono ${columns.length > 2 ? 'max-w-[900px]' : 'max-w-[640px]'}`}>
        <thead>
          <tr>
            <Th>{name}</Th>
            <Th numeric>x1</Th>
            <Th numeric>x2</Th>
            <Th numeric>x3</Th>
            <Th numeric>x4</Th>
            {columns.map(([column, numeric]) => (
              <Th key={column} numeric={numeric} className="font-sans">
                {column}
              </Th>
            ))}
          </tr>
        </thead>
        <tbody>
          {shown.map((row, index) => (
            <tr key={index}>
              <Td className="text-soft">{index}</Td>
              {row.map((entry, at) => (
                <Td key={at} numeric>
                  <span data-raw={entry}>{String(entry).replace('-', '−')}</span>
                </Td>
              ))}
              {cells?.(index).map((text, at) => (
                <Td key={`c${at}`} numeric={columns[at]?.[1]} className="font-sans">
                  {text}
                </Td>
              ))}
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > shown.length && (
        <Button className="mt-2" onClick={() => setAll(true)}>
          Show all {rows.length}
        </Button>
      )}
    </>
  )
}
