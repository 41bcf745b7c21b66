import { useState, type FormEvent } from 'react'
import { toast } from 'sonner'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { useRequestRescoring } from '../../api/rescorings.ts'
import { VersionSelect } from '../../components/target/VersionSelect.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'

interface RescoreProps {
  campaign: string
  shortlist: ShortlistDetail
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** Makes a new list of the same candidates, scored and ranked by another version. */
export function RescoreDialog({ open, onOpenChange, ...rest }: RescoreProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Score anew"
      description="The same candidates by another version of a target, in a list of their own. This list stays as it is; verdicts for the same target are carried over, marked with the version they were given for."
    >
      <RescoreForm {...rest} onAsked={() => onOpenChange(false)} />
    </Dialog>
  )
}

function RescoreForm({
  campaign,
  shortlist,
  onAsked,
}: Pick<RescoreProps, 'campaign' | 'shortlist'> & { onAsked: () => void }) {
  const ask = useRequestRescoring(campaign)
  const [version, setVersion] = useState('')
  const [name, setName] = useState(`${shortlist.name}, scored anew`.slice(0, 80))
  const [tried, setTried] = useState(false)
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (version === '' || name.trim() === '') return
    ask.mutate(
      { name: name.trim(), targetVersionId: version, from: { shortlistId: shortlist.id } },
      {
        onSuccess: ({ total }) => {
          toast(`${total} candidates to be scored.`)
          onAsked()
        },
      },
    )
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <VersionSelect
        campaign={campaign}
        targetId={shortlist.targetId}
        label="Target version"
        first="choose…"
        value={version}
        hint={tried && version === '' ? 'Choose the version to score by.' : undefined}
        onChange={setVersion}
      />
      <TextField
        label="Name of the new list"
        value={name}
        maxLength={80}
        error={name.trim() === '' ? 'Give a name.' : null}
        onChange={(event) => setName(event.target.value)}
      />
      {ask.isError && <Failure title="It was not begun." error={ask.error} />}
      <Button kind="primary" type="submit" busy={ask.isPending} className="self-start">
        Score the {shortlist.size} candidates
      </Button>
    </form>
  )
}
