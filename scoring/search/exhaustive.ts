import { InputError } from '../errors.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { classCountBound } from '../geometry/counting/classCountBound.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { ReverseSearch, type WalkPosition } from '../geometry/reverseSearch.ts'
import type { Chain, Method, Run } from './method.ts'
import type { Json } from './state.ts'

/** Most classes before symmetry, over the whole scope, that are walked. */
export const exhaustiveLimit = 200_000

/**
 * A count is not begun on a polytope whose upper bound, the product over its 2-faces, is so many times as large as
 * what could be walked: on small polytopes the bound is 1 to 4 times the number.
 */
export const hopelessFactor = 1000

/** Marks kept of the first walk, from which the islands' parts are found again. */
const mostMarks = 64

/** A place in the walk over all polytopes, and the number of candidates met before it. */
interface Mark {
  readonly before: number
  readonly polytope: number
  readonly position: WalkPosition
}

interface ExhaustiveState {
  /** Candidates of the whole scope; null while they are counted. */
  readonly total: number | null
  /** Classes before symmetry met so far by the count. */
  readonly walked: number
  readonly marks: readonly Mark[]
  readonly stride: number
  /** The next place to look at; null before the beginning. */
  readonly place: Mark | null
}

/**
 * Every class of every polytope, each scored once. Two walks: the first counts and refuses what is too large; in
 * the second each island scores its part, the candidates number `total n / islands` to `total (n + 1) / islands`
 * in the order of the walk. Of equivalent classes the one is scored that is its own canonical representative, so
 * that no list of classes seen is needed.
 */
export const exhaustive: Method = {
  name: 'exhaustive',
  version: 1,
  repeats: false,
  ignoresStarts: true,
  description:
    'Every class of every polytope, each once: counts first, and refuses what has more classes than the budget ' +
    `or more than ${exhaustiveLimit.toLocaleString('en')} before symmetry.`,
  law: {
    name: 'exhaustive',
    description:
      'Every candidate of the scope that the rule does not refuse at the polytope stage, once modulo automorphisms.',
  },
  open: (run, state) => openExhaustive(run, state),
}

/** Where an enumeration gives up while it counts, besides the budget. */
export interface EnumerationLimits {
  /** Classes before symmetry, over the whole scope. */
  readonly walked: number
  /** Upper bound on the classes of one polytope above which it is not even counted. */
  readonly bound: number
}

/** An enumeration with other limits than its own. Beyond them `step` throws search.too-many-classes. */
export function openExhaustive(
  run: Run,
  state: Json | null,
  limits: EnumerationLimits = { walked: exhaustiveLimit, bound: hopelessFactor * exhaustiveLimit },
): Chain {
  return new ExhaustiveChain(run, limits, state as unknown as ExhaustiveState | null)
}

class ExhaustiveChain implements Chain {
  private total: number | null
  private walked: number
  private marks: Mark[]
  private stride: number
  private before = 0
  private polytope = -1
  private walk: ReverseSearch | undefined

  constructor(
    private readonly run: Run,
    private readonly limits: EnumerationLimits,
    state: ExhaustiveState | null,
  ) {
    this.total = state?.total ?? null
    this.walked = state?.walked ?? 0
    this.marks = [...(state?.marks ?? [])]
    this.stride = state?.stride ?? 1
    if (state !== null && state.place !== null) this.goTo(state.place)
  }

  state(): Json {
    const { total, walked, marks, stride } = this
    return { total, walked, marks, stride, place: this.place() } as unknown as Json
  }

  step(): void {
    if (this.walk === undefined && !this.enterNext()) {
      this.run.end('no-polytope-passes')
    } else if (this.total === null) {
      this.count()
    } else {
      this.score(this.total)
    }
  }

  /** Looks at one class of the first walk. */
  private count(): void {
    const { run } = this
    run.look()
    this.walked++
    if (this.isCanonical()) {
      if (this.before % this.stride === 0) this.setMark()
      this.before++
    }
    if (this.before > run.settings.budget) {
      throw new InputError(
        'search.too-many-classes',
        `The scope has more than ${run.settings.budget} classes, the budget of this search; enumerating it takes a ` +
          'budget of at least their number. Raise the budget, narrow the scope, or choose another method.',
        'budget',
        run.settings.budget,
      )
    }
    if (this.walked > this.limits.walked) throw tooManyBeforeSymmetry(this.limits.walked)
    if (this.walk?.next() || this.enterNext()) return
    this.total = this.before
    const [first, end] = this.part(this.total)
    run.resize(end - first)
    if (first === end) {
      run.end('space-exhausted')
    } else {
      const mark = this.marks.findLast(({ before }) => before <= first)
      if (mark !== undefined) this.goTo(mark)
    }
  }

  /** Looks at one class of the second walk, which begins a little before the island's part. */
  private score(total: number): void {
    const { run, walk } = this
    if (walk === undefined) return
    const [first, end] = this.part(total)
    if (this.isCanonical()) {
      if (this.before >= first)
        run.judge(this.polytope, { class: walk.class, heights: () => walk.heights, distinct: true })
      this.before++
    } else run.look()
    if (this.before === end) run.end('space-exhausted')
    else if (!walk.next()) this.enterNext()
  }

  /** Number of the island's first candidate, and of the first that is not its own any more. */
  private part(total: number): [number, number] {
    const { island, settings } = this.run
    return [
      Math.floor((total * island) / settings.islands),
      Math.floor((total * (island + 1)) / settings.islands),
    ]
  }

  private isCanonical(): boolean {
    const form = this.run.form(this.polytope)
    const cls = this.walk?.class
    return cls !== undefined && (form.automorphisms.length === 1 || canonicalClass(form, cls).class === cls)
  }

  /** Begins with the next polytope that the rule does not refuse; false when there is none. */
  private enterNext(): boolean {
    const { run } = this
    while (++this.polytope < run.polytopeCount) {
      if (!run.polytopePasses(this.polytope)) continue
      const { polytope } = run.form(this.polytope)
      if (this.total === null) requireCountable(polytope, this.limits)
      this.walk = new ReverseSearch(polytope)
      return true
    }
    return false
  }

  private place(): Mark | null {
    const { before, polytope, walk } = this
    const isPast = polytope >= this.run.polytopeCount
    return walk === undefined || isPast ? null : { before, polytope, position: walk.position() }
  }

  private goTo({ before, polytope, position }: Mark): void {
    this.before = before
    this.polytope = polytope
    this.walk = new ReverseSearch(this.run.form(polytope).polytope, position)
  }

  /** Every `stride`-th candidate is marked; when there are too many marks, every second one goes. */
  private setMark(): void {
    const place = this.place()
    if (place === null) return
    this.marks.push(place)
    if (this.marks.length < mostMarks) return
    this.marks = this.marks.filter((_, n) => n % 2 === 0)
    this.stride *= 2
  }
}

function tooManyBeforeSymmetry(limit: number): InputError {
  return new InputError(
    'search.too-many-classes',
    `The scope has more than ${limit} classes before symmetry, the most that are enumerated. Narrow the scope, or ` +
      'choose another method.',
    'scope',
    limit,
  )
}

/** @throws InputError search.too-many-classes */
function requireCountable(polytope: Polytope, { bound }: EnumerationLimits): void {
  const { log10 } = classCountBound(polytope)
  if (log10 <= Math.log10(bound)) return
  throw new InputError(
    'search.too-many-classes',
    `A polytope of the scope with h11 = ${polytope.hodge.h11} may have up to 10^${log10.toFixed(1)} classes, the ` +
      `product over its 2-faces; above 10^${Math.log10(bound).toFixed(1)} they are not even counted. Narrow the ` +
      'scope, or choose another method.',
    'scope',
    log10,
  )
}
