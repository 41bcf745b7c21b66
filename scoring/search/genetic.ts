import { crossings } from './crossover.ts'
import { commonTriangles } from './likeness.ts'
import { compareMerits } from './merit.ts'
import type { Chain, Method, Proposal, Run } from './method.ts'
import { MoveBook } from './moveBook.ts'
import { moves } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import { promisingStart, promisingStep } from './promising.ts'
import { proposalOf } from './sampling.ts'
import { restoredStanding, storedStanding, type Standing, type StandingState } from './standing.ts'
import type { Start } from './givenStarts.ts'
import type { Json } from './state.ts'

/** Members of one population. */
const populationSize = 10
/** Evaluations, per population, between two migrations. */
const migrationInterval = 60
/** Members among which a parent, or the member that a child competes with, is drawn. */
const [parentTournament, rivalTournament] = [3, 5]
/** Share of newcomers, random candidates of any polytope of the scope: while a population fills up, and later; more
 * when nothing new is found. */
const [filling, newcomers] = [0.9, 0.03]

interface Member extends Standing {
  readonly key: string
}

interface GeneticState {
  readonly populations: readonly (readonly (StandingState & { readonly key: string })[])[]
  readonly migrations: number
  readonly moves: readonly number[]
  readonly book: string
}

/**
 * A genetic search over the heights of candidates. A few populations take turns; each child has one parent (an
 * exchange of one diagonal, noise on heights) or two (a blend of their heights, or each 2-face from one of them).
 * Niches: a class is in a population once, and a child competes with the member most like it of a few drawn
 * (Harik 1995), so that a population does not crowd into one place. The best is never lost, since members give way to better
 * ones only. At fixed numbers of evaluations the best of each population is copied to the next in a ring.
 */
export const genetic: Method = {
  name: 'genetic',
  version: 2,
  description:
    'Genetic search: populations of distinct classes with migration; children by blending heights, by taking each ' +
    '2-face from one of two parents, by exchanges of one diagonal and by noise.',
  open: (run, state) => new GeneticChain(run, state as unknown as GeneticState | null),
}

class GeneticChain implements Chain {
  private readonly book: PolytopeBook
  private readonly operators: MoveBook
  private readonly populations: Member[][]
  private migrations: number

  constructor(
    private readonly run: Run,
    state: GeneticState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    this.operators = new MoveBook(state?.moves ?? MoveBook.even(crossings.length + moves.length))
    this.migrations = state?.migrations ?? 0
    const count = Math.max(1, Math.min(4, Math.floor(run.budget / 300)))
    this.populations =
      state === null
        ? Array.from({ length: count }, () => [])
        : state.populations.map((members) =>
            members.map((member) => ({ ...restoredStanding(run, member), key: member.key })),
          )
  }

  state(): Json {
    const populations = this.populations.map((members) =>
      members.map((member) => ({ ...storedStanding(member), key: member.key })),
    )
    const { migrations } = this
    return {
      populations,
      migrations,
      moves: this.operators.state(),
      book: this.book.code(),
    } as unknown as Json
  }

  step(): void {
    const { run, book, populations } = this
    if (book.open === 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
      return
    }
    if (run.judgeStart()) return
    if (run.evaluations >= (this.migrations + 1) * migrationInterval * populations.length) this.migrate()
    const members = populations[run.proposals % populations.length]
    // Where a polytope has few classes a population never fills up; it breeds all the same.
    const stale = Math.min(0.5, run.stalled / 400)
    const share = members.length < this.size() ? filling : Math.max(newcomers, stale)
    const given = this.givenTo(members)
    if (given !== undefined) this.settle(members, given)
    else if (members.length === 0 || run.stream.uniform() < share) this.newcomer(members)
    else this.breed(members)
  }

  /** Members to begin with: fewer when the budget is small. */
  private size(): number {
    return Math.max(4, Math.min(populationSize, Math.floor(this.run.budget / (10 * this.populations.length))))
  }

  /** The given candidate with which a population goes on filling up: they are dealt out, the best first. */
  private givenTo(members: readonly Member[]): Start | undefined {
    const { populations, run, book } = this
    if (members.length >= this.size()) return undefined
    const nth = members.length * populations.length + (run.proposals % populations.length)
    const given = run.starts[nth] as Start | undefined
    if (given === undefined || book.isSpent(given.polytope)) return undefined
    return members.some(({ key }) => key === given.classKey) ? undefined : given
  }

  private settle(members: Member[], { polytope, place }: Start): void {
    this.judged(members, polytope, proposalOf(place()), () => worstOf(members), undefined)
  }

  /** A random candidate; it takes the place of the worst member when the population is full. */
  private newcomer(members: Member[]): void {
    const { run, book } = this
    const start = promisingStart(run, () => book.draw())
    if (start === null) return
    this.judged(members, start.polytope, proposalOf(start.place), () => worstOf(members), undefined)
  }

  private breed(members: Member[]): void {
    const { run, operators } = this
    const {
      kind,
      from: parent,
      proposal,
    } = promisingStep(run, () => {
      const kind = operators.draw(run.stream)
      const from = this.parent(members)
      return { from, kind, proposal: this.child(members, from, kind) }
    })
    const { place, polytope } = parent
    if (proposal === undefined || proposal.class === place.class) {
      run.look()
      operators.learn(kind, 0)
      this.book.stall(polytope)
      return
    }
    const { class: cls } = proposal
    const isGain = this.judged(members, polytope, proposal, () => this.rivalOf(members, cls), parent)
    operators.learn(kind, isGain ? 1 : 0)
  }

  /** A child by one of the operators; undefined when it needs a mate and there is none, or it leads nowhere. */
  private child(members: readonly Member[], parent: Member, kind: number): Proposal | undefined {
    const { stream } = this.run
    if (kind >= crossings.length) return moves[kind - crossings.length](parent.place, stream)
    const mates = members.filter((member) => member !== parent && member.polytope === parent.polytope)
    return mates.length === 0
      ? undefined
      : crossings[kind](parent.place, mates[stream.below(mates.length)].place, stream)
  }

  /** Judges a child and takes it in where it deserves it; true when it is new and better than its parent. */
  private judged(
    members: Member[],
    polytope: number,
    proposal: Proposal,
    rival: () => number,
    parent: Member | undefined,
  ): boolean {
    const { run, book } = this
    const judgement = run.judge(polytope, proposal)
    if (judgement?.isNew) book.found(polytope)
    else book.stall(polytope)
    if (judgement === null || members.some(({ key }) => key === judgement.key)) return false
    const at = members.length < this.size() ? members.length : rival()
    if (at === members.length || compareMerits(judgement.merit, members[at].merit) < 0) {
      const heights = proposal.heights()
      if (heights !== undefined) {
        const place = { class: proposal.class, heights }
        members[at] = { polytope, place, merit: judgement.merit, key: judgement.key }
        run.countAccepted()
      }
    }
    return judgement.isNew && parent !== undefined && compareMerits(judgement.merit, parent.merit) < 0
  }

  /** The best of a few members drawn. */
  private parent(members: readonly Member[]): Member {
    let best = members[this.run.stream.below(members.length)]
    for (let n = 1; n < parentTournament; n++) {
      const other = members[this.run.stream.below(members.length)]
      if (compareMerits(other.merit, best.merit) < 0) best = other
    }
    return best
  }

  /** The member most like the child among a few drawn; among equally like ones, the worst. */
  private rivalOf(members: readonly Member[], child: Proposal['class']): number {
    let rival = -1
    let likeness = -2
    for (let n = 0; n < rivalTournament; n++) {
      const at = this.run.stream.below(members.length)
      const common = commonTriangles(members[at].place.class, child)
      const isWorse = rival >= 0 && compareMerits(members[at].merit, members[rival].merit) > 0
      if (common > likeness || (common === likeness && isWorse)) {
        rival = at
        likeness = common
      }
    }
    return rival
  }

  /** The best of each population takes the place of the worst of the next, unless it is there. */
  private migrate(): void {
    const { populations } = this
    this.migrations++
    const best = populations.map((members) =>
      members.reduce((a, b) => (compareMerits(a.merit, b.merit) <= 0 ? a : b)),
    )
    for (const [n, emigrant] of best.entries()) {
      const members = populations[(n + 1) % populations.length]
      const at = worstOf(members)
      const isBetter = compareMerits(emigrant.merit, members[at].merit) < 0
      if (isBetter && !members.some(({ key }) => key === emigrant.key)) members[at] = emigrant
    }
  }
}

function worstOf(members: readonly Member[]): number {
  let worst = 0
  for (let n = 1; n < members.length; n++)
    if (compareMerits(members[n].merit, members[worst].merit) > 0) worst = n
  return worst
}
