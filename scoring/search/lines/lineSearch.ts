import { InvariantError } from '../../errors.ts'
import { isGeneric } from '../../geometry/circuits.ts'
import { isAccepted } from '../acceptance.ts'
import { Cooling, type CoolingState } from '../cooling.ts'
import { gaugedHeights } from '../heightGauge.ts'
import { codeOfHeights, heightsOfCode } from '../heightsCode.ts'
import { compareMerits, undefinedKind, type Merit } from '../merit.ts'
import type { Chain, Method, Run } from '../method.ts'
import { MoveBook } from '../moveBook.ts'
import { PolytopeBook } from '../polytopeBook.ts'
import { proposalOf } from '../sampling.ts'
import { restoredPlace } from '../standing.ts'
import { drawStart } from '../starts.ts'
import type { Json } from '../state.ts'
import { directionLaws } from './lineDirections.ts'
import type { Checkpoint, Motion } from './motion.ts'

/** Walls after which a line ends in any case. */
const longest = 400

/** Share of lines that begin anew on another polytope, where the scope has several. */
const hopShare = 0.1

interface LineState {
  readonly law: number
  readonly direction: string
  readonly crossed: number
  readonly last: Merit
  /** The best class on the line so far, by the number of walls before it. */
  readonly best: (Merit & { readonly crossed: number }) | null
}

interface LinesState {
  readonly book: string
  readonly cooling: CoolingState
  readonly laws: readonly number[]
  /** Where the last line ended and the present one began; null before the first start. */
  readonly place: (Merit & { readonly polytope: number; readonly heights: string }) | null
  readonly line: LineState | null
}

/** A line being followed. */
interface Line {
  readonly law: number
  readonly direction: Float64Array
  readonly start: Checkpoint
  crossed: number
  last: Merit
  best: { readonly crossed: number; readonly merit: Merit; readonly at: Checkpoint } | null
}

/**
 * Line searches: from where it stands, the chain follows a random line of heights from wall to wall, scores every
 * class on the way, and goes back to the best one, which it accepts as annealing would. Made for rules up to the
 * stage "topology", whose values are mended at every exchange instead of computed (see `Motion`): tens of thousands
 * of classes a second where a step of annealing takes a linear program. Other rules may use it, at their usual cost.
 */
export const lineSearch: Method = {
  name: 'lines',
  version: 1,
  description:
    'Line searches: follows random lines of heights from one exchange to the next, scores every class on the way and ' +
    'goes on from the best. For rules on the topology, whose values are mended at every exchange.',
  open: (run, state) => new LineChain(run, state as unknown as LinesState | null),
}

class LineChain implements Chain {
  private readonly book: PolytopeBook
  private readonly cooling: Cooling
  private readonly lawBook: MoveBook
  private polytope = -1
  private merit: Merit = { kind: undefinedKind, value: 0 }
  /** Undefined before the first start. */
  private motion: Motion | undefined
  private line: Line | null = null

  constructor(
    private readonly run: Run,
    state: LinesState | null,
  ) {
    this.book = new PolytopeBook(run, state?.book)
    this.cooling = new Cooling(state?.cooling)
    this.lawBook = new MoveBook(state?.laws ?? MoveBook.even(directionLaws.length))
    if (state === null || state.place === null) return
    const { polytope, heights, kind, value } = state.place
    this.polytope = polytope
    this.motion = run.motion(polytope, restoredPlace(run, polytope, heights))
    this.merit = { kind, value }
    if (state.line !== null) this.line = followedAgain(this.motion, state.line)
  }

  state(): Json {
    const { polytope, motion, merit, line } = this
    const state: LinesState = {
      book: this.book.code(),
      cooling: this.cooling.state(),
      laws: this.lawBook.state(),
      place: motion === undefined ? null : { polytope, heights: codeOfHeights(motion.heights), ...merit },
      line: line && {
        law: line.law,
        direction: codeOfHeights(line.direction),
        crossed: line.crossed,
        last: line.last,
        best: line.best && { ...line.best.merit, crossed: line.best.crossed },
      },
    }
    return state as unknown as Json
  }

  step(): void {
    const { run, book, motion } = this
    if (book.open === 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
    } else if (run.judgeStart()) {
      return
    } else if (motion === undefined || book.isSpent(this.polytope)) {
      this.begin()
    } else if (this.line !== null) {
      this.follow(motion, this.line)
    } else if (run.polytopeCount > 1 && run.stream.uniform() < hopShare) {
      this.hop()
    } else {
      this.line = this.drawLine(motion)
      this.follow(motion, this.line)
    }
  }

  /** A fresh start on a polytope drawn from the open ones. */
  private begin(): void {
    if (this.motion !== undefined) this.run.countRestart()
    this.motion = undefined
    this.line = null
    this.hop()
  }

  /** The best candidate given, at a beginning, or a random one; the chain moves there if it accepts it. */
  private hop(): void {
    const { run, book } = this
    const given =
      this.motion === undefined ? run.starts.find(({ polytope }) => !book.isSpent(polytope)) : undefined
    const polytope = given?.polytope ?? book.draw()
    if (polytope < 0) return
    const drawn = given?.place() ?? drawStart(run.form(polytope).polytope, run.stream)
    const heights = gaugedHeights(drawn.class, drawn.heights)
    // Lines begin strictly inside a class.
    const inside = heights !== undefined && isGeneric(drawn.class, heights)
    const start = { class: drawn.class, heights: heights ?? drawn.heights }
    const judgement = inside ? run.judge(polytope, proposalOf(start)) : null
    if (judgement?.isNew) book.found(polytope)
    else book.stall(polytope)
    if (judgement === null || (this.motion !== undefined && !this.accepts(judgement.merit))) return
    this.polytope = polytope
    this.motion = run.motion(polytope, start)
    this.stand(judgement.merit)
  }

  private drawLine(motion: Motion): Line {
    const { stream } = this.run
    const law = this.lawBook.draw(stream)
    const direction = directionLaws[law](motion.form.polytope, motion.heights, stream)
    return aimed(motion, law, direction, this.merit)
  }

  /** One wall further on, or the end of the line. */
  private follow(motion: Motion, line: Line): void {
    const { run, book, polytope } = this
    if (line.crossed >= longest || !motion.cross()) {
      this.finish(motion, line)
      return
    }
    line.crossed++
    const judgement = run.judgeMotion(polytope, motion)
    if (judgement?.isNew) book.found(polytope)
    else book.stall(polytope)
    if (judgement === null) return
    const { merit } = judgement
    this.cooling.learn(line.last, merit)
    line.last = merit
    if (line.best !== null && compareMerits(merit, line.best.merit) >= 0) return
    const at = motion.checkpoint()
    if (at !== undefined) line.best = { crossed: line.crossed, merit, at }
  }

  /** Takes the best class of the line, or goes back to where it began. */
  private finish(motion: Motion, line: Line): void {
    const { best, start, law } = line
    this.line = null
    this.lawBook.learn(law, best === null ? 0 : this.cooling.gain(this.merit, best.merit))
    if (line.crossed === 0) this.book.stall(this.polytope)
    if (best !== null && this.accepts(best.merit)) {
      motion.goBack(best.at)
      this.stand(best.merit)
    } else {
      motion.goBack(start)
    }
  }

  private accepts(merit: Merit): boolean {
    const { run, cooling } = this
    const temperatures = cooling.temperatures(run.evaluations / run.budget, 0)
    return isAccepted(this.merit, merit, temperatures, run.stream.uniform())
  }

  private stand(merit: Merit): void {
    this.merit = merit
    this.run.countAccepted()
  }
}

function aimed(motion: Motion, law: number, direction: Float64Array, merit: Merit): Line {
  const start = motion.checkpoint()
  if (start === undefined) throw new InvariantError('A line does not begin inside its class.')
  motion.aim(direction)
  return { law, direction, start, crossed: 0, last: merit, best: null }
}

/** A stored line, followed again to where it was. */
function followedAgain(motion: Motion, { law, direction, crossed, last, best }: LineState): Line {
  const line = aimed(motion, law, heightsOfCode(direction), last)
  while (line.crossed < crossed) {
    if (!motion.cross()) throw new InvariantError('A stored line has fewer walls than it had.')
    line.crossed++
    if (best === null || line.crossed !== best.crossed) continue
    const at = motion.checkpoint()
    const { kind, value } = best
    if (at !== undefined) line.best = { crossed: line.crossed, merit: { kind, value }, at }
  }
  return line
}
