import { useCallback, useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { Plus } from 'lucide-react'
import { hodgeQuery, type LibraryFilter } from '../../api/polytopes.ts'
import { HodgeScatter } from '../../components/charts/HodgeScatter.tsx'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Progress } from '../../components/ui/Progress.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { FilterBar } from './FilterBar.tsx'
import { ImportDialog } from './ImportDialog.tsx'
import { useLibraryState } from './useLibraryState.ts'
import { PolytopeTable } from './PolytopeTable.tsx'

export function LibraryPage() {
  const campaign = useCurrentCampaign()
  const { filter, sort, change, clear, filtered } = useLibraryState()
  const barred = useBarred('polytopes.import')
  const barredSearch = useBarred('searches.run')
  const navigate = useNavigate()
  const [importing, setImporting] = useState(false)
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set())

  const full: LibraryFilter = { ...filter, campaign: campaign?.id }
  const everywhere: LibraryFilter = {
    ...full,
    h11Min: undefined,
    h11Max: undefined,
    h21Min: undefined,
    h21Max: undefined,
  }
  const matching = useQuery({ ...hodgeQuery(full), placeholderData: keepPreviousData })
  const spread = useQuery({ ...hodgeQuery(everywhere), placeholderData: keepPreviousData })
  const onSelect = useCallback((key: string, on: boolean) => {
    setSelected((before) => {
      const next = new Set(before)
      if (on) next.add(key)
      else next.delete(key)
      return next
    })
  }, [])

  const searchFrom = () => {
    if (!campaign) return
    const query = new URLSearchParams()
    if (selected.size > 0) query.set('polytopes', [...selected].join(','))
    else for (const [name, value] of Object.entries(filter)) query.set(name, String(value))
    void navigate(`/campaigns/${campaign.id}/searches/new?${query}`)
  }
  const loading = matching.data?.loading

  return (
    <>
      <PageHead
        title="Library"
        actions={
          <>
            <Button unavailable={barredSearch} onClick={searchFrom}>
              {selected.size > 0
                ? `Search in the ${counted(selected.size, 'selected', 'selected')}`
                : 'Search in these'}
            </Button>
            <Button kind="primary" unavailable={barred} onClick={() => setImporting(true)}>
              <Plus size={16} aria-hidden />
              Import polytopes
            </Button>
          </>
        }
      >
        Reflexive polytopes in four dimensions, on the side whose points become divisors.
      </PageHead>
      {loading && (
        <div className="mb-4 max-w-md">
          <p className="mb-1 text-soft">
            The bundled library is still being loaded: {formatNumber(loading.loaded)} of{' '}
            {formatNumber(loading.total)}.
          </p>
          <Progress value={loading.loaded} most={loading.total} label="Bundled polytopes loaded" />
        </div>
      )}
      <div className="grid grid-cols-1 gap-x-8 gap-y-4 border-t pt-4 md:grid-cols-[minmax(0,11fr)_minmax(0,9fr)]">
        <QueryView query={spread} what="the Hodge numbers">
          {({ counts }) => (
            <HodgeScatter
              counts={counts}
              range={filter}
              onRange={(range) => change({ ...noRange, ...range })}
            />
          )}
        </QueryView>
        <FilterBar filter={filter} filtered={filtered} onChange={change} onClear={clear} />
      </div>
      <div className="mt-4 border-t pt-4">
        <QueryView query={matching} what="the library">
          {({ total }) => (
            <>
              <p className="mb-2 flex items-center gap-3" role="status">
                <span>
                  <strong className="font-medium">{formatNumber(total)}</strong>{' '}
                  {total === 1 ? 'polytope' : 'polytopes'}
                  {filtered ? ' match the filter' : ''}
                </span>
                {selected.size > 0 && (
                  <Button kind="quiet" onClick={() => setSelected(new Set())}>
                    Unselect {formatNumber(selected.size)}
                  </Button>
                )}
              </p>
              {total === 0 ? (
                <Empty title={filtered ? 'No polytope matches the filter.' : 'The library is empty.'}>
                  {filtered ? (
                    <Button onClick={clear}>Clear the filter</Button>
                  ) : (
                    'Import polytopes, or wait until the bundled ones are loaded.'
                  )}
                </Empty>
              ) : (
                <PolytopeTable
                  filter={full}
                  sort={sort}
                  total={total}
                  onSort={change}
                  selected={selected}
                  onSelect={onSelect}
                />
              )}
            </>
          )}
        </QueryView>
      </div>
      {campaign && <ImportDialog campaign={campaign} open={importing} onOpenChange={setImporting} />}
    </>
  )
}

const noRange = { h11Min: undefined, h11Max: undefined, h21Min: undefined, h21Max: undefined }
