import { useState, type ReactNode } from 'react'
import { useQuery } from '@tanstack/react-query'
import { BadgeCheck, Download } from 'lucide-react'
import { toast } from 'sonner'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { type CandidateCertificates, type CertificateReport } from '../../../shared/certificates.ts'
import {
  candidateCertificatesQuery,
  certificateUrl,
  useCancelCertification,
  useRequestCertification,
} from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { useTargets } from '../../api/targets.ts'
import { CheckTable } from '../../components/certificate/CheckTable.tsx'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { counted, formatDuration, formatTime } from '../../lib/numbers.ts'

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
                <Summary certificate={certificate} />
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

const subject = ({ scoring }: CertificateReport) =>
  scoring ? `${scoring.targetName} v${scoring.targetVersion}` : 'geometry alone'

function Summary({ certificate }: { certificate: CertificateReport }) {
  const { passed, createdAt, author, engineVersion, certifierVersion } = certificate
  return (
    <span className="flex flex-wrap items-center gap-x-3">
      <CertificateMark state={passed ? 'passed' : 'failed'} />
      <span>{subject(certificate)}</span>
      <span className="text-soft">
        {formatTime(createdAt)}
        {author !== null && `, asked for by ${author}`}; engine {engineVersion}, certifier {certifierVersion}
      </span>
    </span>
  )
}

function Certificate({
  candidate,
  certificate,
  counts,
}: {
  candidate: string
  certificate: CertificateReport
  counts: boolean
}) {
  const failed = certificate.checks.filter(({ result }) => result === 'fail')
  const done = certificate.checks.filter(({ result }) => result !== 'not-done')
  return (
    <article aria-label={`Certificate, ${subject(certificate)}`}>
      <div className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-2">
        <Summary certificate={certificate} />
        <a
          href={certificateUrl(candidate, certificate.id)}
          download
          title="The whole certificate as JSON, to be checked again by the command of the README"
          className="inline-flex min-h-8 items-center gap-1.5 rounded border border-edge bg-sheet px-3 font-medium hover:bg-action-wash print:hidden"
        >
          <Download size={14} aria-hidden />
          Download JSON
        </a>
      </div>
      {!counts && (
        <p className="mb-2 text-soft">
          This is not the certificate that counts for the scoring in hand: it is older, or of another scoring.
        </p>
      )}
      {failed.length > 0 && (
        <div role="alert" className="mb-3 border-l-2 border-rejected py-1 pl-3">
          <p className="font-medium">
            The two roads disagree in {counted(failed.length, 'comparison')}. The candidate’s numbers are not
            to be relied on until this is explained.
          </p>
          <ul>
            {failed.map(({ id, title }) => (
              <li key={id}>
                <a href={`#check-${id}`} className="text-action hover:underline">
                  {title}
                </a>
              </li>
            ))}
          </ul>
        </div>
      )}
      <p className="mb-2 text-soft">
        {counted(done.length, 'comparison')} in {formatDuration(certificate.milliseconds / 1000)}.
      </p>
      <CheckTable checks={certificate.checks} />
      {certificate.notCertified.length > 0 && (
        <>
          <h3 className="mt-4 mb-1 text-sm">Not certified</h3>
          <dl className="grid gap-x-4 sm:grid-cols-[max-content_minmax(0,1fr)]">
            {certificate.notCertified.map(({ what, why }) => (
              <div key={what} className="col-span-full grid grid-cols-subgrid border-b py-1 last:border-b-0">
                <dt className="font-mono text-xs leading-5">{what}</dt>
                <dd className="prose-line text-soft">{why}</dd>
              </div>
            ))}
          </dl>
        </>
      )}
    </article>
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

interface CertifyProps {
  campaign: string
  candidate: string
  known?: CandidateCertificates
}

/** For the scoring in hand; for a candidate in no shortlist, for a target one chooses; or for the geometry alone. */
function CertifyButtons({ appearance, ...props }: CertifyProps & { appearance?: Appearance }) {
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
