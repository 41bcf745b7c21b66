import { Link } from 'react-router-dom'
import { type EarlierIssue } from '../../../shared/reissues.ts'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted } from '../../lib/numbers.ts'

/** What changed since the issue before, and links both ways along the chain of issues. */
export function Issues({ campaign, list }: { campaign: string; list: ShortlistDetail }) {
  const { reissueOf, reissues } = list
  if (reissueOf === null && reissues.length === 0) return null
  const link = (id: string, name: string) => (
    <Link to={`/campaigns/${campaign}/shortlists/${id}`} className="text-action underline">
      {name}
    </Link>
  )
  return (
    <section
      aria-label="Issues of this list"
      className="mb-4 flex flex-col gap-1 border-l-2 border-edge pl-3"
    >
      {reissues.map(({ id, name, issue }) => (
        <p key={id}>
          There is a newer issue: {link(id, name)} (issue {issue}).
        </p>
      ))}
      {reissueOf && (
        <>
          <p>
            Issue {list.issue}. Against issue {reissueOf.issue}, {link(reissueOf.id, reissueOf.name)}:{' '}
            {differenceWords(list, reissueOf)}.
          </p>
          {reissueOf.left.length > 0 && <LeftRows campaign={campaign} before={reissueOf} />}
        </>
      )}
    </section>
  )
}

/**
 * How many rows entered, and how many of those that were there before now stand before or behind others that they stood
 * behind or before: rows that only close a gap have not moved.
 */
export function differenceOf(rows: readonly Pick<ShortlistDetail['rows'][number], 'rank' | 'previous'>[]): {
  entered: number
  up: number
  down: number
  stayed: number
} {
  const both = rows.flatMap(({ previous }) => (previous === null ? [] : [previous.rank]))
  const before = new Map([...both].sort((a, b) => a - b).map((rank, place) => [rank, place]))
  const difference = { entered: rows.length - both.length, up: 0, down: 0, stayed: 0 }
  both.forEach((rank, place) => {
    const gained = (before.get(rank) ?? place) - place
    difference[gained > 0 ? 'up' : gained < 0 ? 'down' : 'stayed'] += 1
  })
  return difference
}

function differenceWords(list: ShortlistDetail, before: EarlierIssue): string {
  const { entered, up, down, stayed } = differenceOf(list.rows)
  return `${entered} entered, ${before.left.length} left; of those in both, ${up} moved up, ${down} moved down, ${stayed} kept their place`
}

function LeftRows({ campaign, before }: { campaign: string; before: EarlierIssue }) {
  return (
    <details>
      <summary className="cursor-pointer text-action">
        {counted(before.left.length, 'candidate')} that left
      </summary>
      <div className="max-h-64 overflow-y-auto">
        <Table label={`Candidates of issue ${before.issue} that left`} fit>
          <thead>
            <tr>
              <Th numeric>Rank before</Th>
              <Th>Candidate</Th>
              <Th>Polytope</Th>
              <Th numeric>Score</Th>
            </tr>
          </thead>
          <tbody>
            {before.left.map(({ rank, candidateKey, polytopeName, score }) => (
              <tr key={candidateKey}>
                <Td numeric>{rank}</Td>
                <Td>
                  <Link
                    to={`/candidates/${candidateKey}?campaign=${campaign}&shortlist=${before.id}`}
                    className="font-mono text-xs text-action hover:underline"
                  >
                    {candidateKey.slice(0, 10)}
                  </Link>
                </Td>
                <Td>{polytopeName}</Td>
                <Td numeric>
                  <Num value={score} digits={6} rounded />
                </Td>
              </tr>
            ))}
          </tbody>
        </Table>
      </div>
    </details>
  )
}
