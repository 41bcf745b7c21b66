import { useState, type ReactNode } from 'react'
import { BadgeCheck, Check, Circle, X } from 'lucide-react'
import { toast } from 'sonner'
import { certificationLimit } from '../../../shared/certificates.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { CertificationProgress } from '../../components/certificate/CertificationProgress.tsx'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { counted } from '../../lib/numbers.ts'
import { compareCandidatesAddress } from '../candidates/compare/compareAddress.ts'
import { candidatesInAddress, startAddress } from '../searches/new/searchPreset.ts'
import { AssignSelect } from './AssignSelect.tsx'
import { ManyVerifiedDialog } from './ManyVerifiedDialog.tsx'
import { type Decisions } from './useDecisions.ts'
import { verdictOf } from './shortlistView.ts'
import { type Selection } from './useSelection.ts'

/** Candidates whose verdict waits for a certificate. */
export const toCertify = (rows: readonly ShortlistRow[]): ShortlistRow[] =>
  rows.filter((row) => verdictOf(row) === 'undecided' && row.certificate.state === 'none')

/** What can be done with many candidates at once: with the selected ones, or else with all. */
export function SelectionBar({
  campaign,
  shortlist,
  selection,
  decisions,
  children,
}: {
  campaign: string
  shortlist: ShortlistDetail
  selection: Selection
  decisions: Decisions
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
          const left = keys.length - certificationLimit
          toast(
            `${counted(total, 'candidate')} to be certified.${left > 0 ? ` ${left} more than one request takes: ask again for them.` : ''}`,
          )
        },
        onError: (error) => void toast.error(explain(error)),
      },
    )
  return (
    <>
      <div className="mb-2 flex flex-wrap items-center gap-x-3 gap-y-2">
        {selected.length > 0 && (
          <SelectedVerdicts {...{ campaign, shortlist, selection, decisions }}>
            <strong className="font-medium">{selected.length} selected</strong>
          </SelectedVerdicts>
        )}
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
        {selected.length === 2 && (
          <ButtonLink to={compareCandidatesAddress(selected, campaign)}>Compare the two</ButtonLink>
        )}
        <SearchFrom campaign={campaign} shortlist={shortlist} selected={selected} />
        {selected.length > 0 && (
          <Button kind="quiet" onClick={selection.clear}>
            Let go of the selection
          </Button>
        )}
        <span className="ml-auto flex flex-wrap items-center gap-x-1">{children}</span>
      </div>
      <CertificationProgress campaign={campaign} targetVersionId={shortlist.targetVersionId} />
    </>
  )
}

/** One word on all selected candidates, and handing them to somebody. */
function SelectedVerdicts({
  campaign,
  shortlist,
  selection,
  decisions,
  children,
}: {
  campaign: string
  shortlist: ShortlistDetail
  selection: Selection
  decisions: Decisions
  children: ReactNode
}) {
  const barred = useBarred('verdicts.give')
  const [asking, setAsking] = useState(false)
  const chosen = new Set(selection.keys)
  const rows = shortlist.rows.filter(({ candidateKey }) => chosen.has(candidateKey))
  const bare = rows.filter(({ certificate }) => certificate.state !== 'passed').length
  const decide = (value: VerdictValue, reason = '') => {
    decisions.decide(rows, value, reason)
    selection.clear()
  }
  return (
    <div
      role="group"
      aria-label="Selected candidates"
      className="flex flex-wrap items-center gap-x-3 gap-y-2 border-r pr-3"
    >
      {children}
      <Button unavailable={barred} onClick={() => (bare > 0 ? setAsking(true) : decide('verified'))}>
        <Check size={14} className="text-verified" aria-hidden />
        {bare > 0 ? 'Verify all…' : 'Verify all'}
      </Button>
      <Button unavailable={barred} onClick={() => decide('rejected')}>
        <X size={14} className="text-rejected" aria-hidden />
        Reject all
      </Button>
      <Button unavailable={barred} onClick={() => decide('undecided')}>
        <Circle size={14} className="text-soft" aria-hidden />
        Undecided
      </Button>
      <AssignSelect
        campaign={campaign}
        targetId={shortlist.targetId}
        candidateKeys={selection.keys}
        label={`Assign the ${rows.length} selected to`}
      />
      <ManyVerifiedDialog
        open={asking}
        onOpenChange={setAsking}
        count={rows.length}
        bare={bare}
        onGive={(reason) => decide('verified', reason)}
      />
    </div>
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
