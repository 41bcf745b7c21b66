import { Link } from 'react-router-dom'
import { type ShortlistSummary } from '../../../shared/shortlists.ts'
import { useSession } from '../../api/session.ts'
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
  const me = useSession().data?.account?.id
  const mine = list.some(({ waiting }) => waiting.some(({ id }) => id === me))
  return (
    <Table label={label}>
      <thead>
        <tr>
          <Th>Shortlist</Th>
          <Th>Target</Th>
          <Th numeric>Candidates</Th>
          <Th numeric>Undecided</Th>
          {mine && <Th numeric>Yours</Th>}
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
              <span title={oneReaderWords(shortlist)}>
                <Num value={shortlist.undecided} />
              </span>
            </Td>
            {mine && (
              <Td numeric>
                <Yours campaign={campaign} shortlist={shortlist} me={me} />
              </Td>
            )}
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

const oneReaderWords = ({ oneReader }: ShortlistSummary): string | undefined =>
  oneReader > 0 ? `${oneReader} of them verified by one reader` : undefined

/** Undecided candidates that are assigned to the person who looks, with a way to them. */
function Yours({
  campaign,
  shortlist,
  me,
}: {
  campaign: string
  shortlist: ShortlistSummary
  me: string | undefined
}) {
  const open = shortlist.waiting.find(({ id }) => id === me)?.open ?? 0
  if (open === 0) return <span className="text-soft">0</span>
  return (
    <Link
      to={`/campaigns/${campaign}/shortlists/${shortlist.id}?verdict=undecided&reviewer=me`}
      className="font-medium text-action hover:underline"
      aria-label={`${open} assigned to you in ${shortlist.name}`}
    >
      {open}
    </Link>
  )
}
