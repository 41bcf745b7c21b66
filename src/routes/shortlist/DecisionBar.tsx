import { type ReactNode } from 'react'
import { ArrowDown, ArrowUp, Check, Circle, X } from 'lucide-react'
import { type ShortlistRow } from '../../../shared/shortlists.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { Button, ButtonLink, IconButton } from '../../components/ui/Button.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { Outcome } from '../../components/ui/Outcome.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'

/** The row in hand with everything that can be done to it: for fingers, and as a reminder of the keys. */
export function DecisionBar({
  row,
  version,
  place,
  barred,
  twoReaders,
  dossier,
  assign,
  onDecide,
  onStep,
}: {
  row: ShortlistRow
  /** Of the list's target. */
  version: number
  place: string
  barred: string | false
  twoReaders: boolean
  dossier: string
  /** Hands the candidate to somebody. */
  assign: ReactNode
  onDecide: (value: VerdictValue) => void
  onStep: (step: number) => void
}) {
  return (
    <div
      role="group"
      aria-label="Candidate in hand"
      className="sticky bottom-0 z-10 mb-4 flex flex-wrap items-center gap-x-3 gap-y-1 border-t border-edge bg-paper py-2 sm:gap-y-2"
    >
      <span aria-live="polite" className="inline-flex flex-wrap items-center gap-x-3">
        <span>
          <strong className="font-medium">Rank {row.rank}</strong>{' '}
          <span className="text-soft">({place})</span>
        </span>
        <span className="text-found">
          <Outcome outcome={row.outcome} />
        </span>
        <VerdictMark verdict={row.verdict} version={version} twoReaders={twoReaders} />
        <span className="hidden items-center gap-1 sm:inline-flex">
          <span className="text-soft">certificate:</span> <CertificateMark state={row.certificate.state} />
        </span>
        {row.assignee && (
          <span className="hidden sm:inline">
            <span className="text-soft">assigned to</span> {row.assignee.name}
          </span>
        )}
      </span>
      <span className="flex flex-wrap items-center gap-1 sm:ml-auto sm:gap-2">
        <IconButton label="Previous candidate" onClick={() => onStep(-1)}>
          <ArrowUp size={16} aria-hidden />
        </IconButton>
        <IconButton label="Next candidate" onClick={() => onStep(1)}>
          <ArrowDown size={16} aria-hidden />
        </IconButton>
        <Button unavailable={barred} onClick={() => onDecide('verified')}>
          <Check size={14} className="text-verified" aria-hidden />
          {row.certificate.state === 'passed' ? 'Verify' : 'Verify…'}
          <Key name="v" />
        </Button>
        <Button unavailable={barred} onClick={() => onDecide('rejected')}>
          <X size={14} className="text-rejected" aria-hidden />
          Reject
          <Key name="r" />
        </Button>
        <Button unavailable={barred} onClick={() => onDecide('undecided')}>
          <Circle size={14} className="text-soft" aria-hidden />
          <span className="max-sm:sr-only">Undecided</span>
          <Key name="u" />
        </Button>
        <span className="hidden sm:inline">{assign}</span>
        <ButtonLink kind="primary" to={dossier}>
          Dossier
        </ButtonLink>
      </span>
    </div>
  )
}

function Key({ name }: { name: string }) {
  return (
    <kbd aria-hidden className="hidden rounded border px-1 font-mono text-xs text-soft md:inline">
      {name}
    </kbd>
  )
}
