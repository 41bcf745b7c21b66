import { useState, type FormEvent } from 'react'
import { type CertificateMark } from '../../../shared/certificates.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { Button } from '../ui/Button.tsx'
import { Caution } from '../ui/Caution.tsx'
import { CertificateMark as StateMark } from '../ui/CertificateMark.tsx'
import { Dialog } from '../ui/Dialog.tsx'
import { TextArea } from '../ui/Field.tsx'

interface VerdictDialogProps {
  /** Which verdict is being given, to which candidate; null when none is. */
  asked: { value: VerdictValue; what: string; certificate: CertificateMark } | null
  busy: boolean
  fault: string | null
  onGive: (reason: string) => void
  /** Has the candidate certified for the scoring in hand. */
  onCertify: () => void
  certifying: boolean
  onClose: () => void
}

/**
 * Asks for the reason of a verdict. "Verified" rests on a passing certificate; where there is none the dialog offers
 * to make one, or takes a reason, and the verdict reads "verified by override".
 */
export function VerdictDialog({
  asked,
  busy,
  fault,
  onGive,
  onCertify,
  certifying,
  onClose,
}: VerdictDialogProps) {
  const override = asked?.value === 'verified' && asked.certificate.state !== 'passed'
  return (
    <Dialog
      open={asked !== null}
      onOpenChange={(open) => !open && onClose()}
      title={override ? 'Verify by override' : `Verdict: ${asked?.value ?? ''}`}
      description={asked && describe(asked)}
    >
      {asked && override && (
        <Certifying state={asked.certificate.state} onCertify={onCertify} busy={certifying} />
      )}
      {asked && (
        <ReasonForm
          key={asked.what}
          value={asked.value}
          override={override}
          busy={busy}
          fault={fault}
          onGive={onGive}
        />
      )}
    </Dialog>
  )
}

function describe({ value, what, certificate }: NonNullable<VerdictDialogProps['asked']>): string {
  if (value !== 'verified') return what
  switch (certificate.state) {
    case 'passed':
      return `${what} has a passing certificate for this scoring; the verdict rests on it.`
    case 'failed':
      return `The certificate of ${lower(what)} for this scoring did not pass: say why it holds all the same. The verdict will read “verified by override”.`
    default:
      return `${what} has no certificate for this scoring yet. Have one made, or say why it holds all the same: the verdict will then read “verified by override”.`
  }
}

const lower = (what: string) => what[0].toLowerCase() + what.slice(1)

/** The better way, for as long as it is open. */
function Certifying({
  state,
  onCertify,
  busy,
}: {
  state: CertificateMark['state']
  onCertify: () => void
  busy: boolean
}) {
  return (
    <div aria-live="polite" className="mb-4 flex flex-wrap items-center gap-x-3 gap-y-2 border-b pb-4">
      <span className="text-soft">Certificate:</span> <StateMark state={state} />
      {state === 'waiting' ? (
        <span className="text-soft">This dialog will tell when it is there.</span>
      ) : (
        <Button busy={busy} onClick={onCertify}>
          {state === 'failed' ? 'Certify again' : 'Certify now'}
        </Button>
      )}
    </div>
  )
}

function ReasonForm({
  value,
  override,
  busy,
  fault,
  onGive,
}: {
  value: VerdictValue
  override: boolean
  busy: boolean
  fault: string | null
  onGive: (reason: string) => void
}) {
  const [reason, setReason] = useState('')
  const [tried, setTried] = useState(false)
  const missing = override && reason.trim() === ''
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (!missing) onGive(reason.trim())
  }
  return (
    <form onSubmit={submit} className="flex flex-col gap-4">
      <TextArea
        label={override ? 'Reason and evidence' : 'Reason (optional)'}
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
        {override ? 'Verify by override' : value === 'verified' ? 'Verify' : 'Give the verdict'}
      </Button>
      {value === 'verified' && <Caution />}
    </form>
  )
}
