import {
  buildCandidate,
  canonicalClass,
  classFromHeights,
  evaluateRule,
  InvariantError,
  normalForm,
  polytopeFromPoints,
  ruleOfInput,
  type NormalForm,
} from '../../../scoring/index.ts'
import type { OutcomeView } from '../../../shared/outcomes.ts'
import { outcomeView } from './outcomeView.ts'

export interface ScoreCandidatesInput {
  readonly rule: string
  readonly polytopes: Readonly<Record<string, readonly (readonly number[])[]>>
  readonly candidates: readonly {
    readonly key: string
    readonly polytopeKey: string
    readonly heights: readonly number[]
  }[]
}

/** How long a piece of work on the interactive thread may take, which previews share. */
const pieceMilliseconds = 400

/** What the rule says of the first candidates, as many as the time of a piece allows; one at the least. */
export function scoreCandidates({ rule: text, polytopes, candidates }: ScoreCandidatesInput): OutcomeView[] {
  const begun = performance.now()
  const rule = ruleOfInput(text)
  const forms = new Map<string, NormalForm>()
  const outcomes: OutcomeView[] = []
  for (const { key, polytopeKey, heights } of candidates) {
    const form = forms.get(polytopeKey) ?? normalForm(polytopeFromPoints(polytopes[polytopeKey]))
    forms.set(polytopeKey, form)
    const given = classFromHeights(form.polytope, heights)
    if (!given.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
    const canonical = canonicalClass(form, given.class)
    if (canonical.key !== key) {
      throw new InvariantError(`The stored heights of candidate ${key} give the class ${canonical.key}.`)
    }
    outcomes.push(outcomeView(evaluateRule(rule, buildCandidate(form, canonical.class, key))))
    if (performance.now() - begun > pieceMilliseconds) break
  }
  return outcomes
}
