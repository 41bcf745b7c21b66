import { useCallback, useState } from 'react'
import { useParams, useSearchParams } from 'react-router-dom'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { Plus } from 'lucide-react'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { importedCandidatesQuery } from '../../api/importedCandidates.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { useDelayed } from '../../lib/useDelayed.ts'
import { candidatesInAddress, startAddress } from '../searches/new/searchPreset.ts'
import { ImportDialog } from '../library/ImportDialog.tsx'
import { ImportedTable } from './ImportedTable.tsx'
import { ShortlistDialog } from './ShortlistDialog.tsx'

const section = 'Imported candidates'

/** Candidates that members brought from elsewhere, to be looked at, ranked and decided on. */
export function ImportedPage() {
  const { campaignId = '' } = useParams()
  const campaign = useCurrentCampaign()
  const [search, setSearch] = useSearchParams()
  const text = search.get('text') ?? ''
  const barred = useBarred('polytopes.import')
  const barredShortlist = useBarred('shortlists.edit')
  const barredSearch = useBarred('searches.run')
  const [importing, setImporting] = useState(false)
  const [listing, setListing] = useState(false)
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set())
  const settled = useDelayed(text, 250)
  const first = useQuery({
    ...importedCandidatesQuery(campaignId, settled, 0),
    placeholderData: keepPreviousData,
  })
  const onSelect = useCallback((key: string, on: boolean) => {
    setSelected((before) => {
      const next = new Set(before)
      if (on) next.add(key)
      else next.delete(key)
      return next
    })
  }, [])
  const chosenKeys = selected.size > 0 ? [...selected] : undefined
  const nothing = first.data?.total === 0 && settled === ''
  return (
    <>
      <PageHead
        title="Imported candidates"
        actions={
          <>
            <ActionButton
              action={{
                ...{ id: 'imported.shortlist', section, run: () => setListing(true) },
                label:
                  selected.size > 0
                    ? `Make a shortlist of ${formatNumber(selected.size)}`
                    : 'Make a shortlist',
                unavailable: barredShortlist || (nothing && 'Import candidates first.'),
              }}
            />
            <ActionButton
              action={{
                ...{ id: 'imported.search', label: 'Search from these…', section },
                to: startAddress(campaignId, { kind: 'imported', candidateKeys: chosenKeys }),
                unavailable:
                  barredSearch ||
                  (nothing && 'Import candidates first.') ||
                  (selected.size > candidatesInAddress &&
                    `Select at most ${candidatesInAddress}, or none to begin from all.`),
              }}
            />
            <ActionButton
              kind="primary"
              action={{
                ...{ id: 'imported.import', label: 'Import candidates', section },
                ...{ unavailable: barred, run: () => setImporting(true) },
              }}
            >
              <Plus size={16} aria-hidden />
              Import candidates
            </ActionButton>
          </>
        }
      >
        Candidates that members of this campaign brought from elsewhere. Their triangulations were checked; a
        shortlist scores them by a target.
      </PageHead>
      <QueryView query={first} what="the imported candidates">
        {({ total }) =>
          nothing ? (
            <Empty title="No candidate has been imported.">
              Choose “Import candidates”: text, a table or JSON with a polytope and its heights, simplices or
              triangles.
            </Empty>
          ) : (
            <>
              <div className="mb-3 flex flex-wrap items-end gap-x-6 gap-y-2">
                <TextField
                  label="Name, source, polytope or key"
                  className="w-64 max-w-full"
                  maxLength={80}
                  value={text}
                  onChange={({ target }) =>
                    setSearch(
                      (before) => {
                        const next = new URLSearchParams(before)
                        if (target.value === '') next.delete('text')
                        else next.set('text', target.value)
                        return next
                      },
                      { replace: true },
                    )
                  }
                />
                <p role="status" className="flex min-h-8 items-center gap-3">
                  {counted(total, 'candidate')}
                  {settled !== '' && ' match'}
                  {selected.size > 0 && (
                    <Button kind="quiet" onClick={() => setSelected(new Set())}>
                      Unselect {formatNumber(selected.size)}
                    </Button>
                  )}
                </p>
              </div>
              {total === 0 ? (
                <Empty title="No imported candidate matches." />
              ) : (
                <ImportedTable
                  campaign={campaignId}
                  text={settled}
                  total={total}
                  selected={selected}
                  onSelect={onSelect}
                />
              )}
            </>
          )
        }
      </QueryView>
      {campaign && (
        <ImportDialog kind="candidates" campaign={campaign} open={importing} onOpenChange={setImporting} />
      )}
      <ShortlistDialog
        campaign={campaignId}
        open={listing}
        onOpenChange={setListing}
        selected={[...selected]}
        total={first.data?.total ?? 0}
      />
    </>
  )
}
