import { InputError, InvariantError } from '../errors.ts'
import { catalogue, type CheckGroup, type CheckId } from './catalogue.ts'

/** One comparison of the fast with the independent road. */
export interface Check {
  /** Stable, kebab-case. */
  readonly id: CheckId
  readonly group: CheckGroup
  readonly title: string
  readonly result: 'pass' | 'fail' | 'not-done'
  readonly fast: string | number | null
  readonly independent: string | number | null
  /** Largest relative difference allowed; null where equality is exact. */
  readonly tolerance: number | null
  readonly note: string
  /** A fact of the run that made it; no part of what is compared. */
  readonly milliseconds: number
}

/** What a check found. `note` says what was compared, or names the first thing that differs. */
export interface Verdict {
  readonly passed: boolean
  readonly fast: string | number | null
  readonly independent: string | number | null
  readonly tolerance?: number
  readonly note?: string
}

/** Collects checks in the order of the catalogue; those that were never reached count as not done. */
export class CheckList {
  private readonly done = new Map<CheckId, Check>()

  constructor(private readonly clock: () => number) {}

  /**
   * Runs a check. What the geometry refuses (InputError, InvariantError) fails the check with its message; the
   * value is then undefined, as it is when the check fails.
   */
  run<T>(id: CheckId, compare: () => Verdict & { readonly value?: T }): T | undefined {
    const start = this.clock()
    let verdict: Verdict & { readonly value?: T }
    try {
      verdict = compare()
    } catch (error) {
      if (!(error instanceof InputError || error instanceof InvariantError)) throw error
      verdict = { passed: false, fast: null, independent: null, note: error.message }
    }
    const { passed, fast, independent, tolerance = null, note = '' } = verdict
    this.done.set(id, {
      id,
      ...catalogue[id],
      result: passed ? 'pass' : 'fail',
      fast,
      independent,
      tolerance,
      note,
      milliseconds: this.clock() - start,
    })
    return passed ? verdict.value : undefined
  }

  /** Says why a check was not made. */
  skip(id: CheckId, note: string): void {
    this.done.set(id, notDone(id, note))
  }

  /** @param without a group that does not apply */
  list(without?: CheckGroup): Check[] {
    const ids = (Object.keys(catalogue) as CheckId[]).filter((id) => catalogue[id].group !== without)
    return ids.map((id) => this.done.get(id) ?? notDone(id, 'An earlier check failed.'))
  }
}

const notDone = (id: CheckId, note: string): Check => ({
  id,
  ...catalogue[id],
  result: 'not-done',
  fast: null,
  independent: null,
  tolerance: null,
  note,
  milliseconds: 0,
})

/** Equality of two numbers or texts. */
export const equality = (fast: string | number, independent: string | number, note = ''): Verdict => ({
  passed: fast === independent,
  fast,
  independent,
  note,
})

/** Equality of two lists of integers per point, shown by their sums, with the first difference in the note. */
export function equalLists(fast: readonly number[], independent: readonly number[], what: string): Verdict {
  const size = Math.max(fast.length, independent.length)
  const at = Array.from({ length: size }, (_, n) => n).find((n) => fast[n] !== independent[n])
  const sum = (list: readonly number[]): number => list.reduce((total, entry) => total + entry, 0)
  return {
    passed: at === undefined,
    fast: sum(fast),
    independent: sum(independent),
    note:
      at === undefined
        ? `${size} entries compared; shown are their sums.`
        : `${what} of point ${at}: ${fast[at]} claimed, ${independent[at]} found.`,
  }
}

/** Equality of two sorted lists of rows of integers, shown by their lengths. */
export function equalRows(
  fast: readonly (readonly number[])[],
  independent: readonly (readonly number[])[],
  what: string,
): Verdict {
  const names = (rows: readonly (readonly number[])[]): Set<string> =>
    new Set(rows.map((row) => row.join(', ')))
  const [claimed, found] = [names(fast), names(independent)]
  const extra = [...claimed].find((row) => !found.has(row))
  const missing = [...found].find((row) => !claimed.has(row))
  const differences = [
    ...(extra === undefined ? [] : [`claimed only: (${extra})`]),
    ...(missing === undefined ? [] : [`found only: (${missing})`]),
    ...(extra === undefined && missing === undefined && fast.length !== independent.length
      ? ['some repeat']
      : []),
  ]
  return {
    passed: differences.length === 0,
    fast: fast.length,
    independent: independent.length,
    note: differences.length === 0 ? `All ${what} agree.` : `${what}: ${differences.join('; ')}.`,
  }
}
