import { type Cell, type OutcomeView } from '../../../shared/outcomes.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { Num } from './Num.tsx'

/** What the rule says of a candidate, in one cell: its score, or why it has none. */
export function Outcome({ outcome, digits = 6 }: { outcome: OutcomeView; digits?: number }) {
  switch (outcome.kind) {
    case 'feasible':
      return <Num value={outcome.score} digits={digits} rounded />
    case 'infeasible':
      return (
        <span className="text-soft" title={`Fails: ${outcome.failed.join(', ')}`}>
          infeasible ({outcome.stage}, short by {formatNumber(outcome.shortfall, 3)})
        </span>
      )
    case 'undefined':
      return (
        <span className="text-soft" title={outcome.reason}>
          undefined ({outcome.stage})
        </span>
      )
  }
}

/** Report columns with a value that is not whole: all their values are written with decimals. */
export function roundedColumns(outcomes: readonly OutcomeView[]): ReadonlySet<string> {
  const rounded = new Set<string>()
  for (const outcome of outcomes) {
    if (outcome.kind !== 'feasible') continue
    for (const [name, cell] of Object.entries(outcome.report)) {
      if (typeof cell === 'number' && !Number.isInteger(cell)) rounded.add(name)
    }
  }
  return rounded
}

export function ReportCell({ cell, rounded }: { cell: Cell | undefined; rounded?: boolean }) {
  if (cell === undefined) return <span className="text-soft">–</span>
  if (typeof cell === 'number') return <Num value={cell} digits={5} rounded={rounded} />
  if (typeof cell === 'boolean') return <span data-raw={cell}>{cell ? 'yes' : 'no'}</span>
  return (
    <span className="text-soft" title={cell.undefined} data-raw="">
      <span aria-hidden>–</span>
      <span className="sr-only">undefined: {cell.undefined}</span>
    </span>
  )
}

/** The hit predicate as shape and word. */
export function HitMark({ outcome }: { outcome: OutcomeView }) {
  if (outcome.kind !== 'feasible' || outcome.hit === null) return <span className="text-soft">–</span>
  return outcome.hit ? (
    <span className="font-medium text-found">◆ hit</span>
  ) : (
    <span className="text-soft">no</span>
  )
}
