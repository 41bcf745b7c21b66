import { caution } from '../../../shared/caution.ts'

/** Stands wherever a score or the word "verified" is shown. */
export function Caution({ className = '' }: { className?: string }) {
  return (
    <p role="note" className={`prose-line border-l-2 border-line pl-2 text-xs text-soft ${className}`}>
      {caution}
    </p>
  )
}
