import { useState } from 'react'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { type CandidateCertificates, type CertificateReport } from '../../../shared/certificates.ts'
import { candidateCertificatesQuery, useCancelCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { Certificate, CertificateSummary } from './Certificate.tsx'
import { CertifyButtons } from './CertifyButtons.tsx'
import { counted } from '../../lib/numbers.ts'

type Appearance = CandidateRecord['appearances'][number]

/** The candidate by the independent road: for the scoring in hand, for the geometry alone, now and before. */
export function CertificateSection({
  campaign,
  candidate,
  appearance,
}: {
  campaign: string | null
  candidate: string
  appearance?: Appearance
}) {
  const query = useQuery(candidateCertificatesQuery(campaign, candidate))
  return (
    <Section
      id="certificate"
      title="Certificate"
      note="The candidate computed a second time from its stored heights, by code that shares nothing with the first: exact where the numbers are whole, to a stated tolerance where they are not."
      actions={
        campaign && (
          <CertifyButtons
            campaign={campaign}
            candidate={candidate}
            appearance={appearance}
            known={query.data}
          />
        )
      }
    >
      <QueryView query={query} what="the certificates">
        {(known) => (
          <Certificates campaign={campaign} candidate={candidate} appearance={appearance} known={known} />
        )}
      </QueryView>
    </Section>
  )
}

/** The one that counts for the target version in hand; without one, the newest of the geometry. */
function inHand(known: CandidateCertificates, appearance?: Appearance): CertificateReport | undefined {
  const ofScoring = known.certificates.find(({ id }) => id === appearance?.certificate.id)
  return ofScoring ?? known.certificates.find(({ scoring }) => scoring === null)
}

function Certificates({
  campaign,
  candidate,
  appearance,
  known,
}: {
  campaign: string | null
  candidate: string
  appearance?: Appearance
  known: CandidateCertificates
}) {
  const [chosen, setChosen] = useState<string | null>(null)
  const current = inHand(known, appearance)
  const shown = known.certificates.find(({ id }) => id === chosen) ?? current ?? known.certificates[0]
  const others = known.certificates.filter(({ id }) => id !== shown?.id)
  return (
    <>
      {campaign && <Waiting campaign={campaign} appearance={appearance} known={known} />}
      {shown ? (
        <Certificate
          candidate={candidate}
          certificate={shown}
          counts={!appearance || shown.id === current?.id}
        />
      ) : (
        known.waiting.length === 0 && (
          <Empty title="No certificate yet.">
            {campaign
              ? 'Without a passing one, “verified” is an override with a reason.'
              : 'Open the candidate from a campaign to have it certified.'}
          </Empty>
        )
      )}
      {others.length > 0 && (
        <details className="mt-4">
          <summary className="text-action">{counted(others.length, 'other certificate')}</summary>
          <ul aria-label="Other certificates, newest first" className="mt-1">
            {others.map((certificate) => (
              <li
                key={certificate.id}
                className="flex flex-wrap items-center gap-x-3 border-b py-1 last:border-b-0"
              >
                <CertificateSummary certificate={certificate} />
                <Button kind="quiet" onClick={() => setChosen(certificate.id)}>
                  Show
                </Button>
              </li>
            ))}
          </ul>
        </details>
      )}
    </>
  )
}

function Waiting({
  campaign,
  appearance,
  known,
}: {
  campaign: string
  appearance?: Appearance
  known: CandidateCertificates
}) {
  const barred = useBarred('certificates.run')
  const cancel = useCancelCertification(campaign)
  return (
    <div aria-live="polite" className="empty:hidden">
      {known.waiting.map(({ certificationId, targetVersionId, before }) => (
        <div
          key={certificationId}
          className="mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 border-l-2 border-action py-1 pl-3"
        >
          <CertificateMark state="waiting" />
          <span>
            {targetVersionId === null
              ? 'geometry alone'
              : targetVersionId === appearance?.targetVersionId
                ? 'the scoring in hand'
                : 'another scoring of this campaign'}
            {before > 0 && `; ${counted(before, 'candidate')} before it`}
          </span>
          {before === 0 && known.waiting.length > 0 && (
            <Button
              unavailable={barred}
              busy={cancel.isPending}
              onClick={() =>
                cancel.mutate(certificationId, { onError: (error) => void toast.error(explain(error)) })
              }
            >
              Cancel
            </Button>
          )}
        </div>
      ))}
    </div>
  )
}
