import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { toast } from 'sonner'
import { type Certification } from '../../../shared/certificates.ts'
import { certificationsQuery, useCancelCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { counted } from '../../lib/numbers.ts'
import { useBarred } from '../shell/currentCampaign.tsx'
import { Button } from '../ui/Button.tsx'
import { Progress } from '../ui/Progress.tsx'

const isOpen = ({ state }: Certification) => state === 'queued' || state === 'running'

/** Requests for certificates of one target version that are open, and the last one that ended badly. */
export function CertificationProgress({
  campaign,
  targetVersionId,
}: {
  campaign: string
  targetVersionId: string
}) {
  const query = useQuery(certificationsQuery(campaign))
  const own = (query.data ?? []).filter((one) => one.targetVersionId === targetVersionId)
  const open = own.filter(isOpen)
  const [last] = own.filter((one) => !isOpen(one))
  return (
    <div aria-live="polite" className="empty:hidden">
      {open.map((one) => (
        <OpenCertification key={one.id} campaign={campaign} certification={one} />
      ))}
      {open.length === 0 && last && last.broken > 0 && <Broken campaign={campaign} certification={last} />}
    </div>
  )
}

/** One open request: how far it is, and the way to end it. */
function OpenCertification({ campaign, certification }: { campaign: string; certification: Certification }) {
  const barred = useBarred('certificates.run')
  const cancel = useCancelCertification(campaign)
  const { total, waiting, failed, broken, state } = certification
  const done = total - waiting
  return (
    <div className="mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 border-l-2 border-action py-1 pl-3">
      <span>
        Certifying {counted(total, 'candidate')}
        {state === 'queued' ? ': waiting for its turn' : `: ${done} of ${total} done`}
        {failed > 0 && <span className="text-rejected">, {failed} failed</span>}
        {broken > 0 && <span className="text-rejected">, {broken} could not be computed</span>}
      </span>
      <span className="max-w-64 min-w-24 flex-1">
        <Progress value={done} most={total} label="Certificates made" />
      </span>
      <Button
        unavailable={barred}
        busy={cancel.isPending}
        onClick={() =>
          cancel.mutate(certification.id, { onError: (error) => void toast.error(explain(error)) })
        }
      >
        Cancel
      </Button>
    </div>
  )
}

function Broken({ campaign, certification }: { campaign: string; certification: Certification }) {
  return (
    <div role="alert" className="mb-3 border-l-2 border-rejected py-1 pl-3">
      <p>{counted(certification.broken, 'candidate')} could not be certified: no certificate came of it.</p>
      <ul>
        {certification.problems.map(({ candidateKey, message }) => (
          <li key={candidateKey}>
            <Link
              to={`/candidates/${candidateKey}?campaign=${campaign}`}
              className="font-mono text-xs text-action hover:underline"
            >
              {candidateKey.slice(0, 10)}
            </Link>{' '}
            {message}
          </li>
        ))}
      </ul>
    </div>
  )
}
