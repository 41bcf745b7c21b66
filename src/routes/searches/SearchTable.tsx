import { Link } from 'react-router-dom'
import { type SearchSummary } from '../../../shared/searches.ts'
import { SearchStanding } from '../../components/ui/SearchStanding.tsx'
import { SearchStateMark } from '../../components/ui/SearchStateMark.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Progress } from '../../components/ui/Progress.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatTime } from '../../lib/numbers.ts'

export function SearchTable({
  campaign,
  list,
  label,
  selection,
}: {
  campaign: string
  list: SearchSummary[]
  label: string
  /** Lets searches be ticked. */
  selection?: { chosen: readonly string[]; onChange: (chosen: string[]) => void }
}) {
  return (
    <Table label={label}>
      <thead>
        <tr>
          {selection && (
            <Th>
              <span className="sr-only">Chosen</span>
            </Th>
          )}
          <Th>Search</Th>
          <Th>State</Th>
          <Th>Target</Th>
          <Th numeric>Polytopes</Th>
          <Th numeric>Evaluations</Th>
          <Th numeric>Budget</Th>
          <Th className="min-w-28">Progress</Th>
          <Th numeric>Best score</Th>
          <Th>Started</Th>
          <Th>By</Th>
        </tr>
      </thead>
      <tbody>
        {list.map((search) => (
          <tr key={search.id} className="hover:bg-action-wash">
            {selection && (
              <Td>
                <input
                  type="checkbox"
                  className="align-middle"
                  aria-label={`Choose ${search.name}`}
                  checked={selection.chosen.includes(search.id)}
                  onChange={(event) =>
                    selection.onChange(
                      event.target.checked
                        ? [...selection.chosen, search.id]
                        : selection.chosen.filter((id) => id !== search.id),
                    )
                  }
                />
              </Td>
            )}
            <Td>
              <Link
                to={`/campaigns/${campaign}/searches/${search.id}`}
                className="font-medium text-action hover:underline"
              >
                {search.name}
              </Link>
              {search.isImported && <span className="text-soft"> imported result</span>}
            </Td>
            <Td>
              <SearchStateMark state={search.state} />
              <div className="text-xs">
                <SearchStanding standing={search.standing} />
              </div>
            </Td>
            <Td>
              <Link to={`/campaigns/${campaign}/targets/${search.targetId}`} className="hover:underline">
                {search.targetName}
              </Link>{' '}
              <span className="text-soft">v{search.targetVersion}</span>
            </Td>
            <Td numeric>
              <Num value={search.polytopes} />
            </Td>
            <Td numeric>
              <Num value={search.evaluations} />
            </Td>
            <Td numeric>
              <Num value={search.budget} />
            </Td>
            <Td>
              <Progress
                value={search.evaluations}
                most={search.budget}
                label={`Evaluations of ${search.name}`}
              />
            </Td>
            <Td numeric className="text-found">
              <Num value={search.best} />
            </Td>
            <Td>{formatTime(search.createdAt)}</Td>
            <Td>{search.author}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
