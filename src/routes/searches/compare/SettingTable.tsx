import { type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { type ComparedSearch } from '../../../../shared/comparisons.ts'
import { describeScope } from '../../../components/scope/scopeAddress.ts'
import { Num } from '../../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'
import { settingsOf, type Setting } from './settings.ts'
import { RowName, SearchHead } from './SearchHead.tsx'

/** What the searches were asked to do: what differs, or everything. */
export function SettingTable({
  campaign,
  searches,
  all,
  onAll,
}: {
  campaign: string
  searches: readonly ComparedSearch[]
  all: boolean
  onAll: (all: boolean) => void
}) {
  const settings = settingsOf(searches)
  const shown = all ? settings : settings.filter(({ differs }) => differs)
  return (
    <>
      <label className="mb-2 inline-flex min-h-6 items-center gap-2">
        <input type="checkbox" checked={all} onChange={(event) => onAll(event.target.checked)} />
        Also what is the same
      </label>
      {shown.length === 0 ? (
        <p className="text-soft">Nothing differs: by its settings each gives the same result, to the bit.</p>
      ) : (
        <Table label="Settings of the searches">
          <thead>
            <tr>
              <Th>
                <span className="sr-only">Setting</span>
              </Th>
              {searches.map(({ id, name }, place) => (
                <Th key={id}>
                  <SearchHead place={place} name={name} />
                </Th>
              ))}
            </tr>
          </thead>
          <tbody>
            {shown.map((setting) => (
              <tr key={setting.name}>
                <th scope="row" className="h-8 border-b pr-4 text-left align-top font-normal text-soft">
                  <RowName>{setting.name}</RowName>
                </th>
                {(setting.differs ? searches : searches.slice(0, 1)).map((search) => (
                  <Td
                    key={search.id}
                    colSpan={setting.differs ? 1 : searches.length}
                    className="min-w-40 py-1.5 align-top whitespace-normal!"
                  >
                    {valueOf(setting, search, campaign)}
                  </Td>
                ))}
              </tr>
            ))}
          </tbody>
        </Table>
      )}
    </>
  )
}

function valueOf({ name, read }: Setting, search: ComparedSearch, campaign: string): ReactNode {
  if (name === 'Target')
    return (
      <Link to={`/campaigns/${campaign}/targets/${search.targetId}`} className="hover:underline">
        {search.targetName}, version {search.targetVersion}
      </Link>
    )
  if (name === 'Scope') return describeScope(search.scope)
  if (name === 'Rule')
    return <pre className="max-w-[48ch] font-mono text-xs leading-5 whitespace-pre-wrap">{search.rule}</pre>
  const value = read(search)
  return typeof value === 'number' ? <Num value={value} /> : String(value)
}
