import { useState, type FormEvent } from 'react'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { Button } from '../ui/Button.tsx'
import { Caution } from '../ui/Caution.tsx'
import { Dialog } from '../ui/Dialog.tsx'
import { TextArea } from '../ui/Field.tsx'

interface VerdictDialogProps {
  /** Which verdict is being given, to which candidate; null when none is. */
  asked: { value: VerdictValue; what: string } | null
  busy: boolean
  fault: string | null
  onGive: (reason: string) => void
  onClose: () => void
}

/**
 * Asks for the reason of a verdict. No certificate exists yet, so "verified" always needs one and is shown as
 * "verified by override".
 */
export function VerdictDialog({ asked, busy, fault, onGive, onClose }: VerdictDialogProps) {
  return (
    <Dialog
      open={asked !== null}
      onOpenChange={(open) => !open && onClose()}
      title={asked?.value === 'verified' ? 'Verify by override' : `Verdict: ${asked?.value ?? ''}`}
      description={
        asked?.value === 'verified'
          ? `${asked.what} has no certificate for this scoring: say why it holds all the same. The verdict will read “verified by override”.`
          : asked?.what
      }
    >
      {asked && <ReasonForm key={asked.what} value={asked.value} busy={busy} fault={fault} onGive={onGive} />}
    </Dialog>
  )
}

function ReasonForm({
  value,
  busy,
  fault,
  onGive,
}: {
  value: VerdictValue
  busy: boolean
  fault: string | null
  onGive: (reason: string) => void
}) {
  const [reason, setReason] = useState('')
  const [tried, setTried] = useState(false)
  const needed = value === 'verified'
  const missing = needed && reason.trim() === ''
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (!missing) onGive(reason.trim())
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextArea
        label={needed ? 'Reason and evidence' : 'Reason (optional)'}
        rows={4}
        maxLength={2000}
        autoFocus
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        error={
          tried && missing
            ? 'A verdict without a certificate needs a reason: what was checked, and how.'
            : fault
        }
      />
      <Button kind="primary" type="submit" busy={busy} className="self-start">
        {needed ? 'Verify by override' : 'Give the verdict'}
      </Button>
      {needed && <Caution />}
    </form>
  )
}
