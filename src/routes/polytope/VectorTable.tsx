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
  columns?: readonly string[]
  cells?: (index: number) => readonly string[]
}) {
  const [all, setAll] = useState(false)
  const shown = all ? rows : rows.slice(0, first)
  return (
    <>
      <Table label={label} className="max-w-[640px] font-mono">
        <thead>
          <tr>
            <Th>{name}</Th>
            <Th numeric>x1</Th>
            <Th numeric>x2</Th>
            <Th numeric>x3</Th>
            <Th numeric>x4</Th>
            {columns.map((column) => (
              <Th key={column} className="font-sans">
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
                <Td key={`c${at}`} className="font-sans">
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
