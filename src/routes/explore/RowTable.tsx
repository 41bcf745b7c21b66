import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { openedCandidatesQuery, type ExploredRow } from '../../api/explorations.ts'
import { ClassThumb } from '../../components/geometry/ClassThumb.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { ReportCell } from '../../components/ui/Outcome.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { columnDecimals } from '../../lib/numbers.ts'
import { type ColumnView } from './columnValues.ts'

interface RowTableProps {
  label: string
  campaign: string
  exploration: string
  columns: readonly ColumnView[]
  rows: readonly ExploredRow[]
  /** More rows may still come: pages and pictures are made when the sample is there. */
  running: boolean
  /** A word before each row, such as what it is the largest of. */
  words?: readonly string[]
  ofSearch: boolean
}

/** Candidates of a sample with their columns, small pictures and links to their dossiers. */
export function RowTable({
  label,
  campaign,
  exploration,
  columns,
  rows,
  running,
  words,
  ofSearch,
}: RowTableProps) {
  const keys = [...new Set(rows.map(({ candidateKey }) => candidateKey))]
  const opened = useQuery({
    ...openedCandidatesQuery(campaign, exploration, keys),
    enabled: !running && keys.length > 0,
  })
  const ready = opened.data === true
  const decimals = columns.map(({ type }, at) => {
    const values = rows.map(({ cells }) => cells[at]).filter((cell) => typeof cell === 'number')
    return type === 'integer' ? null : columnDecimals(values, 5)
  })
  return (
    <Table label={label}>
      <thead>
        <tr>
          {words && <Th>Place</Th>}
          <Th>Candidate</Th>
          <Th>2-faces</Th>
          <Th>Polytope</Th>
          <Th numeric>h11, h21</Th>
          {ofSearch && <Th numeric>Island</Th>}
          {ofSearch && <Th numeric>Score</Th>}
          {columns.map(({ name, unit }) => (
            <Th key={name} numeric className="max-w-64 truncate" title={name}>
              {name}
              {unit && unit !== '1' && <span className="font-normal"> ({unit})</span>}
            </Th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ candidateKey, polytope, cells, island, score }, at) => (
          <tr key={`${at} ${candidateKey}`} className="hover:bg-action-wash">
            {words && <Td className="text-soft">{words[at]}</Td>}
            <Td className="font-mono text-xs">
              {ready ? (
                <Link
                  to={`/candidates/${candidateKey}?campaign=${campaign}`}
                  className="text-action hover:underline"
                >
                  {candidateKey.slice(0, 8)}
                </Link>
              ) : (
                candidateKey.slice(0, 8)
              )}
            </Td>
            <Td>
              {ready ? (
                <ClassThumb candidate={candidateKey} />
              ) : (
                <span className="inline-block h-7 w-48 align-middle" aria-hidden />
              )}
            </Td>
            <Td className="max-w-56 truncate">
              <Link
                to={`/library/${polytope.key}?campaign=${campaign}`}
                className="text-action hover:underline"
              >
                {polytope.name}
              </Link>
            </Td>
            <Td numeric>
              {polytope.h11}, {polytope.h21}
            </Td>
            {ofSearch && <Td numeric>{(island ?? 0) + 1}</Td>}
            {ofSearch && (
              <Td numeric>
                <Num value={score ?? null} digits={6} />
              </Td>
            )}
            {columns.map(({ name }, column) => (
              <Td key={name} numeric>
                <ReportCell cell={cells[column]} decimals={decimals[column]} />
              </Td>
            ))}
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
