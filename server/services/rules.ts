import type { z } from 'zod'
import { checkRule, engineVersion, scoringHash, type CheckedRule } from '../../scoring/index.ts'
import type { checkRuleResponseSchema } from '../../shared/targets.ts'
import { unprocessable } from '../problems.ts'

/** What the editor is told about a text. */
export function checkRuleText(text: string): z.infer<typeof checkRuleResponseSchema> {
  const check = checkRule(text)
  return {
    ok: check.ok,
    issues: [...check.issues],
    scoringHash: check.ok ? scoringHash(check.rule, engineVersion) : null,
  }
}

export interface SoundRule {
  readonly rule: CheckedRule
  readonly scoringHash: string
  readonly engineVersion: string
}

/** @throws Refusal 422 with the located issues when the rule has an error */
export function requireSoundRule(text: string, path = 'text'): SoundRule {
  const check = checkRule(text)
  if (!check.ok) {
    const first = check.issues.find(({ severity }) => severity === 'error')
    const place = first ? `line ${first.line}, column ${first.column}: ${first.message}` : 'it has errors'
    throw unprocessable('rule-invalid', `The rule cannot be used: ${place}`, { path, issues: check.issues })
  }
  return { rule: check.rule, scoringHash: scoringHash(check.rule, engineVersion), engineVersion }
}

/** How a text scores under the present engine; null for one that has errors under it. */
export function scoringHashOf(text: string): string | null {
  const check = checkRule(text)
  return check.ok ? scoringHash(check.rule, engineVersion) : null
}

/** Report columns in the rule's order. */
export function reportColumns(text: string): string[] {
  return requireSoundRule(text).rule.report.map(({ name }) => name)
}

/** True for a rule that leaves it open what a hit is: then a score above the null's 99 % quantile is one. */
export function leavesHitOpen(text: string): boolean {
  const check = checkRule(text)
  return check.ok && check.rule.hit === null
}
