import { circuits } from '../geometry/circuits.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { InvariantError } from '../errors.ts'
import { isAccepted } from './acceptance.ts'
import { Cooling, type CoolingState } from './cooling.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import { undefinedKind, type Merit } from './merit.ts'
import type { Chain, Method, Proposal, Run } from './method.ts'
import { exchangeCount, randomMove } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import { drawNull, proposalOf, type PlacedHeights } from './sampling.ts'
import type { Json } from './state.ts'

/** Moves at the beginning of a descent that are taken whatever they bring. */
const freeMoves = 16

/** Share of hops to another polytope at the beginning and at the end of a descent. */
const [hopsFirst, hopsLast] = [0.3, 0.06]

interface AnnealingState {
  readonly descent: number
  readonly freeMoves: number
  readonly cooling: CoolingState
  readonly book: string
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
 * fresh start with its share of the budget.
 */
export const annealing: Method = {
  name: 'annealing',
  description:
    'Simulated annealing over heights: exchanges of one diagonal, noise on a 2-face, a point or all points, hops between polytopes.',
  open: (run, state) => new AnnealingChain(run, state as unknown as AnnealingState | null),
}

class AnnealingChain implements Chain {
  private readonly book: PolytopeBook
  private readonly cooling: Cooling
  private descent: number
  private freeMoves: number
  private polytope = -1
  private place: PlacedHeights | undefined
  private merit: Merit = { kind: undefinedKind, value: 0 }

  constructor(
    private readonly run: Run,
    state: AnnealingState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    this.cooling = new Cooling(state?.cooling)
    this.descent = state?.descent ?? 0
    this.freeMoves = state?.freeMoves ?? 0
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
      freeMoves: this.freeMoves,
      cooling: this.cooling.state(),
      book: this.book.code(),
      place: place === undefined ? null : { polytope, heights: codeOfHeights(place.heights), ...merit },
    }
    return state as unknown as Json
  }

  step(): void {
    const { run, book, place } = this
    if (book.open === 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
    } else if (place === undefined || this.nextDescent() || book.isSpent(this.polytope)) {
      this.begin()
    } else if (run.polytopeCount > 1 && run.stream.uniform() < this.hopShare()) {
      const polytope = book.draw()
      if (polytope >= 0) this.hop(polytope)
    } else {
      this.move(place)
    }
  }

  /** A fresh start on a polytope drawn from the open ones. */
  private begin(): void {
    const { run, book } = this
    const polytope = book.draw()
    if (polytope < 0) return
    if (this.place !== undefined) run.countRestart()
    this.freeMoves = 0
    const start = drawNull(run.form(polytope).polytope, run.stream)
    const merit = this.judged(polytope, proposalOf(start))
    if (merit !== null) this.stand(polytope, start, merit)
  }

  private hop(polytope: number): void {
    const start = drawNull(this.run.form(polytope).polytope, this.run.stream)
    const merit = this.judged(polytope, proposalOf(start))
    if (merit !== null && this.accepts(merit)) this.stand(polytope, start, merit)
  }

  private move(place: PlacedHeights): void {
    const { run, book, polytope } = this
    // Without circuits there is nothing to choose: the polytope has one class.
    if (circuits(place.class).count === 0) {
      book.spend(polytope)
      return
    }
    const proposal = randomMove(place, run.stream)
    if (proposal === undefined || proposal.class === place.class) {
      const heights = proposal?.heights()
      if (heights !== undefined) this.place = { class: place.class, heights }
      book.stall(polytope)
      return
    }
    const merit = this.judged(polytope, proposal)
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
    return judgement?.merit ?? null
  }

  private accepts(merit: Merit): boolean {
    if (this.freeMoves < Math.min(freeMoves, this.descentLength() / 10)) {
      this.freeMoves++
      return true
    }
    const stall = this.place === undefined ? 0 : this.run.stalled / (30 + exchangeCount(this.place))
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
    return this.run.budget / this.run.descents
  }

  /** True when the evaluations used have reached the next descent, which then begins. */
  private nextDescent(): boolean {
    const descent = Math.min(this.run.descents - 1, Math.floor(this.run.evaluations / this.descentLength()))
    if (descent === this.descent) return false
    this.descent = descent
    return true
  }

  private progress(): number {
    return this.run.evaluations / this.descentLength() - this.descent
  }

  private hopShare(): number {
    return hopsFirst + (hopsLast - hopsFirst) * Math.min(1, this.progress())
  }
}
