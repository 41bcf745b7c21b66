import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { mostCompared } from '../../../shared/comparisons.ts'
import { type SearchDetail } from '../../../shared/searches.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useSearches } from '../../api/searches.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { compareAddress } from '../searches/compare/compareAddress.ts'

/** Opens a dialog to choose up to three other searches of the campaign, and lays them side by side. */
export function CompareWith({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <ActionButton
        action={{
          ...{ id: 'search.compare', label: 'Compare with…', section: 'Search' },
          run: () => setOpen(true),
        }}
      />
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Compare with"
        description={`Up to ${mostCompared - 1} other searches of this campaign. Scores can be compared among those of one target version.`}
      >
        <Choice campaign={campaign} search={search} />
      </Dialog>
    </>
  )
}

function Choice({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const navigate = useNavigate()
  const searches = useSearches(campaign)
  const [chosen, setChosen] = useState<readonly string[]>([])
  const isFull = chosen.length >= mostCompared - 1
  return (
    <QueryView query={searches} what="the searches">
      {(list) => {
        const others = list
          .filter(({ id }) => id !== search.id)
          .map((other) => ({ ...other, alike: isAlike(other, search) }))
          .sort((a, b) => Number(b.alike) - Number(a.alike))
        if (others.length === 0) return <Empty title="This campaign has no other search." />
        return (
          <form
            className="flex flex-col gap-4"
            onSubmit={(event) => {
              event.preventDefault()
              if (chosen.length > 0) void navigate(compareAddress(campaign, { ids: [search.id, ...chosen] }))
            }}
          >
            <fieldset>
              <legend className="sr-only">Searches to compare with</legend>
              {others.map(({ id, name, targetName, targetVersion, evaluations, alike }) => (
                <label key={id} className="flex min-h-8 items-center gap-2 border-b last:border-b-0">
                  <input
                    type="checkbox"
                    checked={chosen.includes(id)}
                    disabled={isFull && !chosen.includes(id)}
                    onChange={(event) =>
                      setChosen(
                        event.target.checked ? [...chosen, id] : chosen.filter((other) => other !== id),
                      )
                    }
                  />
                  <span className="min-w-0 flex-1 py-1">
                    {name}{' '}
                    <span className="text-soft">
                      {!alike && `${targetName} v${targetVersion}, `}
                      {formatNumber(evaluations)} evaluations
                    </span>
                  </span>
                </label>
              ))}
            </fieldset>
            <Button
              kind="primary"
              type="submit"
              unavailable={chosen.length === 0 && 'Tick at least one search.'}
              className="self-start"
            >
              Compare
            </Button>
          </form>
        )
      }}
    </QueryView>
  )
}

const isAlike = (
  a: Pick<SearchDetail, 'targetId' | 'targetVersion'>,
  b: Pick<SearchDetail, 'targetId' | 'targetVersion'>,
) => a.targetId === b.targetId && a.targetVersion === b.targetVersion
