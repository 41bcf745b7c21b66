import type { Method } from './method.ts'
import { nullLaws, stateOfLaw, usualNullLaw } from './nullLaws.ts'
import { nullLaw, proposalOf } from './sampling.ts'

/**
 * Independent draws by one of the null's laws: what a search is compared with. Polytopes that the rule turns away stay
 * in: nobody selected the candidates.
 */
export const randomSampling: Method = {
  name: 'random',
  version: 1,
  description: `Independent random candidates. ${nullLaw.description}`,
  law: nullLaw,
  ignoresStarts: true,
  open(run) {
    const law = run.settings.law ?? usualNullLaw
    const { draw } = nullLaws[law]
    return {
      step() {
        const polytope = run.stream.below(run.polytopeCount)
        run.judge(polytope, proposalOf(draw(run.form(polytope).polytope, run.stream)))
        if (run.stalled >= run.patience) run.end('space-exhausted')
      },
      state: () => stateOfLaw(law),
    }
  },
}
