import { InvariantError } from '../errors.ts'
import { fineClass, type TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { codeOfHeights, heightsOfCode } from './heightsCode.ts'
import { compareMerits, type Merit } from './merit.ts'
import type { Judgement, Proposal, Run } from './method.ts'
import { exchangeAt, exchangeCount } from './moves.ts'
import type { PlacedHeights } from './sampling.ts'

/** Neighbours of a class that count as few: that many, and so large a part of the evaluations at hand. */
const [fewNeighbours, fewOfBudget] = [24, 1 / 8]
/** Places that are kept; beyond, the worst is dropped. */
const capacity = 128

interface Entry {
  readonly key: string
  readonly merit: Merit
  /** The start from which it was last reached. */
  readonly start: number
  /** Exchanges that have been tried. */
  readonly tried: number
  readonly heights: string
}

export interface NeighbourhoodsState {
  readonly start: number
  readonly entries: readonly Entry[]
}

/** True where all neighbours of a class can be tried within a small part of the evaluations. */
export function hasFewNeighbours(cls: TwoFaceClass, evaluations: number): boolean {
  return exchangeCount(cls) <= Math.min(fewNeighbours, fewOfBudget * evaluations)
}

/**
 * The classes on one polytope whose neighbours by one exchange have not all been tried. They are tried one by one, those of
 * the best class first (best-first search), among the classes reached from the latest start; of the others when these have run
 * out. Where classes have few neighbours this finds the top of every hill near a start, and the higher one next to it.
 */
export class Neighbourhoods {
  private start: number
  private readonly entries: Entry[]
  /** Place of the entry worked on last: its class need not be built again. */
  private latest: { readonly key: string; readonly place: PlacedHeights } | undefined

  constructor(
    private readonly run: Run,
    private readonly polytope: number,
    state: NeighbourhoodsState = { start: 0, entries: [] },
  ) {
    this.start = state.start
    this.entries = [...state.entries]
  }

  state(): NeighbourhoodsState {
    return { start: this.start, entries: [...this.entries] }
  }

  /** Classes that enter from now on belong to a new start. */
  beginAnew(): void {
    this.start++
  }

  /** Takes a class in; one that is known and not waiting has had its turn. */
  enter({ key, merit, isNew }: Judgement, proposal: Proposal): void {
    const { entries, start } = this
    const at = entries.findIndex((entry) => entry.key === key)
    if (at >= 0) entries[at] = { ...entries[at], start }
    else if (isNew) {
      const heights = proposal.heights()
      if (heights !== undefined)
        entries.push({ key, merit, start, tried: 0, heights: codeOfHeights(heights) })
    }
    if (entries.length <= capacity) return
    let worst = 0
    for (let n = 1; n < entries.length; n++) if (this.isBefore(entries[worst], entries[n])) worst = n
    entries.splice(worst, 1)
  }

  /** The next neighbour to be judged; undefined when none is left. */
  next(): Proposal | undefined {
    for (;;) {
      const entry = this.first()
      if (entry === undefined) return undefined
      const place = this.placeOf(entry)
      const at = this.entries.indexOf(entry)
      if (entry.tried >= exchangeCount(place.class)) this.entries.splice(at, 1)
      else {
        this.entries[at] = { ...entry, tried: entry.tried + 1 }
        const proposal = exchangeAt(place, entry.tried)
        if (proposal !== undefined) return proposal
      }
    }
  }

  private first(): Entry | undefined {
    let first: Entry | undefined
    for (const entry of this.entries) if (first === undefined || this.isBefore(entry, first)) first = entry
    return first
  }

  /** Those of the present start come before others, better ones before worse, then those that came first. */
  private isBefore(a: Entry, b: Entry): boolean {
    const own = Number(b.start === this.start) - Number(a.start === this.start)
    return (own || compareMerits(a.merit, b.merit)) < 0
  }

  private placeOf({ key, heights }: Entry): PlacedHeights {
    if (this.latest?.key !== key) {
      const restored = heightsOfCode(heights)
      const cls = fineClass(this.run.form(this.polytope).polytope, restored)
      if (cls === undefined) throw new InvariantError('The heights stored in a state are not fine.')
      this.latest = { key, place: { class: cls, heights: restored } }
    }
    return this.latest.place
  }
}
