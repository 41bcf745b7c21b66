import { useEffect, useState, type FormEvent } from 'react'
import { type CandidateReading } from '../../../scoring/index.ts'
import { type CandidateImportReport } from '../../../shared/importedCandidates.ts'
import { useImportCandidates } from '../../api/importedCandidates.ts'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { counted } from '../../lib/numbers.ts'
import { useDelayed } from '../../lib/useDelayed.ts'
import { CandidateFormats } from './CandidateFormats.tsx'
import { CandidateReportView } from './CandidateReportView.tsx'
import { type ImportFormProps } from './ImportPolytopesForm.tsx'
import { OrientationQuestion } from './OrientationQuestion.tsx'
import { isEmptySource, noSource, sourceFault, SourceFields } from './SourceFields.tsx'

const example =
  'candidate my first\nvertices\n 1  0  0  0\n 0  1  0  0\n 0  0  1  0\n 0  0  0  1\n-1 -1 -1 -1\nheights\n0 0 0 0 0'

/** Candidates: polytopes with a triangulation each. */
export function ImportCandidatesForm({ campaign, onClose }: ImportFormProps) {
  const send = useImportCandidates(campaign)
  const [source, setSource] = useState(noSource)
  const [name, setName] = useState('')
  const [called, setCalled] = useState('')
  const [answer, setAnswer] = useState<CandidateImportReport | null>(null)
  const submit = (orientation?: 'rows' | 'columns') => {
    if (isEmptySource(source) || sourceFault(source)) return
    const options = { name: name.trim() || undefined, orientation }
    send.mutate(
      source.file
        ? { ...options, file: source.file }
        : { ...options, text: source.text, source: called.trim() || undefined },
      { onSuccess: setAnswer },
    )
  }
  if (answer && !answer.question) {
    return (
      <CandidateReportView
        report={answer}
        campaign={campaign}
        onMore={() => {
          setAnswer(null)
          // What was wrong is mended in the text it stands in.
          if (answer.problems.length === 0) setSource(noSource)
        }}
        onClose={onClose}
      />
    )
  }
  return (
    <form
      onSubmit={(event: FormEvent) => {
        event.preventDefault()
        submit()
      }}
      className="flex flex-col gap-4"
    >
      <SourceFields
        label="Candidates"
        source={source}
        onChange={(next) => {
          setSource(next)
          setAnswer(null)
        }}
        accept=".txt,.dat,.csv,.json,.jsonl,.ndjson,text/plain,application/json"
        placeholder={example}
        below={<Recognised text={source.text} />}
        hint="A polytope with heights, maximal simplices or triangles of its 2-faces. What is wrong is listed by line; the others are imported."
      />
      <CandidateFormats />
      <div className="grid grid-cols-1 gap-4 sm:grid-cols-2">
        <TextField
          label="Name (optional)"
          maxLength={80}
          hint="For candidates that the text does not name."
          value={name}
          onChange={(event) => setName(event.target.value)}
        />
        {!source.file && (
          <TextField
            label="Source (optional)"
            maxLength={120}
            hint="Where the text is from; kept with each candidate."
            value={called}
            onChange={(event) => setCalled(event.target.value)}
          />
        )}
      </div>
      {answer?.question && (
        <OrientationQuestion question={answer.question} busy={send.isPending} onAnswer={submit} />
      )}
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      {send.isPending && (
        <p role="status" className="text-soft">
          Triangulations are being checked. A long import may be left: the list of imported candidates fills
          as it goes, but this report is then not shown.
        </p>
      )}
      {!answer?.question && (
        <Button
          type="submit"
          kind="primary"
          className="self-start"
          busy={send.isPending}
          unavailable={isEmptySource(source) && 'Paste at least one candidate, or choose a file.'}
        >
          {send.isPending ? 'Importing…' : 'Import'}
        </Button>
      )}
    </form>
  )
}

/** Longer texts are read on the server only. */
const readAtMost = 200_000

/** What the text looks like so far; the geometry is looked at when it is imported. */
function Recognised({ text }: { text: string }) {
  const settled = useDelayed(text, 400)
  const [reading, setReading] = useState<CandidateReading | null>(null)
  useEffect(() => {
    let current = true
    const read = async () => {
      if (settled.trim() === '' || settled.length > readAtMost) return null
      // The engine is a large part of the client, and most who open the dialog have it already.
      const { readCandidates } = await import('../../../scoring/index.ts')
      return readCandidates(settled)
    }
    void read().then((next) => current && setReading(next))
    return () => {
      current = false
    }
  }, [settled])
  const [problem] = reading?.problems ?? []
  return (
    <p role="status" className="min-h-4 text-xs text-soft">
      {reading && (
        <>
          Recognised: {reading.format}, {counted(reading.candidates.length, 'candidate')}
          {reading.ambiguous.length > 0 && ', a matrix that can be read both ways'}
          {reading.problems.length > 0 && `, ${counted(reading.problems.length, 'problem')}`}.{' '}
          {problem && (
            <span className="text-ink">
              Line {problem.line}: {problem.message}
            </span>
          )}
        </>
      )}
    </p>
  )
}
