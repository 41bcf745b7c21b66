import { Link } from 'react-router-dom'
import { type ScoredRow } from '../../../shared/outcomes.ts'
import { HitMark, Outcome, ReportCell, outcomeFormat } from './Outcome.tsx'
import { Table, Td, Th } from './Table.tsx'

/** Scored candidates with their report columns and links to their dossiers. */
export function ScoredTable({
  label,
  rows,
  campaign,
  ranked,
  fronts,
}: {
  label: string
  rows: readonly ScoredRow[]
  campaign: string
  ranked?: boolean
  /** Number of the Pareto front of each row; null in lists that have none. */
  fronts?: readonly (number | null)[]
}) {
  const columns = [
    ...new Set(
      rows.flatMap(({ outcome }) => (outcome.kind === 'feasible' ? Object.keys(outcome.report) : [])),
    ),
  ]
  const hasFronts = fronts?.some((front) => front !== null) ?? false
  const format = outcomeFormat(rows.map(({ outcome }) => outcome))
  return (
    <Table label={label} fit>
      <thead>
        <tr>
          {ranked && <Th numeric>Rank</Th>}
          {hasFronts && <Th numeric>Front</Th>}
          <Th>Candidate</Th>
          <Th numeric>h11, h21</Th>
          <Th numeric>Score</Th>
          <Th>Hit</Th>
          {columns.map((column) => (
            <Th key={column} numeric>
              {column}
            </Th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row, index) => (
          <tr key={`${index} ${row.candidateKey}`} className="hover:bg-action-wash">
            {ranked && <Td numeric>{index + 1}</Td>}
            {hasFronts && <Td numeric>{fronts?.[index]}</Td>}
            <Td>
              <Link
                to={`/candidates/${row.candidateKey}?campaign=${campaign}`}
                className="font-mono text-xs text-action hover:underline"
              >
                {row.candidateKey.slice(0, 8)}
              </Link>
            </Td>
            <Td numeric>
              {row.h11}, {row.h21}
            </Td>
            <Td numeric>
              <Outcome outcome={row.outcome} decimals={format.score} />
            </Td>
            <Td>
              <HitMark outcome={row.outcome} />
            </Td>
            {columns.map((column) => (
              <Td key={column} numeric>
                <ReportCell
                  decimals={format.report.get(column)}
                  cell={row.outcome.kind === 'feasible' ? row.outcome.report[column] : undefined}
                />
              </Td>
            ))}
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
