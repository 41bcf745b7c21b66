import { Check, Circle, CircleDot, X } from 'lucide-react'
import { byOneReader, verdictWord, type Verdict, type VerdictValue } from '../../../shared/verdicts.ts'

const looks = {
  verified: { Shape: Check, colour: 'text-verified' },
  rejected: { Shape: X, colour: 'text-rejected' },
  undecided: { Shape: Circle, colour: 'text-soft' },
  /** By the first of two readers: not decided yet. */
  half: { Shape: CircleDot, colour: 'text-verified' },
} as const

/** A verdict as shape and word, never by colour alone. */
export function VerdictMark({
  verdict,
  version,
  twoReaders,
}: {
  verdict: (Pick<Verdict, 'value' | 'override' | 'readers'> & Partial<Pick<Verdict, 'targetVersion'>>) | null
  /** Version of the target it is shown for; one that was given for another says so. */
  version?: number
  /** The campaign asks for two: a "verified" of before that says so. */
  twoReaders?: boolean
}) {
  const value: VerdictValue = verdict?.value ?? 'undecided'
  const { Shape, colour } = looks[byOneReader(verdict) ? 'half' : value]
  const names = verdict?.readers?.map(({ name }) => name).join(', ')
  const given = verdict?.targetVersion
  return (
    <span
      className={`inline-flex items-center gap-1 whitespace-nowrap ${colour}`}
      title={names ? `Read by ${names}` : undefined}
    >
      <Shape size={14} strokeWidth={2.4} aria-hidden />
      {verdictWord(verdict)}
      {twoReaders && verdict?.value === 'verified' && verdict.readers === null && (
        <span className="text-soft">(before two readers were asked for)</span>
      )}
      {version !== undefined && given !== undefined && given !== version && (
        <span className="text-soft">(given for v{given})</span>
      )}
    </span>
  )
}
