import { checkRule } from '../rules/check.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'
import { advance, startState, type SegmentOptions } from './advance.ts'
import { codeOfHeights } from './heightsCode.ts'
import { nullProblem } from './nullSample.ts'
import type { PolytopeSource } from './polytopeSource.ts'
import type { SearchState } from './state.ts'

/** Most candidates drawn from one scope with one seed. */
export const drawnLimit = 2_000

/** A candidate nobody has scored. */
export interface DrawnCandidate {
  readonly candidateKey: string
  readonly polytopeKey: string
  /** Integer heights that give the canonical class (see `codeOfHeights`); they may tie in facets. */
  readonly heights: string
}

function constantRule(): CheckedRule {
  const check = checkRule('score 0')
  if (!check.ok) throw new Error('the constant rule has errors')
  return check.rule
}

const anything = constantRule()

/**
 * Draws the next candidates of a scope's null sample, for a look at their observables before there is a rule. They
 * are those of every null sample of the same scope and seed, in the same order, as long as neither asks for more
 * than `drawnLimit` candidates; a larger one begins with a smaller one.
 *
 * @param state null at the beginning
 * @returns `ended`: the limit is reached, or nothing new turns up any more
 */
export function drawCandidates(
  polytopes: PolytopeSource,
  seed: number,
  state: SearchState | null,
  count: number,
  enough?: SegmentOptions['enough'],
): { readonly state: SearchState; readonly rows: readonly DrawnCandidate[]; readonly ended: boolean } {
  const problem = nullProblem({ polytopes, rule: anything }, drawnLimit, 1)
  const rows: DrawnCandidate[] = []
  const { state: next, progress } = advance(problem, state ?? startState(problem, seed), count, {
    // On a small space draws bring nothing new for long: a piece must end all the same.
    proposals: enough ? undefined : 4 * count + 50,
    enough,
    observe: ({ form, classKey, plainHeights }) =>
      rows.push({ candidateKey: classKey, polytopeKey: form.key, heights: codeOfHeights(plainHeights()) }),
  })
  return { state: next, rows, ended: progress.done }
}
