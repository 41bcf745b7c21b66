import { InputError, InvariantError } from '../errors.ts'
import { circuits } from '../geometry/circuits.ts'
import { flip } from '../geometry/flips.ts'
import { isRegular } from '../geometry/regularity.ts'
import { referenceClass } from '../geometry/twoFaceClass.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { gaugedHeights } from './heightGauge.ts'
import { codeOfHeights } from './heightsCode.ts'
import type { Chain, Method, Proposal, Run } from './method.ts'
import { exchangeCount } from './moves.ts'
import { PolytopeBook } from './polytopeBook.ts'
import type { RandomStream } from './randomStream.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'
import { restoredPlace } from './standing.ts'
import type { Json } from './state.ts'

/** Largest polytope, by its number of points, and widest scope that the walk is offered for. */
export const [walkPoints, walkPolytopes] = [110, 64]

/** The law of the classes that a uniform walk visits, in words. */
export const uniformWalkLaw = {
  name: 'uniform-walk/1',
  description:
    'A walk that proposes one of the edges inside 2-faces uniformly and stays where it cannot be exchanged or the ' +
    'result is not regular. Its visits are uniform over the classes before symmetry of each polytope in the limit ' +
    'of long walks (so an orbit of equivalent classes counts as often as it has members); successive visits are ' +
    'correlated, and distinct classes are those of the first visits.',
} as const

interface UniformState {
  readonly book: string
  /** Heights of where the walk stands, by polytope; polytopes not begun are missing. */
  readonly places: Readonly<Record<string, string>>
}

/**
 * The proposals are symmetric: the number of edges inside 2-faces is the same for all classes, and an exchange is
 * undone by proposing the other diagonal. With the flip graph of regular classes connected, the uniform
 * distribution is the only limit (Metropolis et al. 1953, with all weights equal).
 */
export const uniformWalk: Method = {
  name: 'uniform',
  version: 1,
  description: uniformWalkLaw.description,
  law: uniformWalkLaw,
  open: (run, state) => new UniformChain(run, state as unknown as UniformState | null),
}

class UniformChain implements Chain {
  private readonly book: PolytopeBook
  private readonly places = new Map<number, PlacedHeights>()

  constructor(
    private readonly run: Run,
    state: UniformState | null,
  ) {
    if (run.polytopeCount > walkPolytopes) {
      throw new InputError(
        'search.walk-too-wide',
        `The scope has ${run.polytopeCount} polytopes; a uniform walk is offered for at most ${walkPolytopes}.`,
        'scope.polytopes',
        run.polytopeCount,
      )
    }
    this.book = new PolytopeBook(run, state?.book)
    for (const [polytope, code] of Object.entries(state?.places ?? {}))
      this.places.set(Number(polytope), restoredPlace(run, Number(polytope), code))
  }

  state(): Json {
    const places = [...this.places].sort(([p], [q]) => p - q)
    return {
      book: this.book.code(),
      places: Object.fromEntries(places.map(([polytope, { heights }]) => [polytope, codeOfHeights(heights)])),
    }
  }

  step(): void {
    const { run, book } = this
    const polytope = book.draw()
    if (polytope < 0) {
      run.end(book.passing > 0 ? 'space-exhausted' : 'no-polytope-passes')
      return
    }
    const place = this.places.get(polytope)
    if (place === undefined) {
      const start = walkStart(run.form(polytope).polytope, run.startOn(polytope))
      this.visit(polytope, start, proposalOf(start))
      if (exchangeCount(start.class) === 0) book.spend(polytope)
      return
    }
    const proposal = uniformProposal(place, run.stream)
    if (proposal === undefined) {
      run.look()
      book.stall(polytope)
    } else {
      this.visit(polytope, place, proposal)
    }
  }

  private visit(polytope: number, from: PlacedHeights, proposal: Proposal): void {
    const { run, book } = this
    const judgement = run.judge(polytope, proposal)
    if (judgement?.isNew) book.found(polytope)
    else book.stall(polytope)
    const heights = judgement === null ? undefined : proposal.heights()
    this.places.set(polytope, heights === undefined ? from : { class: proposal.class, heights })
    if (heights !== undefined) run.countAccepted()
  }
}

/**
 * The class in which a walk begins: that of a given candidate, or always the same one.
 * @throws InputError search.walk-too-large
 */
export function walkStart(polytope: Polytope, given?: PlacedHeights): PlacedHeights {
  if (polytope.pointCount > walkPoints) {
    throw new InputError(
      'search.walk-too-large',
      `A polytope of the scope has ${polytope.pointCount} points (h11 = ${polytope.hodge.h11}); a uniform walk, ` +
        `with a linear program at most steps, is offered up to ${walkPoints}.`,
      'scope.polytopes',
      polytope.pointCount,
    )
  }
  if (given !== undefined) return given
  const cls = referenceClass(polytope)
  const answer = isRegular(cls)
  if (!answer.regular) throw new InvariantError('The reference class is not regular.')
  return { class: cls, heights: gaugedHeights(cls, answer.heights) ?? answer.heights }
}

/** One proposal of the walk: undefined to stay. Its heights, undefined when it is not regular, cost a linear program. */
export function uniformProposal(place: PlacedHeights, stream: RandomStream): Proposal | undefined {
  const { count, i, j, a } = circuits(place.class)
  const row = stream.below(count)
  if (a[row] !== 1) return undefined
  const cls = flip(place.class, { i: i[row], j: j[row] })
  if (cls === undefined) return undefined
  let tested: { readonly heights: Float64Array | undefined } | undefined
  return {
    class: cls,
    heights() {
      if (tested === undefined) {
        const answer = isRegular(cls, { near: place.heights })
        tested = {
          heights: answer.regular ? (gaugedHeights(cls, answer.heights) ?? answer.heights) : undefined,
        }
      }
      return tested.heights
    },
  }
}
