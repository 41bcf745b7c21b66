import { type SearchProgress } from '../../../shared/searches.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Empty } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'

export function IslandTable({ islands }: { islands: SearchProgress['islands'] }) {
  if (islands.length === 0) return <Empty title="No report from an island yet." />
  return (
    <Table label="Islands">
      <thead>
        <tr>
          <Th numeric>Island</Th>
          <Th numeric>Evaluations</Th>
          <Th numeric>Best score</Th>
          <Th>Exhausted</Th>
        </tr>
      </thead>
      <tbody>
        {islands.map((island, index) => (
          <tr key={index}>
            <Td numeric>{index + 1}</Td>
            <Td numeric>
              <Num value={island.evaluations} />
            </Td>
            <Td numeric className="text-found">
              <Num value={island.best} digits={6} />
            </Td>
            <Td>{island.exhausted ? 'yes' : 'no'}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
