import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import type { CheckedRule } from './checkedRule.ts'

/**
 * The scoring hash: 64 hexadecimal digits (SHA-256) of the rule's canonical text, the versions of the
 * observables it uses and the engine's version. Values are re-used only under the same hash; comments and
 * layout do not change it.
 */
export function scoringHash(rule: CheckedRule, engineVersion: string): string {
  const content = JSON.stringify({
    schema: 'tessellary.scoring/1',
    rule: rule.canonical,
    observables: rule.versions,
    engineVersion,
  })
  return bytesToHex(sha256(utf8ToBytes(content)))
}
