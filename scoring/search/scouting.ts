import { base64Of, bytesOf } from './base64.ts'
import { compareMerits, type Merit } from './merit.ts'
import type { Run } from './method.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'
import { drawStart } from './starts.ts'

export interface ScoutingState {
  /** Per polytope: kind and value of its best candidate so far, as little-endian bytes in base64. */
  readonly kinds: string
  readonly values: string
  /** Polytopes that the present round still has to draw from; null in the first, which draws untried ones. */
  readonly survivors: readonly number[] | null
  /** Number of polytopes in the present round; 0 in the first. */
  readonly roundSize: number
  /** Draws made. */
  readonly draws: number
  readonly done: boolean
}

const [untried, refused] = [0, 254]

/**
 * Finds out on which polytopes of a scope the rule does well, by successive halving (Karnin, Koren, Somekh 2013):
 * a random candidate on each polytope, drawn in random order; then one more on each of the better half, and so on,
 * until few enough are left or the draws are used up. A polytope is as good as its best candidate.
 */
export class Scouting {
  private readonly kinds: Uint8Array
  private readonly values: Float64Array
  private survivors: number[] | null
  private roundSize: number
  private draws: number
  private isDone: boolean

  /**
   * @param allowance number of draws
   * @param few number of polytopes at which it ends
   */
  constructor(
    private readonly run: Run,
    private readonly allowance: number,
    private readonly few: number,
    state: ScoutingState | null,
  ) {
    const { polytopeCount } = run
    this.kinds = state === null ? new Uint8Array(polytopeCount) : bytesOf(state.kinds)
    this.values =
      state === null ? new Float64Array(polytopeCount) : new Float64Array(bytesOf(state.values).buffer)
    this.survivors = state?.survivors ? [...state.survivors] : null
    this.roundSize = state?.roundSize ?? 0
    this.draws = state?.draws ?? 0
    this.isDone = state?.done ?? false
  }

  state(): ScoutingState {
    return {
      kinds: base64Of(this.kinds),
      values: base64Of(new Uint8Array(this.values.buffer)),
      survivors: this.survivors && [...this.survivors],
      roundSize: this.roundSize,
      draws: this.draws,
      done: this.isDone,
    }
  }

  get done(): boolean {
    return this.isDone
  }

  /** Counts a candidate that is known already as one on its polytope. */
  learn(polytope: number, merit: Merit): void {
    if (this.kinds[polytope] === untried || compareMerits(merit, this.meritOf(polytope)) < 0) {
      this.kinds[polytope] = merit.kind
      this.values[polytope] = merit.value
    }
  }

  /** Draws one candidate, or finds that a polytope is refused. */
  step(): void {
    const start = this.drawn()
    if (start === null) {
      this.halve()
    } else if (start.place === undefined) {
      this.kinds[start.polytope] = refused
      this.run.look()
    } else {
      const { polytope, place } = start
      this.draws++
      const merit = this.run.judge(polytope, proposalOf(place))?.merit
      if (merit !== undefined) this.learn(polytope, merit)
    }
  }

  /**
   * A random candidate on the polytope whose turn it is; without one where the rule refuses the polytope. Null when
   * the round is over. In the first round, and among the candidates of one polytope, a surrogate has a say.
   */
  private drawn(): { readonly polytope: number; readonly place?: PlacedHeights } | null {
    const { run, survivors } = this
    const survivor = survivors === null ? undefined : (survivors.pop() ?? -1)
    return run.choose(
      () => {
        const polytope = survivor ?? this.drawUntried()
        if (polytope < 0) return null
        if (!run.polytopePasses(polytope)) return { polytope }
        return { polytope, place: drawStart(run.form(polytope).polytope, run.stream) }
      },
      (start) => (start?.place === undefined ? null : { polytope: start.polytope, class: start.place.class }),
    )
  }

  /** Polytopes that were tried, the best first; after them those that were not, in the order of the scope. */
  ranking(): number[] {
    const tried = this.tried()
    const others = [...this.kinds.keys()].filter((polytope) => this.kinds[polytope] === untried)
    return [...tried, ...others]
  }

  private tried(): number[] {
    return [...this.kinds.keys()]
      .filter((polytope) => this.kinds[polytope] !== untried && this.kinds[polytope] !== refused)
      .sort((a, b) => compareMerits(this.meritOf(a), this.meritOf(b)) || a - b)
  }

  private meritOf(polytope: number): Merit {
    return { kind: this.kinds[polytope], value: this.values[polytope] }
  }

  /** An untried polytope, uniformly; -1 when there is none, or the draws are used up. */
  private drawUntried(): number {
    let count = 0
    for (const kind of this.kinds) if (kind === untried) count++
    if (count === 0 || this.draws >= this.allowance) return -1
    let nth = this.run.stream.below(count)
    return this.kinds.findIndex((kind) => kind === untried && nth-- === 0)
  }

  /** Begins the next round with the better half, unless scouting is over. The best is drawn from last. */
  private halve(): void {
    const tried = this.tried()
    const before = this.survivors === null ? tried.length : this.roundSize
    const next = Math.ceil(before / 2)
    this.isDone = before <= this.few || this.draws + next > this.allowance
    this.survivors = tried.slice(0, next).reverse()
    this.roundSize = next
  }
}
