import { useState, type FormEvent } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { useShortlistImported } from '../../api/importedCandidates.ts'
import { targetQuery, useTargets } from '../../api/targets.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { Empty, Failure, QueryView } from '../../components/ui/States.tsx'
import { counted } from '../../lib/numbers.ts'

interface ShortlistDialogProps {
  campaign: string
  open: boolean
  onOpenChange: (open: boolean) => void
  /** Empty: all that were imported. */
  selected: readonly string[]
  total: number
}

/** Scores imported candidates by a target and freezes the ranking into a shortlist. */
export function ShortlistDialog({ campaign, open, onOpenChange, selected, total }: ShortlistDialogProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Make a shortlist"
      description={`${selected.length > 0 ? counted(selected.length, 'selected candidate') : `All ${counted(total, 'imported candidate')}`}, scored by a target and frozen as they stand now; the best 500 at most.`}
    >
      <TargetForm campaign={campaign} selected={selected} />
    </Dialog>
  )
}

function TargetForm({ campaign, selected }: Pick<ShortlistDialogProps, 'campaign' | 'selected'>) {
  const targets = useTargets(campaign)
  return (
    <QueryView query={targets} what="the targets">
      {(list) =>
        list.length === 0 ? (
          <Empty title="This campaign has no target yet.">
            <Link className="text-action underline" to={`/campaigns/${campaign}/targets/new`}>
              Write one
            </Link>
            : a few lines that say what a good candidate is.
          </Empty>
        ) : (
          <ShortlistForm campaign={campaign} selected={selected} targets={list} />
        )
      }
    </QueryView>
  )
}

function ShortlistForm({
  campaign,
  selected,
  targets,
}: Pick<ShortlistDialogProps, 'campaign' | 'selected'> & {
  targets: readonly { readonly id: string; readonly name: string }[]
}) {
  const navigate = useNavigate()
  const create = useShortlistImported(campaign)
  const [target, setTarget] = useState(targets[0].id)
  const [version, setVersion] = useState('')
  const [name, setName] = useState('Imported candidates')
  const detail = useQuery(targetQuery(campaign, target))
  const versions = detail.data?.versions ?? []
  const chosen = versions.find(({ id }) => id === version) ?? versions[0]
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (!chosen || name.trim() === '') return
    create.mutate(
      {
        name: name.trim(),
        targetVersionId: chosen.id,
        ...(selected.length > 0 && { candidateKeys: [...selected] }),
      },
      { onSuccess: ({ id }) => void navigate(`/campaigns/${campaign}/shortlists/${id}`) },
    )
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <TextField
        label="Name"
        value={name}
        maxLength={80}
        error={name.trim() === '' ? 'Give a name.' : null}
        onChange={(event) => setName(event.target.value)}
      />
      <div className="grid grid-cols-[minmax(0,2fr)_minmax(0,1fr)] gap-4">
        <Select
          label="Target"
          value={target}
          onChange={(event) => setTarget(event.target.value)}
          options={targets.map(({ id, name }) => [id, name] as const)}
        />
        <Select
          label="Version"
          value={chosen?.id ?? ''}
          onChange={(event) => setVersion(event.target.value)}
          options={versions.map(({ id, number }) => [id, String(number)] as const)}
        />
      </div>
      {create.isError && <Failure title="No shortlist was made." error={create.error} />}
      <Button
        kind="primary"
        type="submit"
        busy={create.isPending}
        className="self-start"
        unavailable={!chosen && 'The target is still being loaded.'}
      >
        {create.isPending ? 'Scoring…' : 'Score and make the shortlist'}
      </Button>
    </form>
  )
}
