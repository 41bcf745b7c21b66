import { Check, Circle, X } from 'lucide-react'
import { type Verdict, type VerdictValue } from '../../../shared/verdicts.ts'

const looks = {
  verified: { Shape: Check, colour: 'text-verified' },
  rejected: { Shape: X, colour: 'text-rejected' },
  undecided: { Shape: Circle, colour: 'text-soft' },
} as const

/** How a verdict reads: a verified one without a certificate says so. */
export function verdictWord(verdict: Pick<Verdict, 'value' | 'override'> | null): string {
  if (!verdict) return 'undecided'
  return verdict.value === 'verified' && verdict.override ? 'verified by override' : verdict.value
}

/** A verdict as shape and word, never by colour alone. */
export function VerdictMark({
  verdict,
  version,
}: {
  verdict: (Pick<Verdict, 'value' | 'override'> & Partial<Pick<Verdict, 'targetVersion'>>) | null
  /** Version of the target it is shown for; one that was given for another says so. */
  version?: number
}) {
  const value: VerdictValue = verdict?.value ?? 'undecided'
  const { Shape, colour } = looks[value]
  const given = verdict?.targetVersion
  return (
    <span className={`inline-flex items-center gap-1 whitespace-nowrap ${colour}`}>
      <Shape size={14} strokeWidth={2.4} aria-hidden />
      {verdictWord(verdict)}
      {version !== undefined && given !== undefined && given !== version && (
        <span className="text-soft">(given for v{given})</span>
      )}
    </span>
  )
}
