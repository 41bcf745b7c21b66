import { fewestIslands } from '../../../scoring/index.ts'
import { type SearchDetail } from '../../../shared/searches.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { columnDecimals, formatPercent } from '../../lib/numbers.ts'

/** The independent chains of a search. */
export function IslandTable({ search: { progress, state } }: { search: SearchDetail }) {
  const { islands } = progress
  if (islands.length === 0) return <Empty title="No report from an island yet." />
  const decimals = columnDecimals(
    islands.flatMap(({ best }) => (best === null ? [] : [best])),
    6,
  )
  return (
    <>
      <Table label="Islands">
        <thead>
          <tr>
            <Th numeric>Island</Th>
            <Th numeric>Evaluations</Th>
            <Th numeric>Hits</Th>
            <Th numeric>Hit rate</Th>
            <Th numeric>Best score</Th>
            <Th>Exhausted</Th>
          </tr>
        </thead>
        <tbody>
          {islands.map(({ evaluations, given = 0, hits, best, exhausted }, index) => (
            <tr key={index}>
              <Td numeric>{index + 1}</Td>
              <Td numeric>
                <Num value={evaluations} />
              </Td>
              <Td numeric>
                <Num value={hits ?? null} />
              </Td>
              <Td numeric>
                {hits === undefined || evaluations <= given ? (
                  <span className="text-soft">–</span>
                ) : (
                  <span data-raw={hits / (evaluations - given)}>
                    {formatPercent(hits / (evaluations - given))}
                  </span>
                )}
              </Td>
              <Td numeric className="text-found">
                <Num value={best} digits={6} decimals={decimals} />
              </Td>
              <Td>{exhausted ? 'yes' : 'no'}</Td>
            </tr>
          ))}
        </tbody>
      </Table>
      {islands.length < fewestIslands && state !== 'queued' && (
        <p className="prose-line mt-2 text-xs text-soft">
          Evaluations of one island depend on each other; islands do not. The interval of the hit rate comes
          from resampling islands and takes at least {fewestIslands}.
        </p>
      )}
    </>
  )
}
