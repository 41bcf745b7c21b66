import { Link } from 'react-router-dom'
import { type ShortlistSummary } from '../../../shared/shortlists.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatTime } from '../../lib/numbers.ts'

export function ShortlistTable({
  campaign,
  list,
  label,
}: {
  campaign: string
  list: ShortlistSummary[]
  label: string
}) {
  return (
    <Table label={label}>
      <thead>
        <tr>
          <Th>Shortlist</Th>
          <Th>Target</Th>
          <Th numeric>Candidates</Th>
          <Th numeric>Undecided</Th>
          <Th numeric>Verified</Th>
          <Th numeric>Rejected</Th>
          <Th>Made</Th>
          <Th>By</Th>
        </tr>
      </thead>
      <tbody>
        {list.map((shortlist) => (
          <tr key={shortlist.id} className="hover:bg-action-wash">
            <Td>
              <Link
                to={`/campaigns/${campaign}/shortlists/${shortlist.id}`}
                className="font-medium text-action hover:underline"
              >
                {shortlist.name}
              </Link>
            </Td>
            <Td>
              <Link to={`/campaigns/${campaign}/targets/${shortlist.targetId}`} className="hover:underline">
                {shortlist.targetName}
              </Link>{' '}
              <span className="text-soft">v{shortlist.targetVersion}</span>
            </Td>
            <Td numeric>
              <Num value={shortlist.size} />
            </Td>
            <Td numeric className={shortlist.undecided > 0 ? 'font-medium' : 'text-soft'}>
              <Num value={shortlist.undecided} />
            </Td>
            <Td numeric>
              <Num value={shortlist.verified} />
            </Td>
            <Td numeric>
              <Num value={shortlist.rejected} />
            </Td>
            <Td>{formatTime(shortlist.createdAt)}</Td>
            <Td>{shortlist.author}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
