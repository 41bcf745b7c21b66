import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import { InputError } from '../errors.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { scoringHash } from '../rules/hash.ts'
import { engineVersion } from '../version.ts'
import { methods, type MethodName } from './methods.ts'
import { usualNullLaw } from './nullLaws.ts'
import type { PolytopeSource } from './polytopeSource.ts'
import { seenWordsVersion } from './seenWords.ts'
import type { SearchSettings } from './settings.ts'
import type { SearchState } from './state.ts'
import type { GivenStart } from './givenStarts.ts'

/** What is searched, how, and by which rule. */
export interface SearchProblem {
  readonly polytopes: PolytopeSource
  readonly rule: CheckedRule
  readonly method: MethodName
  readonly settings: SearchSettings
  /** Candidates to begin from, the best first; see `Method.ignoresStarts`. */
  readonly starts?: readonly GivenStart[]
  /** Budget added since, see `extensionsSchema`. Not part of the digest: a state goes on with more of them. */
  readonly extensions?: readonly number[]
}

const scopeDigests = new WeakMap<readonly string[], string>()

/** Hash of a scope's keys, in order; scopes may be long, so it is kept with the list. */
function scopeDigest(keys: readonly string[]): string {
  let digest = scopeDigests.get(keys)
  if (digest === undefined) {
    digest = hashOf(keys.join('\n'))
    scopeDigests.set(keys, digest)
  }
  return digest
}

const startDigests = new WeakMap<readonly GivenStart[], string>()

/** Hash of the given candidates, in order, with their heights. */
function startsDigest(starts: readonly GivenStart[]): string {
  let digest = startDigests.get(starts)
  if (digest === undefined) {
    digest = hashOf(
      starts
        .map(({ polytopeKey, classKey, heights }) => `${polytopeKey} ${classKey} ${heights.join(' ')}`)
        .join('\n'),
    )
    startDigests.set(starts, digest)
  }
  return digest
}

function hashOf(text: string): string {
  return bytesToHex(sha256(utf8ToBytes(text)))
}

/**
 * 32 hexadecimal digits that say which problem a state belongs to: scope (in order), scoring hash (rule,
 * observables, engine), method, settings, and the candidates it begins from, where there are any.
 */
export function problemDigest({ polytopes, rule, method, settings, starts = [] }: SearchProblem): string {
  const content = JSON.stringify({
    scope: scopeDigest(polytopes.keys),
    scoring: scoringHash(rule, engineVersion),
    method: [method, methods[method].version],
    // Left out where they are as usual, so that states from before there was a choice stay what they were.
    settings: Object.entries(settings)
      .filter(
        ([name, value]) =>
          !(name === 'surrogate' && value === false) &&
          !(name === 'law' && (value ?? usualNullLaw) === usualNullLaw),
      )
      .sort(([a], [b]) => (a < b ? -1 : 1)),
    ...(starts.length > 0 && { starts: startsDigest(starts) }),
    seen: seenWordsVersion,
  })
  return hashOf(content).slice(0, 32)
}

/** @throws InputError when the state belongs to another problem */
export function requireSameProblem(state: Pick<SearchState, 'problem'>, digest: string): void {
  if (state.problem === digest) return
  throw new InputError(
    'state.other-problem',
    'This state belongs to another search: scope, rule, method, settings or the engine version differ.',
    'state',
    state.problem,
  )
}
