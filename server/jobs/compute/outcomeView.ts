import type { Outcome } from '../../../scoring/index.ts'
import type { Cell, OutcomeView } from '../../../shared/outcomes.ts'

/** An outcome as it is stored, sent and shown. */
export function outcomeView(outcome: Outcome): OutcomeView {
  switch (outcome.kind) {
    case 'feasible': {
      const report = Object.entries(outcome.report).map(([name, cell]): [string, Cell] => [
        name,
        cell.value === null ? { undefined: cell.reason } : cell.value,
      ])
      return { kind: 'feasible', score: outcome.score, hit: outcome.hit, report: Object.fromEntries(report) }
    }
    case 'infeasible': {
      const { stage, shortfall, failed } = outcome
      return { kind: 'infeasible', stage, shortfall, failed: failed.map(({ label }) => label) }
    }
    case 'undefined':
      return { kind: 'undefined', reason: outcome.reason, stage: outcome.stage }
  }
}
