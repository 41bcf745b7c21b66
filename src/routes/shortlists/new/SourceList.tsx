import { type SearchSummary } from '../../../../shared/searches.ts'
import { Num } from '../../../components/ui/Num.tsx'
import { SearchStateMark } from '../../../components/ui/SearchStateMark.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'

/** Searches a list may hold the finds of. */
const most = 20

/** Which searches a list is drawn from. */
export function SourceList({
  searches,
  chosen,
  onChange,
}: {
  searches: readonly SearchSummary[]
  chosen: readonly string[]
  onChange: (searchIds: string[]) => void
}) {
  return (
    <div className="max-h-72 overflow-y-auto">
      <Table label="Searches to draw from" fit>
        <thead>
          <tr>
            <Th>
              <span className="sr-only">Chosen</span>
            </Th>
            <Th>Search</Th>
            <Th>Target</Th>
            <Th>State</Th>
            <Th numeric>Evaluations</Th>
            <Th numeric>Best score</Th>
          </tr>
        </thead>
        <tbody>
          {searches.map(({ id, name, targetName, targetVersion, state, evaluations, best }) => (
            <tr key={id} className="hover:bg-action-wash">
              <Td>
                <input
                  id={`source-${id}`}
                  type="checkbox"
                  className="align-middle"
                  aria-label={name}
                  checked={chosen.includes(id)}
                  disabled={!chosen.includes(id) && chosen.length >= most}
                  onChange={(event) =>
                    onChange(event.target.checked ? [...chosen, id] : chosen.filter((other) => other !== id))
                  }
                />
              </Td>
              <Td>
                <label htmlFor={`source-${id}`}>{name}</label>
              </Td>
              <Td>
                {targetName} <span className="text-soft">v{targetVersion}</span>
              </Td>
              <Td>
                <SearchStateMark state={state} />
              </Td>
              <Td numeric>
                <Num value={evaluations} />
              </Td>
              <Td numeric className="text-found">
                <Num value={best} />
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
    </div>
  )
}
