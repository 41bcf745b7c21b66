import { type Cell, type OutcomeView } from '../../../shared/outcomes.ts'
import { columnDecimals, formatNumber } from '../../lib/numbers.ts'
import { Num } from './Num.tsx'

/** How the score and the report columns of one table are written: shared decimals, or null where each has its own digits. */
export interface OutcomeFormat {
  score: number | null
  report: ReadonlyMap<string, number | null>
}

/** One format for all rows of a table, so that figures line up. */
export function outcomeFormat(outcomes: readonly OutcomeView[]): OutcomeFormat {
  const scores: number[] = []
  const columns = new Map<string, number[]>()
  for (const outcome of outcomes) {
    if (outcome.kind !== 'feasible') continue
    scores.push(outcome.score)
    for (const [name, cell] of Object.entries(outcome.report)) {
      if (typeof cell !== 'number') continue
      const values = columns.get(name)
      if (values) values.push(cell)
      else columns.set(name, [cell])
    }
  }
  const report = new Map<string, number | null>()
  for (const [name, values] of columns) {
    report.set(name, columnDecimals(values, 5))
  }
  return { score: columnDecimals(scores, 6), report }
}

/** What the rule says of a candidate, in one cell: its score, or why it has none. */
export function Outcome({ outcome, decimals }: { outcome: OutcomeView; decimals?: number | null }) {
  switch (outcome.kind) {
    case 'feasible':
      return <Num value={outcome.score} digits={6} decimals={decimals} />
    case 'infeasible':
      return (
        <span
          className="text-soft"
          title={`Fails ${outcome.failed.join(', ')}; short by ${formatNumber(outcome.shortfall, 3)}`}
        >
          infeasible: {outcome.stage}
        </span>
      )
    case 'undefined':
      return (
        <span className="text-soft" title={outcome.reason}>
          undefined: {outcome.stage}
        </span>
      )
  }
}

export function ReportCell({ cell, decimals }: { cell: Cell | undefined; decimals?: number | null }) {
  if (cell === undefined) return <span className="text-soft">–</span>
  if (typeof cell === 'number') return <Num value={cell} digits={5} decimals={decimals} />
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
