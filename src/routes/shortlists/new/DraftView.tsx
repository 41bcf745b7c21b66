import { useState, type FormEvent } from 'react'
import { useNavigate } from 'react-router-dom'
import { type UseQueryResult } from '@tanstack/react-query'
import { type SearchSummary } from '../../../../shared/searches.ts'
import { type ShortlistDraft } from '../../../../shared/shortlists.ts'
import { useActions } from '../../../actions/useActions.ts'
import { useRequestRescoring } from '../../../api/rescorings.ts'
import { useCreateShortlist } from '../../../api/shortlists.ts'
import { useBarred } from '../../../components/shell/currentCampaign.tsx'
import { AssemblyCountsView } from '../../../components/shortlist/AssemblyCountsView.tsx'
import { RescoringProgress } from '../../../components/shortlist/RescoringProgress.tsx'
import { Button } from '../../../components/ui/Button.tsx'
import { TextField } from '../../../components/ui/Field.tsx'
import { ScoredTable } from '../../../components/ui/ScoredTable.tsx'
import { Failure, QueryView } from '../../../components/ui/States.tsx'
import { counted, formatNumber } from '../../../lib/numbers.ts'
import { type AssemblyAddress } from './assemblyAddress.ts'

interface DraftViewProps {
  campaign: string
  assembly: AssemblyAddress
  searches: readonly SearchSummary[]
  draft: UseQueryResult<ShortlistDraft>
}

/** What the choices leave, the first of the list, and the button that freezes it. */
export function DraftView({ draft, ...rest }: DraftViewProps) {
  return (
    <QueryView query={draft} what="what the choices leave">
      {(data) => (
        <div aria-busy={draft.isFetching}>
          {draft.isError && <Failure title="This list cannot be made." error={draft.error} />}
          <div className="grid gap-x-8 gap-y-4 md:grid-cols-[minmax(260px,340px)_minmax(0,1fr)]">
            <div>
              {data.counts ? (
                <AssemblyCountsView
                  counts={data.counts}
                  size={data.size}
                  assembly={rest.assembly.settings}
                  live
                />
              ) : (
                <p>
                  {counted(data.distinct, 'distinct candidate')}; {formatNumber(data.distinct - data.scored)}{' '}
                  of them have no score under this version yet. They are scored first, and the list is made
                  when that is done.
                </p>
              )}
              <MakeForm {...rest} data={data} />
            </div>
            {data.best.length > 0 && (
              <div className="min-w-0">
                <ScoredTable
                  label="The first of the list"
                  rows={data.best}
                  campaign={rest.campaign}
                  ranked
                  fronts={data.best.map(({ front }) => front)}
                />
              </div>
            )}
          </div>
        </div>
      )}
    </QueryView>
  )
}

function MakeForm({
  campaign,
  assembly,
  searches,
  data,
}: Omit<DraftViewProps, 'draft'> & { data: ShortlistDraft }) {
  const navigate = useNavigate()
  const barred = useBarred('shortlists.edit')
  const create = useCreateShortlist(campaign)
  const rescore = useRequestRescoring(campaign)
  const [typed, setTyped] = useState<string | null>(null)
  const suggested =
    searches.length === 1 ? `Best of ${searches[0]!.name}` : `Best of ${searches.length} searches`
  const name = typed ?? suggested.slice(0, 80)
  const scored = data.counts !== null
  const make = () => {
    if (barred || name.trim() === '') return
    const { searchIds, settings, versionId } = assembly
    if (!scored) {
      rescore.mutate({
        name: name.trim(),
        targetVersionId: data.targetVersionId,
        from: { searchIds },
        assembly: settings,
      })
      return
    }
    create.mutate(
      {
        name: name.trim(),
        searchIds,
        ...settings,
        ...(versionId === '' ? {} : { targetVersionId: versionId }),
      },
      { onSuccess: ({ id }) => void navigate(`/campaigns/${campaign}/shortlists/${id}`) },
    )
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    make()
  }
  useActions([
    {
      ...{ id: 'shortlist.make', label: 'Make the shortlist', section: 'New shortlist' },
      ...{ shortcut: 'Mod+Enter', unavailable: barred, run: make },
    },
  ])
  const failure = create.error ?? rescore.error
  const asked = rescore.data?.id
  return (
    <form onSubmit={submit} noValidate className="mt-4 flex max-w-[480px] flex-col gap-3">
      <TextField
        label="Name"
        value={name}
        maxLength={80}
        error={name.trim() === '' ? 'Give a name.' : null}
        onChange={(event) => setTyped(event.target.value)}
      />
      {failure && <Failure title="No shortlist was made." error={failure} />}
      {asked !== undefined && (
        <RescoringProgress
          campaign={campaign}
          fits={({ id }) => id === asked}
          onFinished={(id) => void navigate(`/campaigns/${campaign}/shortlists/${id}`)}
        />
      )}
      <Button
        kind="primary"
        type="submit"
        className="self-start"
        busy={create.isPending || rescore.isPending}
        unavailable={barred || (scored && data.size === 0 && 'The choices leave no candidate.')}
      >
        {scored
          ? `Make the shortlist of ${counted(data.size, 'candidate')}`
          : 'Score them and make the shortlist'}
      </Button>
    </form>
  )
}
