import { BadgeCheck, CircleDashed, Clock, TriangleAlert } from 'lucide-react'
import { type CertificateMark as Mark } from '../../../shared/certificates.ts'

const looks = {
  none: { Shape: CircleDashed, colour: 'text-soft', word: 'none' },
  waiting: { Shape: Clock, colour: 'text-action', word: 'in work' },
  passed: { Shape: BadgeCheck, colour: 'text-verified', word: 'passed' },
  failed: { Shape: TriangleAlert, colour: 'text-rejected', word: 'failed' },
} as const

export const certificateWord = (state: Mark['state']): string => looks[state].word

/** State of a certificate as shape and word, never by colour alone. */
export function CertificateMark({ state }: { state: Mark['state'] }) {
  const { Shape, colour, word } = looks[state]
  return (
    <span className={`inline-flex items-center gap-1 whitespace-nowrap ${colour}`}>
      <Shape size={14} strokeWidth={2.2} aria-hidden />
      {word}
    </span>
  )
}
