import { useState, type FormEvent } from 'react'
import { type ImportReport } from '../../../shared/polytopes.ts'
import { useImportFile, useImportText } from '../../api/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { ImportReportView } from './ImportReportView.tsx'
import { isEmptySource, noSource, sourceFault, SourceFields } from './SourceFields.tsx'

export interface ImportFormProps {
  campaign: string
  onClose: () => void
}

export function ImportPolytopesForm({ campaign, onClose }: ImportFormProps) {
  const sendText = useImportText(campaign)
  const sendFile = useImportFile(campaign)
  const [source, setSource] = useState(noSource)
  const [name, setName] = useState('')
  const [report, setReport] = useState<ImportReport | null>(null)
  const send = source.file ? sendFile : sendText
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (isEmptySource(source) || sourceFault(source)) return
    if (source.file) sendFile.mutate(source.file, { onSuccess: setReport })
    else sendText.mutate({ text: source.text, name: name.trim() || undefined }, { onSuccess: setReport })
  }
  if (report) {
    return (
      <ImportReportView
        report={report}
        campaign={campaign}
        onMore={() => {
          setReport(null)
          // What was wrong is mended in the text it stands in.
          if (report.problems.length === 0) setSource(noSource)
        }}
        onClose={onClose}
      />
    )
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <SourceFields
        label="Points"
        source={source}
        onChange={setSource}
        accept=".txt,.dat,.csv,.json,text/plain"
        placeholder={' 1  0  0  0\n 0  1  0  0\n 0  0  1  0\n 0  0  0  1\n-1 -1 -1 -1'}
        hint="One polytope per block, blocks parted by an empty line: a line per point with four integers, or a line per coordinate. The origin must be the only interior lattice point. Good blocks are imported, bad ones listed by line."
      />
      {!source.file && (
        <TextField
          label="Name (optional)"
          maxLength={80}
          hint="Several polytopes get the name and a number."
          value={name}
          onChange={(event) => setName(event.target.value)}
        />
      )}
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={send.isPending}
        unavailable={isEmptySource(source) && 'Paste at least one polytope, or choose a file.'}
      >
        {send.isPending ? 'Importing…' : 'Import'}
      </Button>
    </form>
  )
}
