import { useState, type FormEvent } from 'react'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextArea } from '../../components/ui/Field.tsx'

/** Asks for the reason of "verified" on candidates of which some have no passing certificate. */
export function ManyVerifiedDialog({
  open,
  onOpenChange,
  count,
  bare,
  onGive,
}: {
  open: boolean
  onOpenChange: (open: boolean) => void
  count: number
  /** Of these, so many have no passing certificate. */
  bare: number
  onGive: (reason: string) => void
}) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={`Verify ${count} candidates`}
      description={`${bare} of them ${bare === 1 ? 'has' : 'have'} no passing certificate for this scoring. Certify them first, or say why they hold all the same: their verdicts will read “verified by override”.`}
    >
      <ReasonForm
        count={count}
        onGive={(reason) => {
          onOpenChange(false)
          onGive(reason)
        }}
      />
    </Dialog>
  )
}

function ReasonForm({ count, onGive }: { count: number; onGive: (reason: string) => void }) {
  const [reason, setReason] = useState('')
  const [tried, setTried] = useState(false)
  const missing = reason.trim() === ''
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (!missing) onGive(reason.trim())
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextArea
        label="Reason and evidence"
        rows={4}
        maxLength={2000}
        autoFocus
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        error={
          tried && missing
            ? 'A verdict without a certificate needs a reason: what was checked, and how.'
            : null
        }
      />
      <Button kind="primary" type="submit" className="self-start">
        Verify the {count} by override
      </Button>
      <Caution />
    </form>
  )
}
