import { useState, type FormEvent } from 'react'
import { type z } from 'zod'
import { createCampaignSchema } from '../../../shared/campaigns.ts'
import { explain } from '../../api/request.ts'
import { Button } from '../../components/ui/Button.tsx'
import { TextArea, TextField } from '../../components/ui/Field.tsx'

/** Name and description of a campaign, new or changed. */
export function CampaignForm({
  word,
  busy,
  error,
  initial,
  onSend,
}: {
  word: string
  busy: boolean
  error: Error | null
  /** Absent: a new campaign, whose setting comes later. */
  initial?: { name: string; description: string; secondReader: boolean }
  onSend: (body: z.output<typeof createCampaignSchema> & { secondReader?: boolean }) => void
}) {
  const [name, setName] = useState(initial?.name ?? '')
  const [description, setDescription] = useState(initial?.description ?? '')
  const [secondReader, setSecondReader] = useState(initial?.secondReader ?? false)
  const [tried, setTried] = useState(false)
  const parsed = createCampaignSchema.safeParse({ name, description })
  const fault = tried && !parsed.success ? 'A campaign needs a name of 1 to 80 characters.' : null
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (parsed.success) onSend(initial ? { ...parsed.data, secondReader } : parsed.data)
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <TextField
        label="Name"
        maxLength={80}
        autoFocus
        value={name}
        error={fault ?? (error && explain(error))}
        onChange={(event) => setName(event.target.value)}
      />
      <TextArea
        label="What it hunts for"
        rows={4}
        maxLength={1000}
        value={description}
        onChange={(event) => setDescription(event.target.value)}
      />
      {initial && (
        <label className="flex items-start gap-2">
          <input
            type="checkbox"
            className="mt-1"
            checked={secondReader}
            onChange={(event) => setSecondReader(event.target.checked)}
          />
          <span>
            “Verified” needs two people
            <span className="block text-xs text-soft">
              The first makes a candidate “verified by one reader”, which is still undecided; a second person
              makes it verified. A rejection stands at once. Verdicts of before stay, with a mark.
            </span>
          </span>
        </label>
      )}
      <Button kind="primary" type="submit" busy={busy} className="self-start">
        {word}
      </Button>
    </form>
  )
}
