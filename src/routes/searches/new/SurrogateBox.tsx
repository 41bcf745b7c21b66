import { useId } from 'react'
import type { CreateSearch } from '../../../../shared/searches.ts'

/** Methods whose proposals a surrogate may choose among. */
const guided: readonly CreateSearch['method'][] = ['auto', 'annealing', 'tempering', 'genetic']

interface SurrogateBoxProps {
  readonly method: CreateSearch['method']
  readonly on: boolean
  readonly onChange: (on: boolean) => void
  readonly className?: string
}

/** Whether a search has a surrogate; cannot be asked for where it would have nothing to choose. */
export function SurrogateBox({ method, on, onChange, className }: SurrogateBoxProps) {
  const id = useId()
  const isGuided = guided.includes(method)
  return (
    <div className={className}>
      <label htmlFor={id} className="flex min-h-8 items-center gap-2">
        <input
          id={id}
          type="checkbox"
          aria-describedby={`${id}-hint`}
          checked={on && isGuided}
          disabled={!isGuided}
          onChange={(event) => onChange(event.target.checked)}
        />
        Surrogate
      </label>
      <p id={`${id}-hint`} className="text-xs text-soft">
        {isGuided
          ? `Learns from what was evaluated and chooses among a few proposals, where the rule needs a reference point. It never decides a rank.${method === 'auto' ? ' Over a thousand small polytopes it gained nothing with this method and took several times the processor time.' : ''}`
          : 'Nothing to choose: this method proposes what it must.'}
      </p>
    </div>
  )
}
