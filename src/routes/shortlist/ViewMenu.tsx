import { useState, type FormEvent } from 'react'
import { useQuery } from '@tanstack/react-query'
import { Popover } from 'radix-ui'
import { Bookmark, Pencil, RefreshCw, Trash2 } from 'lucide-react'
import { toast } from 'sonner'
import { type ShortlistViewRecord } from '../../../shared/shortlistViews.ts'
import { explain } from '../../api/request.ts'
import { shortlistViewsQuery, useEditView, useRemoveView, useSaveView } from '../../api/shortlistViews.ts'
import { useSession } from '../../api/session.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button, IconButton } from '../../components/ui/Button.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'

interface ViewMenuProps {
  campaign: string
  shortlist: string
  /** Parts of the address that are shown now. */
  shown: string
  onOpen: (address: string) => void
}

/** Views under names: filters, order and columns that the members of the campaign keep. */
export function ViewMenu(props: ViewMenuProps) {
  const [open, setOpen] = useState(false)
  return (
    <Popover.Root open={open} onOpenChange={setOpen}>
      <Popover.Trigger asChild>
        <Button kind="quiet">
          <Bookmark size={15} aria-hidden />
          Views
        </Button>
      </Popover.Trigger>
      <Popover.Portal>
        <Popover.Content
          aria-label="Views of the list"
          align="end"
          sideOffset={4}
          collisionPadding={8}
          className="z-40 max-h-(--radix-popover-content-available-height) w-80 max-w-[calc(100vw-16px)] overflow-y-auto rounded border border-edge bg-sheet px-3 py-2 shadow-lifted"
        >
          <Kept {...props} onDone={() => setOpen(false)} />
          <SaveForm {...props} />
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  )
}

function Kept({ campaign, shortlist, shown, onOpen, onDone }: ViewMenuProps & { onDone: () => void }) {
  const views = useQuery(shortlistViewsQuery(campaign, shortlist))
  const open = (address: string) => {
    onOpen(address)
    onDone()
  }
  if (views.isError) return <Failure title="The views did not come." error={views.error} />
  return (
    <ul aria-label="Kept views" className="mb-2">
      <li>
        <button
          type="button"
          aria-current={shown === '' || undefined}
          className="min-h-8 w-full text-left text-action hover:underline aria-[current]:font-medium"
          onClick={() => open('')}
        >
          All candidates by rank
        </button>
      </li>
      {views.data?.map((view) => (
        <KeptView
          key={view.id}
          campaign={campaign}
          view={view}
          shown={shown}
          onOpen={() => open(view.address)}
        />
      ))}
    </ul>
  )
}

function KeptView({
  campaign,
  view,
  shown,
  onOpen,
}: {
  campaign: string
  view: ShortlistViewRecord
  shown: string
  onOpen: () => void
}) {
  const me = useSession().data?.account?.id
  const role = useCurrentCampaign()?.role
  const edit = useEditView(campaign)
  const remove = useRemoveView(campaign)
  const [renaming, setRenaming] = useState(false)
  const mine = view.authorId === me || role === 'lead'
  const tell = { onError: (error: Error) => void toast.error(`View “${view.name}”: ${explain(error)}`) }
  if (renaming) {
    return (
      <li className="flex items-end gap-1 py-1">
        <RenameForm
          name={view.name}
          onGive={(name) => {
            setRenaming(false)
            if (name !== null) edit.mutate({ id: view.id, name }, tell)
          }}
        />
      </li>
    )
  }
  return (
    <li className="flex min-h-8 items-center">
      <button
        type="button"
        aria-current={shown === view.address || undefined}
        title={`Kept by ${view.author}, ${view.shortlistId === null ? 'for every list of the campaign' : 'for this list'}`}
        className="min-w-0 flex-1 truncate text-left text-action hover:underline aria-[current]:font-medium"
        onClick={onOpen}
      >
        {view.name}
        {view.shortlistId === null && <span className="ml-1 text-xs text-soft">every list</span>}
      </button>
      {mine && (
        <>
          {shown !== view.address && (
            <IconButton
              label={`Let “${view.name}” be what is shown now`}
              onClick={() => edit.mutate({ id: view.id, address: shown }, tell)}
            >
              <RefreshCw size={13} aria-hidden />
            </IconButton>
          )}
          <IconButton label={`Rename “${view.name}”`} onClick={() => setRenaming(true)}>
            <Pencil size={13} aria-hidden />
          </IconButton>
          <IconButton label={`Remove “${view.name}”`} onClick={() => remove.mutate(view.id, tell)}>
            <Trash2 size={13} aria-hidden />
          </IconButton>
        </>
      )}
    </li>
  )
}

function RenameForm({ name, onGive }: { name: string; onGive: (name: string | null) => void }) {
  const [text, setText] = useState(name)
  const submit = (event: FormEvent) => {
    event.preventDefault()
    onGive(text.trim() === '' ? null : text.trim())
  }
  return (
    <form onSubmit={submit} className="flex w-full items-end gap-1">
      <TextField
        label="New name"
        className="min-w-0 flex-1"
        autoFocus
        maxLength={60}
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      <Button type="submit">Rename</Button>
    </form>
  )
}

function SaveForm({ campaign, shortlist, shown }: ViewMenuProps) {
  const barred = useBarred('views.save')
  const save = useSaveView(campaign)
  const [name, setName] = useState('')
  const [scope, setScope] = useState('list')
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (barred || name.trim() === '') return
    const shortlistId = scope === 'list' ? shortlist : null
    save.mutate({ name: name.trim(), address: shown, shortlistId }, { onSuccess: () => setName('') })
  }
  return (
    <form onSubmit={submit} aria-label="Keep what is shown" className="flex flex-col gap-2 border-t pt-2">
      <TextField
        label="Keep what is shown now as"
        maxLength={60}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      <div className="flex items-end gap-2">
        <Select
          label="For"
          className="flex-1"
          value={scope}
          onChange={(event) => setScope(event.target.value)}
          options={[
            ['list', 'this list'],
            ['all', 'every list of the campaign'],
          ]}
        />
        <Button
          type="submit"
          unavailable={barred || (name.trim() === '' && 'Give it a name.')}
          busy={save.isPending}
        >
          Keep
        </Button>
      </div>
      {save.isError && <Failure title="It was not kept." error={save.error} />}
    </form>
  )
}
