import type { CostClass, Stage } from '../observables/observable.ts'
import { checkedText, ruleCheck } from './check.ts'
import type { RuleIssue } from './issues.ts'
import { type OwnName, ownNamesOf } from './ownNames.ts'
import { parseRule } from './parse.ts'
import { correspondingPlaces, type Places } from './places.ts'

/** What an editor wants to know of a text, as plain data that crosses between threads. */
export interface RuleReport {
  readonly text: string
  readonly issues: readonly RuleIssue[]
  readonly names: readonly OwnName[]
  /** Null while the text has an error. */
  readonly sound: SoundReport | null
}

export interface SoundReport {
  /** The text that stands for the rule's meaning: what is evaluated, and what values are kept under. */
  readonly canonical: string
  readonly stage: Stage
  readonly cost: CostClass
  /** The rule does not say what a hit is. */
  readonly hitOpen: boolean
  /** Where the places of the canonical text stand in this one. */
  readonly places: Places
}

/** Checks a text once and says everything that an editor shows of it. */
export function reportOnRule(text: string): RuleReport {
  const checked = checkedText(text)
  const check = ruleCheck(text, checked)
  const names = ownNamesOf(text, checked.checker)
  if (!check.ok) return { text, issues: check.issues, names, sound: null }
  const { canonical, tree, stage, cost, hit } = check.rule
  const read = parseRule(canonical).rule
  if (!read) throw new Error('a canonical text does not read back')
  const places = correspondingPlaces({ text: canonical, tree: read }, { text, tree })
  return {
    text,
    issues: check.issues,
    names,
    sound: { canonical, stage, cost, hitOpen: hit === null, places },
  }
}
