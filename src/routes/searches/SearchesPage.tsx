import { useState } from 'react'
import { useParams } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { fewestCompared, mostCompared } from '../../../shared/comparisons.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCampaignActions } from '../../actions/useCampaignActions.ts'
import { useSearches } from '../../api/searches.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { assemblyPath } from '../shortlists/new/assemblyAddress.ts'
import { compareAddress } from './compare/compareAddress.ts'
import { ImportResultDialog } from './ImportResultDialog.tsx'
import { SearchTable } from './SearchTable.tsx'

export function SearchesPage() {
  const { campaignId = '' } = useParams()
  const searches = useSearches(campaignId)
  const { newSearch } = useCampaignActions()
  const barred = useBarred('searches.run')
  const barredLists = useBarred('shortlists.edit')
  const [ticked, setTicked] = useState<string[]>([])
  const [importing, setImporting] = useState(false)
  return (
    <>
      <PageHead
        title="Searches"
        actions={
          <>
            <ActionButton
              action={{
                ...{ id: 'search.import', label: 'Import a result', section: 'Searches' },
                ...{ unavailable: barred, run: () => setImporting(true) },
              }}
            />
            <ActionButton kind="primary" action={newSearch}>
              <Plus size={16} aria-hidden />
              {newSearch.label}
            </ActionButton>
          </>
        }
      >
        A search runs a method over a scope of polytopes for one version of a target.
      </PageHead>
      <QueryView query={searches} what="the searches">
        {(list) =>
          list.length === 0 ? (
            <Empty title="No search has been started.">
              Write a target first, look at its preview, then start a search from there or with “New search”.
            </Empty>
          ) : (
            <>
              <div className="mb-2 flex flex-wrap items-center gap-3">
                <CompareButton campaign={campaignId} ids={ticked} />
                <ActionButton
                  action={{
                    ...{
                      id: 'searches.shortlist',
                      section: 'Searches',
                      to: assemblyPath(campaignId, ticked),
                    },
                    label:
                      ticked.length === 0
                        ? 'Make a shortlist of those ticked'
                        : `Make a shortlist of the ${ticked.length} ticked`,
                    unavailable:
                      barredLists ||
                      (ticked.length === 0 && 'Tick searches to make one list of their finds.'),
                  }}
                />
              </div>
              <SearchTable
                campaign={campaignId}
                list={list}
                label="Searches"
                selection={{ chosen: ticked, onChange: setTicked }}
              />
              <Caution className="mt-4" />
            </>
          )
        }
      </QueryView>
      <ImportResultDialog campaign={campaignId} open={importing} onOpenChange={setImporting} />
    </>
  )
}

function CompareButton({ campaign, ids }: { campaign: string; ids: readonly string[] }) {
  const fits = ids.length >= fewestCompared && ids.length <= mostCompared
  return (
    <ActionButton
      action={{
        ...{ id: 'searches.compare', section: 'Searches', to: compareAddress(campaign, { ids: [...ids] }) },
        label: ids.length > 0 ? `Compare (${ids.length})` : 'Compare',
        unavailable: !fits && `Tick ${fewestCompared} to ${mostCompared} searches to lay them side by side.`,
      }}
    />
  )
}
