import { circuits } from '../geometry/circuits.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { InvariantError } from '../errors.ts'
import { isAccepted } from './acceptance.ts'
import { Cooling, type CoolingState } from './cooling.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import { compareMerits, undefinedKind, type Merit } from './merit.ts'
import type { Chain, Judgement, Method, Proposal, Run } from './method.ts'
import { MoveBook } from './moveBook.ts'
import { exchangeCount, firstWorths, moves } from './moves.ts'
import { hasFewNeighbours, Neighbourhoods, type NeighbourhoodsState } from './neighbourhoods.ts'
import { PolytopeBook } from './polytopeBook.ts'
import type { Start } from './givenStarts.ts'
import { promisingStart, promisingStep } from './promising.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'
import type { Json } from './state.ts'

/** A descent begins at the best of so many random candidates, but with no more than a twentieth of its budget. */
const scouts = 6

/**
 * A descent begins anew when its best has stood for so many evaluations and for so large a part of its budget: a
 * valley that has not been left by then is better left by a fresh start.
 */
const [leastIdle, idleShare] = [25, 0.2]
/** The same share where neighbours are tried one by one. */
const idleShareOfFew = 0.3

/** Share of hops to another polytope at the beginning and at the end of a descent. */
const [hopsFirst, hopsLast] = [0.3, 0.06]

const nothing: Merit = { kind: undefinedKind, value: 0 }

interface AnnealingState {
  readonly descent: number
  /** Random candidates that the descent has looked at. */
  readonly scouted: number
  readonly cooling: CoolingState
  readonly moves: readonly number[]
  readonly book: string
  readonly neighbourhoods: NeighbourhoodsState
  /** The best since the latest start, and the evaluations used when it was found. */
  readonly best: Merit
  readonly bestAt: number
  /** Where the chain stands; null before its first start. */
  readonly place: {
    readonly polytope: number
    readonly heights: string
    readonly kind: number
    readonly value: number
  } | null
}

/**
 * Simulated annealing (Kirkpatrick, Gelatt, Vecchi 1983) over the heights of one polytope, with hops between
 * polytopes where the scope has several. Candidates are compared in the full order of outcomes, so that a chain
 * finds its way from infeasible candidates to feasible ones. A run consists of one or more descents, each from a
 * fresh start with its share of the budget; an extension brings as many further ones. A descent that
 * has found nothing better for long begins anew on the same polytope. On one polytope where classes have few
 * neighbours, all neighbours of the best classes are tried instead of random ones (`Neighbourhoods`).
 */
export const annealing: Method = {
  name: 'annealing',
  version: 4,
  description:
    'Simulated annealing over heights: exchanges of one diagonal, noise on points, 2-faces or everywhere, ' +
    'changes of the whole shape, hops between polytopes; where classes have few neighbours, all those of the best classes.',
  open: (run, state) => new AnnealingChain(run, state as unknown as AnnealingState | null),
}

class AnnealingChain implements Chain {
  private readonly book: PolytopeBook
  private readonly cooling: Cooling
  private readonly moveBook: MoveBook
  private readonly neighbourhoods: Neighbourhoods
  private descent: number
  private scouted: number
  private polytope = -1
  private place: PlacedHeights | undefined
  private merit: Merit = nothing
  private best: Merit
  private bestAt: number

  constructor(
    private readonly run: Run,
    state: AnnealingState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    this.cooling = new Cooling(state?.cooling)
    this.moveBook = new MoveBook(state?.moves ?? firstWorths)
    this.neighbourhoods = new Neighbourhoods(run, 0, state?.neighbourhoods)
    this.descent = state?.descent ?? 0
    this.scouted = state?.scouted ?? 0
    this.best = state?.best ?? nothing
    this.bestAt = state?.bestAt ?? 0
    if (state === null || state.place === null) return
    const { polytope, heights, kind, value } = state.place
    const restored = heightsOfCode(heights)
    const cls = fineClass(run.form(polytope).polytope, restored)
    if (cls === undefined) throw new InvariantError('The heights stored in a state are not fine.')
    this.polytope = polytope
    this.place = { class: cls, heights: restored }
    this.merit = { kind, value }
  }

  state(): Json {
    const { polytope, place, merit } = this
    const state: AnnealingState = {
      descent: this.descent,
      scouted: this.scouted,
      cooling: this.cooling.state(),
      moves: this.moveBook.state(),
      book: this.book.code(),
      neighbourhoods: this.neighbourhoods.state(),
      best: this.best,
      bestAt: this.bestAt,
      place: place === undefined ? null : { polytope, heights: codeOfHeights(place.heights), ...merit },
    }
    return state as unknown as Json
  }

  step(): void {
    const { run, book, place } = this
    if (book.open === 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
    } else if (run.judgeStart()) {
      return
    } else if (place === undefined || this.nextDescent() || book.isSpent(this.polytope)) {
      this.begin(() => book.draw())
    } else if (this.isIdle(place)) {
      this.begin(() => this.polytope)
    } else if (this.scouted < Math.min(scouts, this.descentLength() / 20)) {
      this.scouted++
      this.hop(true)
    } else if (run.polytopeCount > 1 && run.stream.uniform() < this.hopShare()) {
      this.hop(false)
    } else if (!this.tryNeighbour(place)) {
      this.move(place)
    }
  }

  /** A fresh start on a polytope, or on the given candidate whose turn it is. */
  private begin(draw: () => number): void {
    const { run, book } = this
    const turn = run.starts[this.descent] as Start | undefined
    const given = turn && !book.isSpent(turn.polytope) ? turn : undefined
    const start = given ? { polytope: given.polytope, place: given.place() } : promisingStart(run, draw)
    if (start === null) return
    if (this.place !== undefined) run.countRestart()
    this.scouted = given === undefined ? 1 : scouts
    this.best = nothing
    this.bestAt = run.evaluations
    this.neighbourhoods.beginAnew()
    const merit = this.judged(start.polytope, proposalOf(start.place))
    if (merit !== null) this.stand(start.polytope, start.place, merit)
  }

  /** A random candidate on a polytope drawn from the open ones. */
  private hop(onlyBetter: boolean): void {
    const start = promisingStart(this.run, () => this.book.draw())
    if (start === null) return
    const merit = this.judged(start.polytope, proposalOf(start.place))
    if (merit === null) return
    const accepted = onlyBetter ? compareMerits(merit, this.merit) < 0 : this.accepts(merit)
    if (accepted) this.stand(start.polytope, start.place, merit)
  }

  /** Judges the next neighbour of the best classes; false where they have too many, or all have been tried. */
  private tryNeighbour(place: PlacedHeights): boolean {
    const proposal = this.hasFewNeighbours(place) ? this.neighbourhoods.next() : undefined
    if (proposal === undefined) return false
    this.judged(this.polytope, proposal)
    return true
  }

  private hasFewNeighbours(place: PlacedHeights): boolean {
    return this.run.polytopeCount === 1 && hasFewNeighbours(place.class, this.descentLength())
  }

  private move(place: PlacedHeights): void {
    const { run, book, polytope } = this
    // Without circuits there is nothing to choose: the polytope has one class.
    if (circuits(place.class).count === 0) {
      book.spend(polytope)
      return
    }
    const { kind, proposal } = promisingStep(run, () => {
      const kind = this.moveBook.draw(run.stream)
      return { from: { polytope, place }, kind, proposal: moves[kind](place, run.stream) }
    })
    if (proposal === undefined || proposal.class === place.class) {
      const heights = proposal?.heights()
      if (heights !== undefined) this.place = { class: place.class, heights }
      book.stall(polytope)
      this.moveBook.learn(kind, 0)
      return
    }
    const before = run.evaluations
    const merit = this.judged(polytope, proposal)
    // Only what is new is worth something: going back and forth between two classes must not look like a climb.
    const isNew = run.evaluations > before
    this.moveBook.learn(kind, merit !== null && isNew ? this.cooling.gain(this.merit, merit) : 0)
    if (merit === null) return
    this.cooling.learn(this.merit, merit)
    if (!this.accepts(merit)) return
    const heights = proposal.heights()
    if (heights !== undefined) this.stand(polytope, { class: proposal.class, heights }, merit)
  }

  private judged(polytope: number, proposal: Proposal): Merit | null {
    const judgement = this.run.judge(polytope, proposal)
    if (judgement?.isNew) this.book.found(polytope)
    else this.book.stall(polytope)
    this.remember(judgement, proposal)
    if (judgement !== null && compareMerits(judgement.merit, this.best) < 0) {
      this.best = judgement.merit
      this.bestAt = this.run.evaluations
    }
    return judgement?.merit ?? null
  }

  /** Where neighbours are tried one by one, a class waits for its turn. */
  private remember(judgement: Judgement | null, proposal: Proposal): void {
    if (judgement === null || this.run.polytopeCount > 1) return
    const { class: cls } = this.place ?? proposal
    if (hasFewNeighbours(cls, this.descentLength())) this.neighbourhoods.enter(judgement, proposal)
  }

  private isIdle(place: PlacedHeights): boolean {
    const idle = this.run.evaluations - this.bestAt
    const share = this.hasFewNeighbours(place) ? idleShareOfFew : idleShare
    return idle >= leastIdle && idle >= share * this.descentLength()
  }

  private accepts(merit: Merit): boolean {
    const stall = this.place === undefined ? 0 : this.run.stalled / (30 + exchangeCount(this.place.class))
    const temperatures = this.cooling.temperatures(this.progress(), stall)
    return isAccepted(this.merit, merit, temperatures, this.run.stream.uniform())
  }

  private stand(polytope: number, place: PlacedHeights, merit: Merit): void {
    this.polytope = polytope
    this.place = place
    this.merit = merit
    this.run.countAccepted()
  }

  private descentLength(): number {
    return this.run.stage.budget / this.run.descents
  }

  /** True when the evaluations used have reached the next descent, which then begins. */
  private nextDescent(): boolean {
    const { descents, stage } = this.run
    const nth = Math.min(descents - 1, Math.floor(this.stageEvaluations() / this.descentLength()))
    const descent = stage.number * descents + nth
    if (descent === this.descent) return false
    this.descent = descent
    return true
  }

  private progress(): number {
    const { descents, stage } = this.run
    return this.stageEvaluations() / this.descentLength() - (this.descent - stage.number * descents)
  }

  private stageEvaluations(): number {
    return this.run.evaluations - this.run.stage.begun
  }

  private hopShare(): number {
    return hopsFirst + (hopsLast - hopsFirst) * Math.min(1, this.progress())
  }
}
