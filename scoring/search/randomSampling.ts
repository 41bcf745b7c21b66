import type { Method } from './method.ts'
import { drawNull, nullLaw, proposalOf } from './sampling.ts'

/**
 * Independent draws by the null's law: what a search is compared with. Polytopes that the rule turns away stay
 * in: nobody selected the candidates.
 */
export const randomSampling: Method = {
  name: 'random',
  version: 1,
  description: `Independent random candidates. ${nullLaw.description}`,
  law: nullLaw,
  ignoresStarts: true,
  open(run) {
    return {
      step() {
        const polytope = run.stream.below(run.polytopeCount)
        run.judge(polytope, proposalOf(drawNull(run.form(polytope).polytope, run.stream)))
        if (run.stalled >= run.patience) run.end('space-exhausted')
      },
      state: () => null,
    }
  },
}
