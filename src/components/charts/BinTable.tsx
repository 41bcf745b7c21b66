import { formatNumber } from '../../lib/numbers.ts'
import { Num } from '../ui/Num.tsx'
import { Table, Td, Th } from '../ui/Table.tsx'

/** The numbers behind a histogram: counts between edges, of which there is one more. */
export function BinTable({
  label,
  edges,
  counts,
}: {
  label: string
  edges: readonly number[]
  counts: readonly number[]
}) {
  return (
    <Table label={label}>
      <thead>
        <tr>
          <Th numeric>From</Th>
          <Th numeric>To</Th>
          <Th numeric>Candidates</Th>
        </tr>
      </thead>
      <tbody>
        {counts.map((count, at) => (
          <tr key={at}>
            <Td numeric>
              <Num value={edges[at] ?? null} digits={5} />
            </Td>
            <Td numeric>
              <Num value={edges[at + 1] ?? null} digits={5} />
            </Td>
            <Td numeric>{formatNumber(count)}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
