import { Download } from 'lucide-react'
import { type CertificateReport } from '../../../shared/certificates.ts'
import { certificateUrl } from '../../api/certificates.ts'
import { CheckTable } from '../../components/certificate/CheckTable.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { counted, formatDuration, formatTime } from '../../lib/numbers.ts'

const subject = ({ scoring }: CertificateReport) =>
  scoring ? `${scoring.targetName} v${scoring.targetVersion}` : 'geometry alone'

export function CertificateSummary({ certificate }: { certificate: CertificateReport }) {
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

/** One certificate with every comparison; `counts` is false for one that is older or of another scoring. */
export function Certificate({
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
        <CertificateSummary certificate={certificate} />
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
      <p className="hidden print:block">
        The comparisons themselves are in the certificate, which can be downloaded.
      </p>
      <div className="print:hidden">
        <CheckTable checks={certificate.checks} />
      </div>
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
