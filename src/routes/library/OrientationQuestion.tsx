import { useEffect, useRef } from 'react'
import { type CandidateImportReport } from '../../../shared/importedCandidates.ts'
import { Button } from '../../components/ui/Button.tsx'

/** Asks how square matrices are to be read; nothing has been imported so far. */
export function OrientationQuestion({
  question,
  busy,
  onAnswer,
}: {
  question: NonNullable<CandidateImportReport['question']>
  busy: boolean
  onAnswer: (orientation: 'rows' | 'columns') => void
}) {
  const heading = useRef<HTMLHeadingElement>(null)
  useEffect(() => heading.current?.focus(), [])
  const { matrices } = question
  const places = matrices.slice(0, 5).map(({ line, what }) => `line ${line} (${what})`)
  const more = matrices.length > 5 ? ` and ${matrices.length - 5} more` : ''
  return (
    <section aria-labelledby="orientation" className="border-l-2 border-action py-1 pl-3">
      <h3 id="orientation" ref={heading} tabIndex={-1} className="font-medium outline-none">
        Rows or columns?
      </h3>
      <p className="prose-line mb-2 text-soft">
        The square matrix of {places.join(', ')}
        {more} can be read both ways. Nothing has been imported yet.
      </p>
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" busy={busy} onClick={() => onAnswer('rows')}>
          One per row
        </Button>
        <Button busy={busy} onClick={() => onAnswer('columns')}>
          One per column
        </Button>
      </div>
    </section>
  )
}
