import { type ReactNode } from 'react'
import { BadgeCheck } from 'lucide-react'
import { toast } from 'sonner'
import { certificationLimit } from '../../../shared/certificates.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { CertificationProgress } from '../../components/certificate/CertificationProgress.tsx'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { counted } from '../../lib/numbers.ts'
import { candidatesInAddress, startAddress } from '../searches/new/searchPreset.ts'
import { verdictOf } from './shortlistView.ts'
import { type Selection } from './useSelection.ts'

/** Candidates whose verdict waits for a certificate. */
export const toCertify = (rows: readonly ShortlistRow[]): ShortlistRow[] =>
  rows.filter((row) => verdictOf(row) === 'undecided' && row.certificate.state === 'none')

/** Certificates in bulk: for the selected candidates, or for all undecided ones; and how far they have come. */
export function CertifyBar({
  campaign,
  shortlist,
  selection,
  children,
}: {
  campaign: string
  shortlist: ShortlistDetail
  selection: Selection
  /** At the end of the line. */
  children?: ReactNode
}) {
  const barred = useBarred('certificates.run')
  const ask = useRequestCertification(campaign)
  const selected = selection.keys
  const open = toCertify(shortlist.rows)
  const keys = selected.length > 0 ? selected : open.map(({ candidateKey }) => candidateKey)
  const certify = () =>
    ask.mutate(
      { targetVersionId: shortlist.targetVersionId, candidateKeys: keys.slice(0, certificationLimit) },
      {
        onSuccess: ({ total }) => {
          selection.clear()
          toast(`${counted(total, 'candidate')} to be certified.`)
        },
        onError: (error) => void toast.error(explain(error)),
      },
    )
  return (
    <>
      <div className="mb-2 flex flex-wrap items-center gap-x-3 gap-y-2">
        <Button
          unavailable={
            barred || (keys.length === 0 && 'Every undecided candidate has a certificate or waits for one.')
          }
          busy={ask.isPending}
          onClick={certify}
        >
          <BadgeCheck size={14} aria-hidden />
          {selected.length > 0
            ? `Certify the ${selected.length} selected`
            : `Certify all undecided (${open.length})`}
        </Button>
        <SearchFrom campaign={campaign} shortlist={shortlist} selected={selected} />
        {selected.length > 0 && (
          <Button kind="quiet" onClick={selection.clear}>
            Let go of the selection
          </Button>
        )}
        <span className="ml-auto">{children}</span>
      </div>
      <CertificationProgress campaign={campaign} targetVersionId={shortlist.targetVersionId} />
    </>
  )
}

/** A search that begins from the selected candidates, or from all. */
function SearchFrom({
  campaign,
  shortlist,
  selected,
}: {
  campaign: string
  shortlist: ShortlistDetail
  selected: readonly string[]
}) {
  const barred = useBarred('searches.run')
  const tooMany =
    selected.length > candidatesInAddress && `Select at most ${candidatesInAddress}, or none for all.`
  const words = selected.length > 0 ? `Search from the ${selected.length} selected…` : 'Search from these…'
  if (barred || tooMany) return <Button unavailable={barred || tooMany}>{words}</Button>
  const chosen = selected.length > 0 ? { candidateKeys: [...selected] } : {}
  const to = startAddress(
    campaign,
    { kind: 'shortlist', id: shortlist.id, ...chosen },
    { target: shortlist.targetId },
  )
  return <ButtonLink to={to}>{words}</ButtonLink>
}
