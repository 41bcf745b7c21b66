import { Link } from 'react-router-dom'
import { overlapSizes, type Comparison } from '../../../../shared/comparisons.ts'
import { runLooks } from '../../../components/charts/runLooks.ts'
import { Num } from '../../../components/ui/Num.tsx'
import { Outcome, outcomeFormat } from '../../../components/ui/Outcome.tsx'
import { Empty } from '../../../components/ui/States.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'
import { formatNumber } from '../../../lib/numbers.ts'
import { type CompareView } from './compareAddress.ts'
import { SearchHead } from './SearchHead.tsx'

/** How many of the best each two searches share, and the shared ones with their ranks. */
export function SharedCandidates({
  campaign,
  comparison,
  best,
  onBest,
}: {
  campaign: string
  comparison: Comparison
  best: CompareView['best']
  onBest: (best: CompareView['best']) => void
}) {
  const { shared, sharedTotal } = comparison
  return (
    <div className="grid grid-cols-1 gap-x-8 gap-y-5 lg:grid-cols-[max-content_minmax(0,1fr)]">
      <div>
        <fieldset className="mb-2 flex flex-wrap gap-x-4">
          <legend className="mb-1 text-xs font-medium text-soft">Among the best</legend>
          {overlapSizes.map((size) => (
            <label key={size} className="inline-flex min-h-6 items-center gap-1.5">
              <input type="radio" name="best" checked={size === best} onChange={() => onBest(size)} />
              {size}
            </label>
          ))}
        </fieldset>
        <Matrix comparison={comparison} best={best} />
        <p className="mt-1 text-xs text-soft">In brackets: how many its own list has.</p>
      </div>
      <div className="min-w-0">
        {shared.length === 0 ? (
          <Empty title="No two of these searches keep the same candidate." />
        ) : (
          <>
            <SharedTable campaign={campaign} comparison={comparison} />
            {sharedTotal > shared.length && (
              <p className="mt-1 text-xs text-soft">
                The first {formatNumber(shared.length)} of {formatNumber(sharedTotal)}, by their best rank.
              </p>
            )}
          </>
        )}
      </div>
    </div>
  )
}

function Matrix({
  comparison: { searches, overlaps },
  best,
}: {
  comparison: Comparison
  best: CompareView['best']
}) {
  const matrix = overlaps.find((overlap) => overlap.best === best)?.shared ?? []
  return (
    <Table label={`Candidates shared among the best ${best}`} fit>
      <thead>
        <tr>
          <Th>
            <span className="sr-only">Search</span>
          </Th>
          {searches.map(({ id, name }, place) => (
            <Th key={id} numeric>
              <SearchHead place={place} name={name} />
            </Th>
          ))}
        </tr>
      </thead>
      <tbody>
        {searches.map(({ id, name }, row) => (
          <tr key={id}>
            <th scope="row" className="h-8 border-b px-3 text-left text-xs">
              <SearchHead place={row} name={name} />
            </th>
            {searches.map((other, column) => (
              <Td key={other.id} numeric>
                {row === column ? (
                  <span className="text-soft" title="In its list">
                    ({formatNumber(matrix[row]?.[column] ?? 0)})
                  </span>
                ) : (
                  <Num value={matrix[row]?.[column] ?? 0} />
                )}
              </Td>
            ))}
          </tr>
        ))}
      </tbody>
    </Table>
  )
}

function SharedTable({
  campaign,
  comparison: { searches, shared, sameScoring },
}: {
  campaign: string
  comparison: Comparison
}) {
  const format = outcomeFormat(shared.flatMap(({ outcome }) => (outcome ? [outcome] : [])))
  return (
    <div className="max-h-[480px] overflow-y-auto">
      <Table label="Shared candidates" fit>
        <thead>
          <tr>
            <Th>Candidate</Th>
            <Th numeric>h11, h21</Th>
            {searches.map(({ id, name }, place) => (
              <Th key={id} numeric>
                <span className="sr-only">Rank in {name}</span>
                <span aria-hidden>Rank in {runLooks[place]?.letter}</span>
              </Th>
            ))}
            {sameScoring && <Th numeric>Score</Th>}
          </tr>
        </thead>
        <tbody>
          {shared.map(({ candidateKey, h11, h21, ranks, outcome }) => (
            <tr key={candidateKey} className="hover:bg-action-wash">
              <Td>
                <Link
                  to={`/candidates/${candidateKey}?campaign=${campaign}`}
                  className="font-mono text-xs text-action hover:underline"
                >
                  {candidateKey.slice(0, 8)}
                </Link>
              </Td>
              <Td numeric>
                {h11}, {h21}
              </Td>
              {ranks.map((rank, place) => (
                <Td key={place} numeric>
                  <Num value={rank} />
                </Td>
              ))}
              {sameScoring && (
                <Td numeric>{outcome ? <Outcome outcome={outcome} decimals={format.score} /> : '–'}</Td>
              )}
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  )
}
