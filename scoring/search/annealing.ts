import { circuits } from '../geometry/circuits.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { InvariantError } from '../errors.ts'
import { isAccepted, type Temperatures } from './acceptance.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import { feasibleKind, undefinedKind, type Merit } from './merit.ts'
import type { Chain, Method, Run } from './method.ts'
import { propose } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import type { PlacedHeights } from './sampling.ts'
import { startHeights } from './sampling.ts'
import type { Json } from './state.ts'

export const tuning = {
  calibration: 16,
  hot: 1,
  cold: 0.02,
  hop: 0.2,
  flips: 0.6,
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
    const next = propose(place, stream, this.progress())
    if (next === undefined || next.class === place.class) {
      if (next !== undefined) this.place = next
      this.stall()
      return
    }
    const judged = run.judge(this.polytope, next.class, next.heights)
    if (judged.isNew) this.book.found(this.polytope)
    else this.stall()
    this.decide(this.polytope, next, judged.merit)
  }

  private enter(first: boolean): void {
    const { run } = this
    const polytope = this.book.draw()
    if (polytope < 0) {
      this.finish()
      return
    }
    const next = startHeights(run.form(polytope).polytope, run.stream)
    const judged = run.judge(polytope, next.class, next.heights)
    if (judged.isNew) this.book.found(polytope)
    else this.book.stall(polytope)
    if (first || this.book.isSpent(this.polytope)) {
      if (!first) run.countRestart()
      this.polytope = polytope
      this.place = next
      this.merit = judged.merit
    } else this.decide(polytope, next, judged.merit)
  }

  private decide(polytope: number, next: PlacedHeights, merit: Merit): void {
    const { run, merit: current } = this
    const calibrating = this.calibrated < tuning.calibration
    if (calibrating) {
      this.calibrated++
      if (merit.kind === current.kind && merit.value !== current.value) {
        const difference = Math.abs(merit.value - current.value)
        if (merit.kind === feasibleKind) this.losses.push(difference)
        else this.shortfalls.push(difference)
      }
    }
    if (isAccepted(current, merit, this.temperatures(), run.stream.uniform())) {
      this.polytope = polytope
      this.place = next
      this.merit = merit
      run.countAccepted()
    }
  }

  private progress(): number {
    return Math.min(1, this.run.evaluations / this.run.budget)
  }

  private temperatures(): Temperatures {
    const cooling = tuning.hot * (tuning.cold / tuning.hot) ** this.progress()
    return { score: medianOr(this.losses, 1) * cooling, shortfall: medianOr(this.shortfalls, 0.3) * cooling }
  }

  private stall(): void {
    this.book.stall(this.polytope)
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
