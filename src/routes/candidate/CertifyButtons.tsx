import { useState, type ReactNode } from 'react'
import { BadgeCheck } from 'lucide-react'
import { toast } from 'sonner'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { type CandidateCertificates } from '../../../shared/certificates.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { useTargets } from '../../api/targets.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'

type Appearance = CandidateRecord['appearances'][number]

interface CertifyProps {
  campaign: string
  candidate: string
  known?: CandidateCertificates
}

/** For the scoring in hand; for a candidate in no shortlist, for a target one chooses; or for the geometry alone. */
export function CertifyButtons({ appearance, ...props }: CertifyProps & { appearance?: Appearance }) {
  const hasScoring = appearance ? appearance.certificate.id !== null : false
  const hasGeometry = props.known?.certificates.some(({ scoring }) => scoring === null) ?? false
  return (
    <span className="flex flex-wrap items-end gap-2 print:hidden">
      {appearance ? (
        <CertifyButton {...props} targetVersionId={appearance.targetVersionId} again={hasScoring}>
          {hasScoring ? 'Certify again' : `Certify for ${appearance.targetName} v${appearance.targetVersion}`}
        </CertifyButton>
      ) : (
        <ForTarget {...props} />
      )}
      {!hasScoring && (
        <CertifyButton {...props} targetVersionId={null} again={hasGeometry}>
          {hasGeometry ? 'Certify the geometry again' : 'Certify the geometry alone'}
        </CertifyButton>
      )}
    </span>
  )
}

function ForTarget(props: CertifyProps) {
  const targets = useTargets(props.campaign)
  const [chosen, setChosen] = useState<string | null>(null)
  const target = targets.data?.find(({ id }) => id === chosen) ?? targets.data?.[0]
  if (!targets.data || !target) return null
  const before = props.known?.certificates.some(
    ({ scoring }) => scoring?.targetVersionId === target.latest.id,
  )
  return (
    <>
      <Select
        label="For the target"
        value={target.id}
        onChange={(event) => setChosen(event.target.value)}
        options={targets.data.map(
          ({ id, name, latest }) => [id, `${name}, version ${latest.number}`] as const,
        )}
      />
      <CertifyButton {...props} targetVersionId={target.latest.id} again={before ?? false}>
        {before ? 'Certify again' : 'Certify'}
      </CertifyButton>
    </>
  )
}

function CertifyButton({
  campaign,
  candidate,
  known,
  targetVersionId,
  again,
  children,
}: CertifyProps & { targetVersionId: string | null; again: boolean; children: ReactNode }) {
  const barred = useBarred('certificates.run')
  const ask = useRequestCertification(campaign)
  const waits = known?.waiting.some((one) => one.targetVersionId === targetVersionId) ?? false
  return (
    <Button
      unavailable={barred || (waits && 'It is being certified already.')}
      busy={ask.isPending}
      onClick={() =>
        ask.mutate(
          { targetVersionId, candidateKeys: [candidate], again },
          { onError: (error) => void toast.error(explain(error)) },
        )
      }
    >
      <BadgeCheck size={14} aria-hidden />
      {children}
    </Button>
  )
}
