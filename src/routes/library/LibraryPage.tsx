import { useCallback, useState } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { FolderPlus, Plus, SlidersHorizontal } from 'lucide-react'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCollections } from '../../api/collections.ts'
import { hodgeQuery, type LibraryFilter } from '../../api/polytopes.ts'
import { HodgeScatter } from '../../components/charts/HodgeScatter.tsx'
import { FilterFields } from '../../components/filter/FilterFields.tsx'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { columnsText } from '../../lib/libraryAddress.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { CollectDialog } from './CollectDialog.tsx'
import { CollectionsDialog } from './CollectionsDialog.tsx'
import { ColumnChooser } from './ColumnChooser.tsx'
import { FilterChips } from './FilterChips.tsx'
import { FindDialog } from './FindDialog.tsx'
import { ImportDialog } from './ImportDialog.tsx'
import { LibraryProgress } from './LibraryProgress.tsx'
import { PolytopeTable } from './PolytopeTable.tsx'
import { useLibraryState } from './useLibraryState.ts'

type OpenDialog = 'import' | 'collect' | 'collections' | 'find' | null

export function LibraryPage() {
  const campaign = useCurrentCampaign()
  const { filter, sort, columns, change, clear, filtered } = useLibraryState()
  const barred = useBarred('polytopes.import')
  const barredSearch = useBarred('searches.run')
  const barredCollect = useBarred('collections.edit')
  const navigate = useNavigate()
  const [dialog, setDialog] = useState<OpenDialog>(null)
  /** On narrow pages the fields are folded away. */
  const [filterOpen, setFilterOpen] = useState(false)
  const [pasted, setPasted] = useState('')
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set())
  const collections = useCollections(campaign?.id)

  const full: LibraryFilter = { ...filter, campaign: campaign?.id }
  const everywhere: LibraryFilter = { ...full, ...noRange }
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
  const dialogProps = (which: OpenDialog) => ({
    open: dialog === which,
    onOpenChange: (open: boolean) => setDialog(open ? which : null),
  })

  return (
    <>
      <PageHead
        title="Library"
        actions={
          <>
            <ActionButton
              action={{
                ...{ id: 'library.collections', label: 'Collections', section: 'Library' },
                unavailable: !campaign && 'You are not in a campaign yet.',
                run: () => setDialog('collections'),
              }}
            />
            <ActionButton
              action={{
                ...{ id: 'library.find', label: 'Find by points', section: 'Library' },
                run: () => {
                  setPasted('')
                  setDialog('find')
                },
              }}
            />
            <ActionButton
              action={{
                ...{ id: 'library.search', section: 'Library', unavailable: barredSearch, run: searchFrom },
                label:
                  selected.size > 0
                    ? `Search in the ${counted(selected.size, 'selected', 'selected')}`
                    : 'Search in these',
              }}
            />
            <ActionButton
              kind="primary"
              action={{
                ...{ id: 'library.import', label: 'Import polytopes', section: 'Library' },
                ...{ unavailable: barred, run: () => setDialog('import') },
              }}
            >
              <Plus size={16} aria-hidden />
              Import polytopes
            </ActionButton>
          </>
        }
      >
        Reflexive polytopes in four dimensions, on the side whose points become divisors.
        {campaign && (
          <>
            {' '}
            Triangulations from elsewhere are among the{' '}
            <Link to={`/campaigns/${campaign.id}/imported`} className="text-action hover:underline">
              imported candidates
            </Link>
            .
          </>
        )}
      </PageHead>
      {matching.data && <LibraryProgress {...matching.data} />}
      <div className="grid grid-cols-1 gap-x-8 gap-y-4 border-t pt-4 md:grid-cols-[minmax(0,11fr)_minmax(0,9fr)]">
        <QueryView query={spread} what="the Hodge numbers">
          {({ counts }) => (
            <HodgeScatter
              counts={counts}
              range={{
                h11Min: filter.h11Min,
                h11Max: filter.h11Max,
                h21Min: filter.h21Min,
                h21Max: filter.h21Max,
              }}
              onRange={(range) => change({ ...noRange, ...range })}
            />
          )}
        </QueryView>
        <form role="search" aria-label="Filter the library" onSubmit={(event) => event.preventDefault()}>
          <Button
            className="w-full md:hidden"
            aria-expanded={filterOpen}
            aria-controls="library-filter"
            onClick={() => setFilterOpen(!filterOpen)}
          >
            <SlidersHorizontal size={15} aria-hidden />
            {filterOpen ? 'Hide the filter' : 'Filter'}
          </Button>
          <div id="library-filter" className={`mt-3 md:mt-0 md:block ${filterOpen ? '' : 'hidden'}`}>
            <FilterFields
              campaign={campaign?.id}
              filter={filter}
              onChange={change}
              onPoints={(text) => {
                setPasted(text)
                setDialog('find')
              }}
            />
          </div>
        </form>
      </div>
      <div className="mt-4 border-t pt-4">
        <FilterChips
          filter={filter}
          collection={collections.data?.find(({ id }) => id === filter.collection)?.name}
          onChange={change}
          onClear={clear}
        />
        <QueryView query={matching} what="the library">
          {({ total }) => (
            <>
              <div className="my-2 flex flex-wrap items-center gap-x-3 gap-y-1">
                <p role="status" className="basis-full sm:flex-1 sm:basis-auto">
                  <strong className="font-medium">{formatNumber(total)}</strong>{' '}
                  {total === 1 ? 'polytope' : 'polytopes'}
                  {filtered ? (total === 1 ? ' matches the filter' : ' match the filter') : ''}
                </p>
                {selected.size > 0 && (
                  <Button kind="quiet" onClick={() => setSelected(new Set())}>
                    Unselect {formatNumber(selected.size)}
                  </Button>
                )}
                <Button
                  kind="quiet"
                  unavailable={barredCollect || (total === 0 && 'No polytope matches.')}
                  onClick={() => setDialog('collect')}
                >
                  <FolderPlus size={15} aria-hidden />
                  Collect {selected.size > 0 ? formatNumber(selected.size) : 'these'}
                </Button>
                <ColumnChooser
                  columns={columns}
                  onColumns={(next) => change({ columns: next === null ? undefined : columnsText(next) })}
                />
              </div>
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
                  shown={columns}
                  onSort={change}
                  selected={selected}
                  onSelect={onSelect}
                />
              )}
              {campaign && (
                <CollectDialog
                  campaign={campaign.id}
                  selected={selected}
                  filter={filter}
                  total={total}
                  {...dialogProps('collect')}
                />
              )}
            </>
          )}
        </QueryView>
      </div>
      <FindDialog key={pasted} campaign={campaign?.id} pasted={pasted} {...dialogProps('find')} />
      {campaign && (
        <>
          <ImportDialog campaign={campaign} {...dialogProps('import')} />
          <CollectionsDialog campaign={campaign} {...dialogProps('collections')} />
        </>
      )}
    </>
  )
}

const noRange = { h11Min: undefined, h11Max: undefined, h21Min: undefined, h21Max: undefined }
