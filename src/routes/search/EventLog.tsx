import { searchEventKinds, type SearchEventView } from '../../../shared/searchEvents.ts'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatTime } from '../../lib/numbers.ts'

/** What happened to the search, latest first. */
export function EventLog({ events }: { events: readonly SearchEventView[] }) {
  return (
    <Table label="Log of the search">
      <thead>
        <tr>
          <Th>When</Th>
          <Th>What</Th>
          <Th>By</Th>
          <Th numeric>Evaluations</Th>
        </tr>
      </thead>
      <tbody>
        {[...events].reverse().map(({ kind, at, by, evaluations, note }, index) => (
          <tr key={index}>
            <Td>
              <time dateTime={at}>{formatTime(at)}</time>
            </Td>
            <Td className="whitespace-normal!">
              {searchEventKinds[kind]}
              {note && <span className="block max-w-[50ch] pb-1 text-xs text-soft">{note}</span>}
            </Td>
            <Td>{by ?? <span className="text-soft">the server</span>}</Td>
            <Td numeric>
              <Num value={evaluations} />
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
