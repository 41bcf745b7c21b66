import { Link } from 'react-router-dom'
import { X } from 'lucide-react'
import { fewestCompared, mostCompared, type ComparedSearch } from '../../../../shared/comparisons.ts'
import { useSearches } from '../../../api/searches.ts'
import { IconButton } from '../../../components/ui/Button.tsx'
import { Select } from '../../../components/ui/Field.tsx'
import { SearchStateMark } from '../../../components/ui/SearchStateMark.tsx'
import { formatNumber } from '../../../lib/numbers.ts'
import { SearchHead } from './SearchHead.tsx'

/** Which searches are compared, under which letters; others can be taken in or out. */
export function ComparedList({
  campaign,
  searches,
  onIds,
}: {
  campaign: string
  searches: readonly ComparedSearch[]
  onIds: (ids: string[]) => void
}) {
  const list = useSearches(campaign)
  const ids = searches.map(({ id }) => id)
  const others = (list.data ?? []).filter(({ id }) => !ids.includes(id))
  return (
    <div className="mb-4 flex flex-wrap items-end gap-x-6 gap-y-2">
      <ol className="min-w-0 flex-1 basis-80">
        {searches.map(({ id, name, state, evaluations, targetName, targetVersion }, place) => (
          <li key={id} className="flex min-h-8 flex-wrap items-center gap-x-3 border-b last:border-b-0">
            <SearchHead place={place} />
            <Link
              to={`/campaigns/${campaign}/searches/${id}`}
              className="min-w-0 font-medium break-words text-action hover:underline"
            >
              {name}
            </Link>
            <SearchStateMark state={state} />
            <span className="text-soft">
              {targetName} v{targetVersion}, {formatNumber(evaluations)} evaluations
            </span>
            {searches.length > fewestCompared && (
              <span className="ml-auto">
                <IconButton
                  label={`Take “${name}” out`}
                  onClick={() => onIds(ids.filter((other) => other !== id))}
                >
                  <X size={14} aria-hidden />
                </IconButton>
              </span>
            )}
          </li>
        ))}
      </ol>
      {searches.length < mostCompared && others.length > 0 && (
        <Select
          label="Add a search"
          className="w-64 max-w-full"
          value=""
          onChange={(event) => onIds([...ids, event.target.value])}
          options={[
            ['', 'Choose…'],
            ...others.map(({ id, name, targetName, targetVersion }): [string, string] => [
              id,
              `${name} (${targetName} v${targetVersion})`,
            ]),
          ]}
        />
      )}
    </div>
  )
}
