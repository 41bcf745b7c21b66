import { Link } from 'react-router-dom'
import { type TargetSummary } from '../../../shared/targets.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatTime } from '../../lib/numbers.ts'

/** The line of a rule that says what it is after: its `score`. */
function scoreLine(text: string): string {
  return (
    text
      .split('\n')
      .find((line) => /^\s*score\b/.test(line))
      ?.trim() ?? ''
  )
}

export function TargetTable({ campaign, list }: { campaign: string; list: TargetSummary[] }) {
  return (
    <Table label="Targets">
      <thead>
        <tr>
          <Th>Target</Th>
          <Th>Score, as it stands</Th>
          <Th numeric>Version</Th>
          <Th numeric>Searches of it</Th>
          <Th>Saved</Th>
          <Th>By</Th>
        </tr>
      </thead>
      <tbody>
        {list.map(({ id, name, latest }) => (
          <tr key={id} className="hover:bg-action-wash">
            <Td>
              <Link
                to={`/campaigns/${campaign}/targets/${id}`}
                className="font-medium text-action hover:underline"
              >
                {name}
              </Link>
            </Td>
            <Td className="max-w-96 truncate font-mono text-xs" title={scoreLine(latest.text)}>
              {scoreLine(latest.text)}
            </Td>
            <Td numeric>
              <Num value={latest.number} />
            </Td>
            <Td numeric>
              <Num value={latest.searches} />
            </Td>
            <Td>{formatTime(latest.createdAt)}</Td>
            <Td>{latest.author}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
