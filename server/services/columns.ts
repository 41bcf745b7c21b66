import { checkColumn, engineVersion, scoringHash } from '../../scoring/index.ts'
import type { Exploration, Place } from '../../shared/explorations.ts'
import { unprocessable } from '../problems.ts'

/** An expression that can be evaluated on any candidate. */
export interface SoundColumn {
  readonly view: Exploration['columns'][number]
  /** Text of the rule whose only report column it is. */
  readonly rule: string
  /** Address of its values: expression, place on the ray, observables and engine version. */
  readonly hash: string
}

/**
 * Checks the columns of a table.
 *
 * @throws Refusal 422 with the located issues of the first that has an error, or for two of the same name
 */
export function requireSoundColumns(texts: readonly string[], at: Place): SoundColumn[] {
  const columns: SoundColumn[] = []
  for (const [n, text] of texts.entries()) {
    const path = `columns.${n}`
    const check = checkColumn(text, at)
    if (!check.ok) {
      const [first] = check.issues
      const place = `line ${first.line}, column ${first.column}: ${first.message}`
      throw unprocessable('column-invalid', `Column ${n + 1} cannot be used: ${place}`, {
        path,
        issues: check.issues,
      })
    }
    const { name, expression, type, unit, stage, cost, rule } = check.column
    if (columns.some(({ view }) => view.name === name)) {
      throw unprocessable(
        'column-twice',
        `Two columns are called “${name}”; give one of them another name.`,
        {
          path,
          found: text,
        },
      )
    }
    columns.push({
      view: { name, expression, type, unit, stage, cost },
      rule: rule.text,
      hash: scoringHash(rule, engineVersion),
    })
  }
  return columns
}
