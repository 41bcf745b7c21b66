import { Link } from 'react-router-dom'
import { type UseQueryResult } from '@tanstack/react-query'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { Section } from '../../components/ui/Layout.tsx'
import { Outcome } from '../../components/ui/Outcome.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatTime } from '../../lib/numbers.ts'

/** Where the candidate comes from: every shortlist of this campaign it stands in, down to seed and engine. */
export function Provenance({
  campaign,
  candidate,
  record,
}: {
  campaign: string
  candidate: string
  record: UseQueryResult<CandidateRecord>
}) {
  return (
    <Section title="Provenance">
      <QueryView query={record} what="the provenance">
        {({ appearances, imported }) => (
          <>
            {imported && (
              <p className="mb-3">
                Imported as “{imported.name}” from {imported.source}, line {imported.line}, by{' '}
                {imported.author} on {formatTime(imported.createdAt)};{' '}
                <Link to={`/campaigns/${campaign}/imported`} className="text-action hover:underline">
                  all imported candidates
                </Link>
                .
              </p>
            )}
            {appearances.length === 0 ? (
              <Empty title="In no shortlist of this campaign." />
            ) : (
              <Table label="Provenance">
                <thead>
                  <tr>
                    <Th>Shortlist</Th>
                    <Th numeric>Rank</Th>
                    <Th numeric>Score</Th>
                    <Th>Target</Th>
                    <Th>Search</Th>
                    <Th numeric>Seed</Th>
                    <Th>Engine</Th>
                    <Th>Scoring hash</Th>
                  </tr>
                </thead>
                <tbody>
                  {appearances.map((row) => (
                    <tr key={row.shortlistId}>
                      <Td>
                        <Link
                          to={`/campaigns/${campaign}/shortlists/${row.shortlistId}?row=${candidate}`}
                          className="text-action hover:underline"
                        >
                          {row.shortlistName}
                        </Link>
                      </Td>
                      <Td numeric>
                        {row.rank} of {row.size}
                      </Td>
                      <Td numeric>
                        <Outcome outcome={row.outcome} />
                      </Td>
                      <Td>
                        <Link
                          to={`/campaigns/${campaign}/targets/${row.targetId}`}
                          className="text-action hover:underline"
                        >
                          {row.targetName}
                        </Link>{' '}
                        v{row.targetVersion}
                      </Td>
                      <Td>
                        {row.search ? (
                          <Link
                            to={`/campaigns/${campaign}/searches/${row.search.id}`}
                            className="text-action hover:underline"
                          >
                            {row.search.name}
                          </Link>
                        ) : (
                          'imported'
                        )}
                      </Td>
                      <Td numeric>{row.search?.seed ?? '–'}</Td>
                      <Td>{row.engineVersion}</Td>
                      <Td className="font-mono text-xs">
                        <span data-raw={row.scoringHash} title={row.scoringHash}>
                          {row.scoringHash.slice(0, 12)}
                        </span>
                      </Td>
                    </tr>
                  ))}
                </tbody>
              </Table>
            )}
          </>
        )}
      </QueryView>
      <p className="mt-3 font-mono text-xs break-all text-soft print:hidden">
        Permanent address: /candidates/{candidate}
      </p>
    </Section>
  )
}
