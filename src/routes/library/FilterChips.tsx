import { X } from 'lucide-react'
import { type PolytopeFilter } from '../../../shared/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { filterWords } from '../../lib/filterWords.ts'

/** The conditions in force, each with a button that lifts it. */
export function FilterChips({
  filter,
  collection,
  onChange,
  onClear,
}: {
  filter: PolytopeFilter
  /** Name of the collection the filter names. */
  collection?: string
  onChange: (changes: Record<string, undefined>) => void
  onClear: () => void
}) {
  const conditions = filterWords(filter, collection)
  if (conditions.length === 0) return null
  return (
    <ul aria-label="Conditions in force" className="flex flex-wrap items-center gap-1.5">
      {conditions.map(({ words, parts }) => (
        <li key={parts.join()}>
          <button
            type="button"
            className="inline-flex min-h-7 items-center gap-1 rounded border border-line bg-action-wash pr-1 pl-2 text-xs text-ink hover:border-action"
            aria-label={`Lift the condition: ${words}`}
            onClick={() => onChange(Object.fromEntries(parts.map((part) => [part, undefined])))}
          >
            {words}
            <X size={13} aria-hidden className="text-action" />
          </button>
        </li>
      ))}
      {conditions.length > 1 && (
        <li>
          <Button kind="quiet" className="text-xs" onClick={onClear}>
            Clear the filter
          </Button>
        </li>
      )}
    </ul>
  )
}
