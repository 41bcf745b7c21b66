import type { Outcome } from '../rules/outcome.ts'

/**
 * Outcomes by class key for one rule, at most `limit`; the one used longest ago makes room. A value depends on
 * the class, the rule and the engine only, so a memo spares time and cannot alter a result.
 */
export class OutcomeMemo {
  private readonly outcomes = new Map<string, Outcome>()

  constructor(private readonly limit = 4096) {}

  get(classKey: string): Outcome | undefined {
    const outcome = this.outcomes.get(classKey)
    if (outcome !== undefined) {
      this.outcomes.delete(classKey)
      this.outcomes.set(classKey, outcome)
    }
    return outcome
  }

  set(classKey: string, outcome: Outcome): void {
    this.outcomes.set(classKey, outcome)
    if (this.outcomes.size > this.limit) {
      for (const oldest of this.outcomes.keys()) {
        this.outcomes.delete(oldest)
        break
      }
    }
  }
}
