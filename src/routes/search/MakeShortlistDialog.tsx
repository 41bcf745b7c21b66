import { useState, type FormEvent } from 'react'
import { useNavigate } from 'react-router-dom'
import { createShortlistSchema } from '../../../shared/shortlists.ts'
import { type SearchDetail } from '../../../shared/searches.ts'
import { useSearches } from '../../api/searches.ts'
import { useCreateShortlist } from '../../api/shortlists.ts'
import { explain } from '../../api/request.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'

interface MakeShortlistDialogProps {
  campaign: string
  search: SearchDetail
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** Freezes the best distinct candidates of this search, and of others of the same target version, into a list. */
export function MakeShortlistDialog({ campaign, search, open, onOpenChange }: MakeShortlistDialogProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Make a shortlist"
      description={`The best distinct candidates for ${search.targetName}, version ${search.targetVersion}, frozen as they stand now.`}
    >
      <ShortlistForm campaign={campaign} search={search} />
    </Dialog>
  )
}

function ShortlistForm({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const navigate = useNavigate()
  const searches = useSearches(campaign)
  const create = useCreateShortlist(campaign)
  const [name, setName] = useState(`Best of ${search.name}`.slice(0, 80))
  const [size, setSize] = useState('50')
  const [others, setOthers] = useState<ReadonlySet<string>>(new Set())
  const [fault, setFault] = useState<string | null>(null)
  const alike = (searches.data ?? []).filter(
    ({ id, targetId, targetVersion, evaluations }) =>
      id !== search.id &&
      targetId === search.targetId &&
      targetVersion === search.targetVersion &&
      evaluations > 0,
  )
  const submit = (event: FormEvent) => {
    event.preventDefault()
    const parsed = createShortlistSchema.safeParse({
      name,
      searchIds: [search.id, ...others],
      size: /^\d+$/.test(size) ? Number(size) : Number.NaN,
    })
    if (!parsed.success) {
      setFault('Give a name of 1 to 80 characters and a size from 1 to 500.')
      return
    }
    setFault(null)
    create.mutate(parsed.data, {
      onSuccess: (shortlist) => void navigate(`/campaigns/${campaign}/shortlists/${shortlist.id}`),
      onError: (error) => setFault(explain(error)),
    })
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <TextField label="Name" value={name} maxLength={80} onChange={(event) => setName(event.target.value)} />
      <TextField
        label="Candidates, at most"
        inputMode="numeric"
        value={size}
        onChange={(event) => setSize(event.target.value)}
      />
      {alike.length > 0 && (
        <fieldset>
          <legend className="mb-1 text-xs font-medium text-soft">With the finds of</legend>
          {alike.map((other) => (
            <label key={other.id} className="flex items-center gap-2 py-0.5">
              <input
                type="checkbox"
                checked={others.has(other.id)}
                onChange={(event) => {
                  const next = new Set(others)
                  if (event.target.checked) next.add(other.id)
                  else next.delete(other.id)
                  setOthers(next)
                }}
              />
              {other.name}
            </label>
          ))}
        </fieldset>
      )}
      {fault && (
        <p role="alert" className="border-l-2 border-rejected pl-2">
          {fault}
        </p>
      )}
      <Button kind="primary" type="submit" busy={create.isPending} className="self-start">
        Make the shortlist
      </Button>
    </form>
  )
}
