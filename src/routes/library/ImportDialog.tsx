import { useState, type FormEvent } from 'react'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { pastedLimitBytes, uploadLimitBytes, type ImportReport } from '../../../shared/polytopes.ts'
import { useImportFile, useImportText, useImportWeights } from '../../api/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Select, TextArea, TextField } from '../../components/ui/Field.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { Tabs } from '../../components/ui/Tabs.tsx'
import { formatBytes, formatNumber } from '../../lib/numbers.ts'
import { ImportReportView } from './ImportReportView.tsx'

interface ImportDialogProps {
  campaign: CampaignSummary
  open: boolean
  onOpenChange: (open: boolean) => void
}

export function ImportDialog({ campaign, open, onOpenChange }: ImportDialogProps) {
  const [way, setWay] = useState('paste')
  const [report, setReport] = useState<ImportReport | null>(null)
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={(next) => {
        if (!next) setReport(null)
        onOpenChange(next)
      }}
      title="Import polytopes"
      description={`Into “${campaign.name}”; its members alone see them.`}
    >
      {report ? (
        <ImportReportView
          report={report}
          campaign={campaign.id}
          onMore={() => setReport(null)}
          onClose={() => onOpenChange(false)}
        />
      ) : (
        <Tabs
          label="Way of importing"
          value={way}
          onChange={setWay}
          items={[
            {
              value: 'paste',
              label: 'Paste points',
              content: <PasteForm campaign={campaign.id} onReport={setReport} />,
            },
            {
              value: 'file',
              label: 'Upload a file',
              content: <FileForm campaign={campaign.id} onReport={setReport} />,
            },
            {
              value: 'weights',
              label: 'From weights',
              content: <WeightsForm campaign={campaign.id} onReport={setReport} />,
            },
          ]}
        />
      )}
    </Dialog>
  )
}

interface FormProps {
  campaign: string
  onReport: (report: ImportReport) => void
}

const formNote =
  'One polytope per block, blocks parted by an empty line: a line per point with four integers, or a line per coordinate. The origin must be the only interior lattice point.'

function PasteForm({ campaign, onReport }: FormProps) {
  const send = useImportText(campaign)
  const [text, setText] = useState('')
  const [name, setName] = useState('')
  const bytes = new TextEncoder().encode(text).length
  const fault =
    bytes > pastedLimitBytes
      ? `${formatBytes(bytes)} were pasted; the limit is ${formatBytes(pastedLimitBytes)}. Upload a file for more.`
      : null
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (text.trim() === '' || fault) return
    send.mutate({ text, name: name.trim() || undefined }, { onSuccess: onReport })
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextArea
        label="Points"
        mono
        rows={9}
        spellCheck={false}
        value={text}
        placeholder={' 1  0  0  0\n 0  1  0  0\n 0  0  1  0\n 0  0  0  1\n-1 -1 -1 -1'}
        hint={`${formNote} Up to ${formatBytes(pastedLimitBytes)}${bytes > 0 ? `; now ${formatBytes(bytes)}` : ''}.`}
        error={fault}
        onChange={(event) => setText(event.target.value)}
      />
      <TextField
        label="Name (optional)"
        maxLength={80}
        hint="Several polytopes get the name and a number."
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={send.isPending}
        unavailable={text.trim() === '' && 'Paste at least one polytope first.'}
      >
        {send.isPending ? 'Importing…' : 'Import'}
      </Button>
    </form>
  )
}

function FileForm({ campaign, onReport }: FormProps) {
  const send = useImportFile(campaign)
  const [file, setFile] = useState<File | null>(null)
  const fault =
    file && file.size > uploadLimitBytes
      ? `${file.name} has ${formatBytes(file.size)}; the limit is ${formatBytes(uploadLimitBytes)}. Split it and upload the parts.`
      : null
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (file && !fault) send.mutate(file, { onSuccess: onReport })
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextField
        label="Text file"
        type="file"
        accept=".txt,.dat,.csv,text/plain"
        className="[&_input]:py-1"
        hint={`${formNote} Up to ${formatBytes(uploadLimitBytes)}. Good blocks are imported, bad ones listed by line.`}
        error={fault}
        onChange={(event) => setFile(event.target.files?.[0] ?? null)}
      />
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      <Button
        type="submit"
        kind="primary"
        className="self-start"
        busy={send.isPending}
        unavailable={!file && 'Choose a file first.'}
      >
        {send.isPending ? 'Importing…' : 'Import the file'}
      </Button>
    </form>
  )
}

function WeightsForm({ campaign, onReport }: FormProps) {
  const send = useImportWeights(campaign)
  const [text, setText] = useState('')
  const [side, setSide] = useState<'fan' | 'newton'>('fan')
  const [name, setName] = useState('')
  const [tried, setTried] = useState(false)
  const weights =
    text.trim() === ''
      ? []
      : text
          .trim()
          .split(/[\s,;]+/)
          .map(Number)
  const fault =
    weights.length !== 5
      ? `Five weights are needed; ${formatNumber(weights.length)} found.`
      : (weights.find((w) => !Number.isInteger(w) || w < 1) !== undefined &&
          'Weights are positive integers.') ||
        null
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (fault) return
    send.mutate({ weights, side, name: name.trim() || undefined }, { onSuccess: onReport })
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextField
        label="Weights"
        mono
        value={text}
        placeholder="1 1 12 28 42"
        hint="Five positive integers; a common factor is divided out."
        error={tried ? fault : null}
        onChange={(event) => setText(event.target.value)}
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
      <TextField
        label="Name (optional)"
        maxLength={80}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      {send.isError && <Failure title="Nothing was imported." error={send.error} />}
      <Button type="submit" kind="primary" className="self-start" busy={send.isPending}>
        {send.isPending ? 'Importing…' : 'Import'}
      </Button>
    </form>
  )
}
