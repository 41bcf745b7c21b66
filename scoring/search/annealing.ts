import { circuits } from '../geometry/circuits.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { InvariantError } from '../errors.ts'
import { isAccepted, type Temperatures } from './acceptance.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import { feasibleKind, undefinedKind, type Merit } from './merit.ts'
import type { Chain, Method, Proposal, Run } from './method.ts'
import { propose } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import type { PlacedHeights } from './sampling.ts'
import { proposalOf, startHeights } from './sampling.ts'
import type { Json } from './state.ts'

export const tuning = {
  calibration: 16,
  hot: 1,
  cold: 0.02,
  hop: 0.2,
  reheat: 0,
}

interface AnnealingState {
  polytope: number
  heights: string
  kind: number
  value: number
  /** Calibration: losses seen so far. */
  losses: number[]
  shortfalls: number[]
  calibrated: number
  book: string
}

export const annealing: Method = {
  name: 'annealing',
  description: 'Simulated annealing over heights.',
  open: (run, state) => new Annealing(run, state as unknown as AnnealingState | null),
}

class Annealing implements Chain {
  private polytope = -1
  private place: PlacedHeights | undefined
  private merit: Merit = { kind: undefinedKind, value: 0 }
  private losses: number[] = []
  private shortfalls: number[] = []
  private calibrated = 0
  private readonly book: PolytopeBook

  constructor(
    private readonly run: Run,
    state: AnnealingState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    if (state === null) return
    this.polytope = state.polytope
    this.merit = { kind: state.kind, value: state.value }
    this.losses = [...state.losses]
    this.shortfalls = [...state.shortfalls]
    this.calibrated = state.calibrated
    if (state.polytope >= 0) {
      const heights = heightsOfCode(state.heights)
      const cls = fineClass(run.form(state.polytope).polytope, heights)
      if (cls === undefined) throw new InvariantError('The heights stored in a state are not fine.')
      this.place = { class: cls, heights }
    }
  }

  state(): Json {
    return {
      polytope: this.polytope,
      heights: this.place === undefined ? '' : codeOfHeights(this.place.heights),
      kind: this.merit.kind,
      value: this.merit.value,
      losses: this.losses,
      shortfalls: this.shortfalls,
      calibrated: this.calibrated,
      book: this.book.code(),
    }
  }

  step(): void {
    const { run } = this
    const { stream } = run
    const hops = run.polytopeCount > 1
    const place = this.place
    if (
      place === undefined ||
      (hops && (stream.uniform() < tuning.hop || this.book.isSpent(this.polytope)))
    ) {
      this.enter(place === undefined)
      return
    }
    if (circuits(place.class).count === 0) {
      this.book.spend(this.polytope)
      this.finish()
      return
    }
    const next = propose(place, stream)
    if (next === undefined || next.class === place.class) {
      const heights = next?.heights()
      if (heights !== undefined) this.place = { class: place.class, heights }
      this.stall(this.polytope)
      return
    }
    this.consider(this.polytope, next)
  }

  private consider(polytope: number, next: Proposal, forced = false): void {
    const { run } = this
    const judged = run.judge(polytope, next)
    if (judged?.isNew) this.book.found(polytope)
    else this.stall(polytope)
    if (judged === null) return
    if (!forced && !this.accepts(judged.merit)) return
    const heights = next.heights()
    if (heights === undefined) return
    this.polytope = polytope
    this.place = { class: next.class, heights }
    this.merit = judged.merit
    if (!forced) run.countAccepted()
  }

  private enter(first: boolean): void {
    const { run } = this
    const polytope = this.book.draw()
    if (polytope < 0) {
      this.finish()
      return
    }
    const forced = first || this.book.isSpent(this.polytope)
    if (forced && !first) run.countRestart()
    const start = startHeights(run.form(polytope).polytope, run.stream)
    this.consider(polytope, proposalOf(start), forced)
  }

  private accepts(merit: Merit): boolean {
    const { run, merit: current } = this
    if (this.calibrated < tuning.calibration) {
      this.calibrated++
      if (merit.kind === current.kind && merit.value !== current.value) {
        const difference = Math.abs(merit.value - current.value)
        if (merit.kind === feasibleKind) this.losses.push(difference)
        else this.shortfalls.push(difference)
      }
    }
    return isAccepted(current, merit, this.temperatures(), run.stream.uniform())
  }

  private progress(): number {
    return Math.min(1, this.run.evaluations / this.run.budget)
  }

  private temperatures(): Temperatures {
    const heat = tuning.reheat === 0 ? 1 : 2 ** Math.min(20, this.run.stalled / tuning.reheat)
    const cooling = heat * tuning.hot * (tuning.cold / tuning.hot) ** this.progress()
    return { score: medianOr(this.losses, 1) * cooling, shortfall: medianOr(this.shortfalls, 0.3) * cooling }
  }

  private stall(polytope: number): void {
    this.book.stall(polytope)
    this.finish()
  }

  private finish(): void {
    if (this.book.open > 0) return
    this.run.end(this.book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
  }
}

function medianOr(values: readonly number[], otherwise: number): number {
  if (values.length === 0) return otherwise
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[sorted.length >> 1]
}
