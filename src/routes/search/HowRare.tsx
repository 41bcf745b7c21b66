import { useState } from 'react'
import { type NullSummary } from '../../../shared/nullSamples.ts'
import { TextField } from '../../components/ui/Field.tsx'
import { Facts } from '../../components/ui/Layout.tsx'
import { rarenessIn, rarenessText } from '../../lib/againstNull.ts'

/** How rare a score is among candidates nobody selected: of the best, and of any that one types. */
export function HowRare({ sample, best }: { sample: NullSummary; best: number | null }) {
  const [typed, setTyped] = useState('')
  const score = numberOf(typed)
  if (!sample.ranked)
    return <p className="text-soft">This null sample was drawn by an earlier version and kept no scores.</p>
  const say = (value: number) => {
    const rare = rarenessIn(sample, value)
    return rare ? rarenessText(rare) : '–'
  }
  return (
    <div>
      <h3 className="mb-1 text-sm">How rare is this?</h3>
      <Facts rows={[['The best score', best === null ? '–' : say(best)]]} />
      <div className="mt-2 flex flex-wrap items-end gap-x-3 gap-y-1">
        <TextField
          label="A score of"
          inputMode="decimal"
          className="w-32"
          value={typed}
          error={typed.trim() !== '' && score === null ? 'A number, such as −4.6.' : null}
          onChange={(event) => setTyped(event.target.value)}
        />
        <p aria-live="polite" className="min-h-8 min-w-0 flex-1 basis-48 py-1.5">
          {score === null ? (
            <span className="text-soft">How many null candidates are at least as good?</span>
          ) : (
            say(score)
          )}
        </p>
      </div>
    </div>
  )
}

/** A typed number, with a minus sign of either kind; null for anything else. */
export function numberOf(text: string): number | null {
  const plain = text.trim().replace('−', '-')
  return /^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i.test(plain) ? Number(plain) : null
}
