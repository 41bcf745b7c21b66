import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { scoringHash } from '../rules/hash.ts'
import { engineVersion } from '../version.ts'
import type { MethodName } from './methods.ts'
import type { PolytopeSource } from './polytopeSource.ts'
import type { SearchSettings } from './settings.ts'

/** What is searched, how, and by which rule. */
export interface SearchProblem {
  readonly polytopes: PolytopeSource
  readonly rule: CheckedRule
  readonly method: MethodName
  readonly settings: SearchSettings
}

/**
 * 32 hexadecimal digits that say which problem a state belongs to: scope (in order), scoring hash (rule,
 * observables, engine), method and settings.
 */
export function problemDigest({ polytopes, rule, method, settings }: SearchProblem): string {
  const content = JSON.stringify({
    scope: polytopes.keys,
    scoring: scoringHash(rule, engineVersion),
    method,
    settings: Object.entries(settings).sort(([a], [b]) => (a < b ? -1 : 1)),
  })
  return bytesToHex(sha256(utf8ToBytes(content))).slice(0, 32)
}
