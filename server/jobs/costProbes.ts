import { RecentResults } from '../services/recentResults.ts'
import type { ComputePool } from './computePool.ts'
import type { ScoredScope, SearchProblem } from './searchProblem.ts'

/** What an evaluation takes on one thread. */
export interface MeasuredCost {
  readonly millisecondsEach: number
  /** Evaluations that were timed. */
  readonly timed: number
}

/** Where a probe ends: enough evaluations for a mean, or enough of everybody's time. */
const [enough, milliseconds] = [300, 1_500]

/** Work of one piece: previews and dossiers get their turn in between. */
const pieceMilliseconds = 100

/** Methods that would count before they score, or go over to others: what they do in the end is like annealing. */
const probedBy = (method: string): string =>
  method === 'auto' || method === 'exhaustive' ? 'annealing' : method

/**
 * Times a few evaluations of a rule over a scope, by running the first steps of a search that is thrown away. The
 * first one, which builds a polytope and warms the code up, is not counted.
 */
export class CostProbes {
  readonly #pool: ComputePool
  readonly #measured = new RecentResults<MeasuredCost>(300)

  constructor(pool: ComputePool) {
    this.#pool = pool
  }

  /**
   * @param address of scope and rule: what was measured there holds while the server runs
   * @throws Refusal for what the method refuses, such as a scope that is too wide for it
   */
  measure(address: string, scope: () => Promise<ScoredScope>, method: string): Promise<MeasuredCost> {
    const probed = probedBy(method)
    return this.#measured.get(`${address} ${probed}`, async () => this.#probe(await scope(), probed))
  }

  async #probe(scope: ScoredScope, method: string): Promise<MeasuredCost> {
    const settings = { budget: 2_000, islands: 1, keep: 1, surrogate: false }
    const problem: SearchProblem = {
      ...scope,
      method,
      seed: 1,
      island: 0,
      settings,
      starts: '[]',
      extensions: [],
    }
    const run = (state: string | null, evaluations: number) =>
      this.#pool.run('search-segment', { problem, state, evaluations, milliseconds: pieceMilliseconds })
    const first = await run(null, 1)
    let { state, done } = first
    let evaluations = first.progress.evaluations
    let [timed, spent] = [0, 0]
    while (!done && timed < enough && spent < milliseconds) {
      const output = await run(state, enough)
      const made = output.progress.evaluations - evaluations
      ;({ state, done } = output)
      evaluations = output.progress.evaluations
      timed += made
      spent += output.milliseconds
    }
    // A scope of one class has no second evaluation.
    return timed > 0
      ? { millisecondsEach: spent / timed, timed }
      : { millisecondsEach: first.milliseconds, timed: 1 }
  }
}
