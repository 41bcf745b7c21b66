import { useState, type FormEvent } from 'react'
import { pastedLimitBytes, type ImportReport } from '../../../shared/polytopes.ts'
import { useImportWeightLines } from '../../api/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { ImportReportView } from './ImportReportView.tsx'
import { type ImportFormProps } from './ImportPolytopesForm.tsx'
import { isEmptySource, noSource, sourceFault, SourceFields } from './SourceFields.tsx'

/** Polytopes of weight systems, one or a list of them. */
export function ImportWeightsForm({ campaign, onClose }: ImportFormProps) {
  const send = useImportWeightLines(campaign)
  const [source, setSource] = useState(noSource)
  const [side, setSide] = useState<'fan' | 'newton'>('fan')
  const [report, setReport] = useState<ImportReport | null>(null)
  const submit = async (event: FormEvent) => {
    event.preventDefault()
    if (isEmptySource(source) || sourceFault(source, pastedLimitBytes)) return
    const text = source.file ? await source.file.text() : source.text
    send.mutate({ text, side }, { onSuccess: setReport })
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
    <form onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <SourceFields
        label="Weights"
        source={source}
        onChange={setSource}
        accept=".txt,.dat,.csv,text/plain"
        fileLimit={pastedLimitBytes}
        placeholder={'1 1 12 28 42\n1 1 1 6 9   # a name, if you like'}
        hint="A weight system a line: five positive integers; a common factor is divided out. Each line is reported."
      />
      <Select
        label="Side"
        value={side}
        onChange={(event) => setSide(event.target.value as 'fan' | 'newton')}
        options={[
          ['fan', 'fan: the weighted hypersurface itself'],
          ['newton', 'newton: its mirror, the Newton polytope as fan'],
        ]}
      />
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={send.isPending}
        unavailable={isEmptySource(source) && 'Give at least one weight system, or choose a file.'}
      >
        {send.isPending ? 'Importing…' : 'Import'}
      </Button>
    </form>
  )
}
