import { useState, type FormEvent } from 'react'
import { toast } from 'sonner'
import { collectionLimit } from '../../../shared/collections.ts'
import { type PolytopeFilter, type Scope } from '../../../shared/polytopes.ts'
import { useChangeMembers, useCollections, useCreateCollection } from '../../api/collections.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'

interface CollectDialogProps {
  campaign: string
  open: boolean
  onOpenChange: (open: boolean) => void
  selected: ReadonlySet<string>
  filter: PolytopeFilter
  total: number
}

/** Puts selected or all matching polytopes into a collection, or takes them out of one. */
export function CollectDialog(props: CollectDialogProps) {
  return (
    <Dialog
      open={props.open}
      onOpenChange={props.onOpenChange}
      title="Collect polytopes"
      description={`A collection is a named set of polytopes, at most ${formatNumber(collectionLimit)}. It can be filtered by and searched in.`}
    >
      <CollectForm {...props} />
    </Dialog>
  )
}

const newOne = 'new'

function CollectForm({ campaign, onOpenChange, selected, filter, total }: CollectDialogProps) {
  const collections = useCollections(campaign)
  const create = useCreateCollection(campaign)
  const change = useChangeMembers(campaign)
  const own = (collections.data ?? []).filter((one) => one.own)
  const [which, setWhich] = useState<'selected' | 'matching'>(selected.size > 0 ? 'selected' : 'matching')
  const [action, setAction] = useState<'add' | 'remove'>('add')
  const [place, setPlace] = useState(
    own.some(({ id }) => id === filter.collection) ? filter.collection! : newOne,
  )
  const [name, setName] = useState('')
  const [tried, setTried] = useState(false)
  const scope: Scope =
    which === 'selected' ? { kind: 'polytopes', keys: [...selected] } : { kind: 'filter', filter }
  const count = which === 'selected' ? selected.size : total
  const tooMany =
    which === 'matching' && total > collectionLimit
      ? `${formatNumber(total)} match; a collection holds at most ${formatNumber(collectionLimit)}.`
      : null
  const nameless = place === newOne && name.trim() === ''
  const fault = create.error ?? change.error
  const close = (words: string) => {
    toast(words)
    onOpenChange(false)
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (tooMany !== null || nameless || count === 0) return
    if (place === newOne) {
      create.mutate(
        { name: name.trim(), scope },
        { onSuccess: (made) => close(`“${made.name}” holds ${counted(made.polytopes, 'polytope')}.`) },
      )
      return
    }
    change.mutate(
      { id: place, into: action === 'add', scope },
      {
        onSuccess: ({ collection, changed }) =>
          close(
            `${counted(changed, 'polytope')} ${action === 'add' ? 'put into' : 'taken out of'} “${collection.name}”; it holds ${formatNumber(collection.polytopes)} now.`,
          ),
      },
    )
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4" noValidate>
      <Select
        label="Which"
        value={which}
        onChange={(event) => setWhich(event.target.value as typeof which)}
        options={[
          ...(selected.size > 0
            ? ([['selected', `the ${counted(selected.size, 'selected', 'selected')}`]] as const)
            : []),
          ['matching', `all ${formatNumber(total)} that match the filter`],
        ]}
        error={tooMany}
      />
      <Select
        label="Collection"
        value={place}
        onChange={(event) => {
          setPlace(event.target.value)
          if (event.target.value === newOne) setAction('add')
        }}
        options={[
          [newOne, 'a new one'],
          ...own.map(({ id, name: label, polytopes }): [string, string] => [
            id,
            `${label} (${counted(polytopes, 'polytope')})`,
          ]),
        ]}
      />
      {place === newOne ? (
        <TextField
          label="Name of the collection"
          maxLength={80}
          value={name}
          error={tried && nameless ? 'A collection needs a name.' : null}
          onChange={(event) => setName(event.target.value)}
        />
      ) : (
        <Select
          label="What to do"
          value={action}
          onChange={(event) => setAction(event.target.value as typeof action)}
          options={[
            ['add', 'put them in'],
            ['remove', 'take them out'],
          ]}
        />
      )}
      {fault && <Failure title="The collection was not changed." error={fault} />}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={create.isPending || change.isPending}
        unavailable={count === 0 && 'No polytope matches.'}
      >
        {action === 'add' ? 'Put in' : 'Take out'} {counted(count, 'polytope')}
      </Button>
    </form>
  )
}
