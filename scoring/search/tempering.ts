import { isAccepted } from './acceptance.ts'
import { Cooling, type CoolingState } from './cooling.ts'
import { compareMerits, feasibleKind, undefinedKind, type Merit } from './merit.ts'
import type { Chain, Method, Proposal, Run } from './method.ts'
import { MoveBook } from './moveBook.ts'
import { moves } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import { promisingStart, promisingStep } from './promising.ts'
import { proposalOf } from './sampling.ts'
import { restoredStanding, storedStanding, type Standing, type StandingState } from './standing.ts'
import type { Json } from './state.ts'

/** Temperatures of the replicas, the coldest first, in units of the median difference between neighbours. */
const ladder = [0.03, 0.08, 0.2, 0.5] as const

/** Proposals of each replica between two rounds of exchanges. */
const sweep = 5

/** The replicas begin at the best of so many random candidates, but of no more than a twentieth of the budget. */
const scouts = 12

/** Share of hops to another polytope where the scope has several, per replica: the hot ones look around. */
const hops = [0.02, 0.05, 0.1, 0.3] as const

interface TemperingState {
  /** The coldest first; null: not begun. */
  readonly replicas: readonly (StandingState | null)[]
  readonly cooling: CoolingState
  /** Worth of the moves, per replica. */
  readonly moves: readonly (readonly number[])[]
  readonly sweeps: number
  readonly book: string
}

/**
 * Parallel tempering (Swendsen, Wang 1986; Geyer 1991): copies of a chain at fixed temperatures take turns, and
 * neighbours exchange their places with probability min(1, exp((1/T_cold - 1/T_hot) (score_hot - score_cold))).
 * Hot replicas cross valleys, cold ones climb. No schedule has to fit the budget.
 */
export const tempering: Method = {
  name: 'tempering',
  version: 2,
  description:
    'Parallel tempering over heights: four chains at fixed temperatures that exchange their places; the moves of annealing.',
  open: (run, state) => new TemperingChain(run, state as unknown as TemperingState | null),
}

class TemperingChain implements Chain {
  private readonly book: PolytopeBook
  private readonly cooling: Cooling
  private readonly moveBooks: readonly MoveBook[]
  private readonly replicas: (Standing | null)[]
  private sweeps: number

  constructor(
    private readonly run: Run,
    state: TemperingState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    this.cooling = new Cooling(state?.cooling)
    this.moveBooks = ladder.map((_, r) => new MoveBook(state?.moves[r] ?? MoveBook.even(moves.length)))
    this.sweeps = state?.sweeps ?? 0
    this.replicas = ladder.map((_, r) => {
      const stored = state?.replicas[r] ?? null
      return stored === null ? null : restoredStanding(run, stored)
    })
  }

  state(): Json {
    const state: TemperingState = {
      replicas: this.replicas.map((standing) => standing && storedStanding(standing)),
      cooling: this.cooling.state(),
      moves: this.moveBooks.map((book) => book.state()),
      sweeps: this.sweeps,
      book: this.book.code(),
    }
    return state as unknown as Json
  }

  step(): void {
    const { run, book } = this
    if (book.open === 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
      return
    }
    if (run.judgeStart()) return
    if (run.starts.length === 0 && run.evaluations < Math.min(scouts, run.budget / 20)) {
      this.scout()
      return
    }
    if (run.proposals >= (this.sweeps + 1) * sweep * ladder.length) this.exchangePlaces()
    const r = run.proposals % ladder.length
    const standing = this.replicas[r]
    const isHop = run.polytopeCount > 1 && run.stream.uniform() < hops[r]
    if (standing === null || isHop || book.isSpent(standing.polytope)) this.hop(r)
    else this.move(r, standing)
  }

  /** A random candidate; the best of them are the replicas' first places, the best of all the coldest one's. */
  private scout(): void {
    const start = promisingStart(this.run, () => this.book.draw())
    if (start === null) return
    const merit = this.judged(start.polytope, proposalOf(start.place))
    if (merit === null) return
    const places = this.replicas.filter((standing) => standing !== null)
    places.push({ ...start, merit })
    places.sort((a, b) => compareMerits(a.merit, b.merit))
    for (const r of this.replicas.keys()) this.replicas[r] = places.at(r) ?? null
  }

  /** A random candidate on a polytope drawn from the open ones: a fresh start, or a proposal like any other. */
  private hop(r: number): void {
    const standing = this.replicas[r]
    const { starts } = this.run
    // Replicas begin from the given candidates, the coldest from the best.
    const turn = standing === null && starts.length > 0 ? starts[r % starts.length] : undefined
    const given = turn && !this.book.isSpent(turn.polytope) ? turn : undefined
    const start = given
      ? { polytope: given.polytope, place: given.place() }
      : promisingStart(this.run, () => this.book.draw())
    if (start === null) return
    const merit = this.judged(start.polytope, proposalOf(start.place))
    if (merit === null) return
    if (standing === null || this.book.isSpent(standing.polytope) || this.accepts(r, standing.merit, merit))
      this.stand(r, { ...start, merit })
  }

  private move(r: number, standing: Standing): void {
    const { run, book, cooling } = this
    const moveBook = this.moveBooks[r]
    const { kind, proposal } = promisingStep(run, () => {
      const kind = moveBook.draw(run.stream)
      return { from: standing, kind, proposal: moves[kind](standing.place, run.stream) }
    })
    if (proposal === undefined || proposal.class === standing.place.class) {
      run.look()
      const heights = proposal?.heights()
      if (heights !== undefined)
        this.replicas[r] = { ...standing, place: { class: standing.place.class, heights } }
      book.stall(standing.polytope)
      moveBook.learn(kind, 0)
      return
    }
    const before = run.evaluations
    const merit = this.judged(standing.polytope, proposal)
    const isNew = run.evaluations > before
    moveBook.learn(kind, merit !== null && isNew ? cooling.gain(standing.merit, merit) : 0)
    if (merit === null) return
    cooling.learn(standing.merit, merit)
    if (!this.accepts(r, standing.merit, merit)) return
    const heights = proposal.heights()
    if (heights !== undefined)
      this.stand(r, { polytope: standing.polytope, place: { class: proposal.class, heights }, merit })
  }

  private judged(polytope: number, proposal: Proposal): Merit | null {
    const judgement = this.run.judge(polytope, proposal)
    if (judgement?.isNew) this.book.found(polytope)
    else this.book.stall(polytope)
    return judgement?.merit ?? null
  }

  private accepts(r: number, current: Merit, proposed: Merit): boolean {
    return isAccepted(current, proposed, this.cooling.at(ladder[r]), this.run.stream.uniform())
  }

  private stand(r: number, standing: Standing): void {
    this.replicas[r] = standing
    this.run.countAccepted()
  }

  /** Neighbours on the ladder, every second pair in turn. */
  private exchangePlaces(): void {
    for (let r = this.sweeps++ % 2; r + 1 < ladder.length; r += 2) {
      const [cold, hot] = [this.replicas[r], this.replicas[r + 1]]
      if (cold === null || hot === null) continue
      const draw = this.run.stream.uniform()
      if (draw >= this.exchangeProbability(r, cold.merit, hot.merit)) continue
      this.replicas[r] = hot
      this.replicas[r + 1] = cold
    }
  }

  /** Between kinds of candidates the better one always goes to the colder replica. */
  private exchangeProbability(r: number, cold: Merit, hot: Merit): number {
    if (cold.kind !== hot.kind) return hot.kind > cold.kind ? 1 : 0
    if (cold.kind === undefinedKind) return 1
    const of = cold.kind === feasibleKind ? 'score' : 'shortfall'
    const slope = 1 / this.cooling.at(ladder[r])[of] - 1 / this.cooling.at(ladder[r + 1])[of]
    return Math.exp(slope * (hot.value - cold.value))
  }
}
