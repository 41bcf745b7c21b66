import { z } from 'zod'
import { InputError, InvariantError } from '../errors.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import { fineClass } from '../geometry/twoFaceClass.ts'
import { compareMerits, type Merit } from './merit.ts'
import type { PlacedHeights } from './sampling.ts'
import { classWords } from './seenWords.ts'

/** A candidate that a search is given to begin from. */
export interface GivenStart {
  /** Key of its polytope, which the scope must hold. */
  readonly polytopeKey: string
  /** The candidate's permanent address. */
  readonly classKey: string
  /** Integer heights that give its class or an equivalent one, one per point of the polytope in normal form. */
  readonly heights: readonly number[]
}

/** Most candidates a search can be given. */
export const startLimit = 500

const key = z.string().regex(/^[0-9a-f]{32}$/)

/** A given candidate as it stands in a specification; the lines of finds have these fields, too. */
export const startSchema = z.object({
  polytopeKey: key,
  classKey: key.optional(),
  heights: z.array(z.number().int()),
})

/** A given candidate, once it has been scored. */
export interface Start {
  readonly classKey: string
  /** Index in the scope. */
  readonly polytope: number
  readonly merit: Merit
  place(): PlacedHeights
}

/** What an island has done with the candidates it was given: part of its state. */
export interface GivenState {
  /** How many of its own it has looked at. */
  readonly scored: number
  /** Place in the island's list, kind and value of those that were scored. */
  readonly merits: readonly (readonly [place: number, kind: number, value: number])[]
  /** Evaluations that were spent on given classes, by whichever way they came up. */
  readonly evaluations: number
}

/** @throws InputError search.too-many-starts, start.not-in-scope, start.twice */
export function requireSoundStarts(
  starts: readonly Pick<GivenStart, 'polytopeKey' | 'classKey'>[],
  scope: readonly string[],
): void {
  if (starts.length > startLimit) {
    throw new InputError(
      'search.too-many-starts',
      `A search begins from at most ${startLimit} given candidates, not ${starts.length}.`,
      'starts',
      starts.length,
    )
  }
  const keys = new Set(scope)
  const seen = new Set<string>()
  for (const [n, { polytopeKey, classKey }] of starts.entries()) {
    if (!keys.has(polytopeKey)) {
      throw new InputError(
        'start.not-in-scope',
        `Given candidate ${n + 1} lies on the polytope ${polytopeKey}, which the scope does not hold.`,
        `starts[${n}].polytopeKey`,
        polytopeKey,
      )
    }
    if (seen.has(classKey)) {
      throw new InputError(
        'start.twice',
        `Given candidate ${n + 1} is ${classKey}, which is given before; name each once.`,
        `starts[${n}].classKey`,
        classKey,
      )
    }
    seen.add(classKey)
  }
}

/**
 * The candidates that an island begins from, by their number in the list: dealt out in turn, so that each island
 * gets good ones of a ranked list. Where there are fewer candidates than islands, some begin from the same.
 */
export function startsOfIsland(count: number, islands: number, island: number): number[] {
  if (count === 0) return []
  if (count < islands) return [island % count]
  return Array.from({ length: Math.ceil((count - island) / islands) }, (_, n) => island + n * islands)
}

/** One island's part of the given candidates: scores them once, then hands them out, the best first. */
export class GivenCandidates {
  private scored: number
  private readonly merits: [number, number, number][]
  private sorted: readonly Start[] | undefined
  private words: ReadonlySet<string> | undefined
  evaluations: number

  /**
   * @param all of the search
   * @param own numbers in `all` of those that this island scores
   */
  constructor(
    private readonly all: readonly GivenStart[],
    private readonly own: readonly number[],
    private readonly scope: readonly string[],
    private readonly form: (polytope: number) => NormalForm,
    state: GivenState | undefined,
  ) {
    this.scored = state?.scored ?? 0
    this.merits = (state?.merits ?? []).map(([place, kind, value]) => [place, kind, value])
    this.evaluations = state?.evaluations ?? 0
  }

  state(): GivenState | undefined {
    if (this.all.length === 0) return undefined
    return { scored: this.scored, merits: [...this.merits], evaluations: this.evaluations }
  }

  /** True of a class that was given, to this island or another, by the words of `classWords`. */
  has(words: readonly [number, number]): boolean {
    if (this.all.length === 0) return false
    this.words ??= new Set(this.all.map((given) => this.wordsOf(given).join()))
    return this.words.has(words.join())
  }

  /** The next candidate to score; undefined when none is left. */
  next(): { readonly given: GivenStart; readonly polytope: number } | undefined {
    const given = this.all[this.own[this.scored]] as GivenStart | undefined
    return given && { given, polytope: this.scope.indexOf(given.polytopeKey) }
  }

  /** Takes note of how `next()` fared; null: it was passed over. */
  note(merit: Merit | null): void {
    if (merit !== null) this.merits.push([this.scored, merit.kind, merit.value])
    this.scored++
    this.sorted = undefined
  }

  /** Those that were scored, the best first; of equal ones the one given first. */
  ranked(): readonly Start[] {
    this.sorted ??= this.merits
      .map(([place, kind, value]): Start & { readonly nth: number } => {
        const given = this.all[this.own[place]]
        const polytope = this.scope.indexOf(given.polytopeKey)
        const { classKey } = given
        const merit = { kind, value }
        return { nth: place, classKey, polytope, merit, place: () => this.placed(polytope, given) }
      })
      .sort((a, b) => compareMerits(a.merit, b.merit) || a.nth - b.nth)
    return this.sorted
  }

  /** The first of the island's candidates that lies on a polytope, scored or not. */
  firstOn(polytope: number): PlacedHeights | undefined {
    const onIt = this.own.map((n) => this.all[n]).find((one) => one.polytopeKey === this.scope[polytope])
    return onIt && this.placed(polytope, onIt)
  }

  /** @throws InputError start.not-fine, heights.* */
  placed(polytope: number, { classKey, heights: given }: GivenStart): PlacedHeights {
    if (polytope < 0) throw new InvariantError('A given candidate lies outside the scope.')
    const heights = Float64Array.from(given)
    const cls = fineClass(this.form(polytope).polytope, heights)
    if (cls !== undefined) return { class: cls, heights }
    throw new InputError(
      'start.not-fine',
      `The heights of the given candidate ${classKey} are not fine on its polytope.`,
      'starts',
      classKey,
    )
  }

  private wordsOf(given: GivenStart): [number, number] {
    const polytope = this.scope.indexOf(given.polytopeKey)
    return classWords(this.form(polytope), this.placed(polytope, given).class, given.classKey)
  }
}
