import { useState, type FormEvent } from 'react'
import { useNavigate } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type Reissue } from '../../../shared/reissues.ts'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { useReissue } from '../../api/reissues.ts'
import { searchesQuery } from '../../api/searches.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { counted } from '../../lib/numbers.ts'
import { verdictOf } from './shortlistView.ts'

interface ReissueProps {
  campaign: string
  shortlist: ShortlistDetail
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** Makes a newer issue of a list; this one stays as it is. */
export function ReissueDialog({ open, onOpenChange, ...rest }: ReissueProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="New issue"
      description={`Issue ${rest.shortlist.issue + 1} of this list, with what entered, left and moved. This issue stays as it is; verdicts and assignments hold in both.`}
    >
      <ReissueForm {...rest} onMade={() => onOpenChange(false)} />
    </Dialog>
  )
}

function ReissueForm({
  campaign,
  shortlist,
  onMade,
}: Omit<ReissueProps, 'open' | 'onOpenChange'> & { onMade: () => void }) {
  const navigate = useNavigate()
  const ask = useReissue(campaign, shortlist.id)
  const drawable = shortlist.searches.length > 0 && !shortlist.provenance?.from
  const rejected = shortlist.rows.filter((row) => verdictOf(row) === 'rejected')
  const [kind, setKind] = useState<'drawn' | 'rows'>(drawable ? 'drawn' : 'rows')
  const [more, setMore] = useState<readonly string[]>([])
  const base = shortlist.name.replace(/, issue \d+$/, '')
  const [name, setName] = useState(`${base.slice(0, 66)}, issue ${shortlist.issue + 1}`)
  const nothing = kind === 'rows' && rejected.length === 0 && 'No row is rejected.'
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (name.trim() === '' || nothing) return
    const how: Reissue['how'] =
      kind === 'drawn'
        ? { kind, moreSearchIds: [...more] }
        : { kind, without: rejected.map(({ candidateKey }) => candidateKey) }
    ask.mutate(
      { name: name.trim(), how },
      {
        onSuccess: ({ shortlistId, rescoring }) => {
          onMade()
          if (shortlistId !== null) void navigate(`/campaigns/${campaign}/shortlists/${shortlistId}`)
          else toast(`${counted(rescoring?.total ?? 0, 'candidate')} to be scored first.`)
        },
      },
    )
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <fieldset className="flex flex-col gap-2">
        <legend className="mb-1 text-xs font-medium text-soft">What goes into it</legend>
        <label className={`flex items-start gap-2 ${drawable ? '' : 'text-soft'}`}>
          <input
            type="radio"
            name="how"
            className="mt-1"
            disabled={!drawable}
            checked={kind === 'drawn'}
            onChange={() => setKind('drawn')}
          />
          <span>
            Drawn again by the same choices from{' '}
            {shortlist.searches.length === 1 ? 'its search' : 'its searches'} as they are now
            {!drawable && ' (this list was not drawn from searches)'}
          </span>
        </label>
        {kind === 'drawn' && (
          <MoreSearches campaign={campaign} shortlist={shortlist} more={more} onMore={setMore} />
        )}
        <label className="flex items-start gap-2">
          <input
            type="radio"
            name="how"
            className="mt-1"
            checked={kind === 'rows'}
            onChange={() => setKind('rows')}
          />
          These rows without the {rejected.length} rejected
        </label>
      </fieldset>
      <TextField
        label="Name of the new issue"
        value={name}
        maxLength={80}
        error={name.trim() === '' ? 'Give a name.' : null}
        onChange={(event) => setName(event.target.value)}
      />
      {ask.isError && <Failure title="It was not made." error={ask.error} />}
      <Button kind="primary" type="submit" busy={ask.isPending} unavailable={nothing} className="self-start">
        Make issue {shortlist.issue + 1}
      </Button>
    </form>
  )
}

/** Other searches of the campaign whose finds may come in. */
function MoreSearches({
  campaign,
  shortlist,
  more,
  onMore,
}: {
  campaign: string
  shortlist: ShortlistDetail
  more: readonly string[]
  onMore: (more: string[]) => void
}) {
  const searches = useQuery(searchesQuery(campaign))
  const own = new Set(shortlist.searches.map(({ id }) => id))
  const others = searches.data?.filter(({ id, best }) => !own.has(id) && best !== null) ?? []
  if (others.length === 0) return null
  return (
    <details className="ml-6">
      <summary className="cursor-pointer text-action">
        {more.length === 0
          ? 'and from other searches…'
          : `and from ${counted(more.length, 'other search', 'other searches')}`}
      </summary>
      <ul className="mt-1 max-h-40 overflow-y-auto">
        {others.map(({ id, name }) => (
          <li key={id}>
            <label className="flex min-h-7 items-center gap-2">
              <input
                type="checkbox"
                checked={more.includes(id)}
                onChange={(event) =>
                  onMore(event.target.checked ? [...more, id] : more.filter((other) => other !== id))
                }
              />
              {name}
            </label>
          </li>
        ))}
      </ul>
    </details>
  )
}
