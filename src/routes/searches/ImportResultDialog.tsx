import { useState, type FormEvent } from 'react'
import { useNavigate } from 'react-router-dom'
import { useImportResult } from '../../api/searches.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { isEmptySource, noSource, sourceFault, SourceFields } from '../library/SourceFields.tsx'

/** What a headless search printed, as a search of this campaign. */
export function ImportResultDialog({
  campaign,
  open,
  onOpenChange,
}: {
  campaign: string
  open: boolean
  onOpenChange: (open: boolean) => void
}) {
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={onOpenChange}
      title="Import a result"
      description="The lines that “npm run search” printed, at least the first and the last. Every candidate they list is placed and scored again here; a difference refuses the file."
    >
      <ImportForm campaign={campaign} />
    </Dialog>
  )
}

function ImportForm({ campaign }: { campaign: string }) {
  const navigate = useNavigate()
  const send = useImportResult(campaign)
  const [source, setSource] = useState(noSource)
  const [name, setName] = useState('')
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (isEmptySource(source) || sourceFault(source)) return
    const given = { name: name.trim() || undefined }
    send.mutate(source.file ? { ...given, file: source.file } : { ...given, text: source.text }, {
      onSuccess: ({ id }) => void navigate(`/campaigns/${campaign}/searches/${id}`),
    })
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <SourceFields
        label="Result"
        source={source}
        onChange={setSource}
        accept=".jsonl,.ndjson,.json,.txt,.log,application/json,text/plain"
        placeholder={'{"kind":"start", …}\n{"kind":"final", …}'}
        hint="JSON Lines of the kinds start and final; others are passed over. Polytopes that the library does not have are imported for this campaign."
      />
      <TextField
        label="Name (optional)"
        maxLength={80}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      {send.isError && <Failure title="The result was not imported." error={send.error} />}
      {send.isPending && (
        <p role="status" className="text-soft">
          Candidates are being placed and scored again.
        </p>
      )}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={send.isPending}
        unavailable={isEmptySource(source) && 'Paste the lines, or choose a file.'}
      >
        {send.isPending ? 'Checking…' : 'Check and import'}
      </Button>
    </form>
  )
}
