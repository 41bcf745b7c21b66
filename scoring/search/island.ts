import { InputError } from '../errors.ts'
import { canonicalClass, type CanonicalClass } from '../geometry/classKey.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { Candidate } from '../observables/candidate.ts'
import { buildCandidate } from '../observables/buildCandidate.ts'
import { evaluatePolytopeStage, evaluateRule } from '../rules/evaluate.ts'
import type { Outcome } from '../rules/outcome.ts'
import { once, witnesses, type EvaluatedClass, type Witnesses } from './evaluatedClass.ts'
import type { ExtendedState, Stage } from './extensions.ts'
import { codeOfHeights } from './heightsCode.ts'
import type { KeptFind } from './find.ts'
import type { OutcomeMemo } from './memo.ts'
import { Motion } from './lines/motion.ts'
import { irregularKind, meritOf, type Merit } from './merit.ts'
import type { Chain, Judgement, Proposal, Prospective, Run } from './method.ts'
import { methods, usesStarts } from './methods.ts'
import type { SearchProblem } from './problem.ts'
import { PendingFind } from './pendingFind.ts'
import { RandomStream } from './randomStream.ts'
import { Reservoir } from './reservoir.ts'
import { proposalOf, type PlacedHeights } from './sampling.ts'
import { SeenTable } from './seenTable.ts'
import { classWords } from './seenWords.ts'
import type { SearchSettings } from './settings.ts'
import { GivenCandidates, startsOfIsland, type Start } from './givenStarts.ts'
import type { RunEnd, SampledRow, SampleRow, SearchState } from './state.ts'
import { Surrogate } from './surrogate/surrogate.ts'
import { helpsWith } from './surrogate/use.ts'
import { Tally } from './tally.ts'
import { TopList } from './topList.ts'

/** What may look on while an island works. None of it can alter a result. */
export interface IslandHooks {
  /** Outcomes known from elsewhere under the same rule: spares time. */
  readonly memo?: OutcomeMemo
  /** Told of every evaluation. */
  readonly observe?: (evaluated: Evaluated) => void
  /** Puts a candidate with the same values in the place of each one that is evaluated, to time its stages. */
  readonly instrument?: (candidate: Candidate) => Candidate
  /** Keep the heights of what enters the uniform sample, for `sampled`. */
  readonly sampled?: boolean
}

/** One evaluation, as it happens. */
export interface Evaluated extends Witnesses {
  readonly form: NormalForm
  readonly classKey: string
  readonly outcome: Outcome
}

/** Greater than any key. */
const afterAllKeys = 'z'

/** An island at work: a state opened up, which the chain of its method drives. */
export class Island implements Run {
  readonly stream: RandomStream
  readonly polytopeCount: number
  readonly settings: SearchSettings
  readonly island: number
  budget: number
  readonly patience: number
  readonly descents: number
  evaluations: number
  proposals: number
  stalled: number
  ended: RunEnd | null
  private accepted: number
  private restarts: number
  private readonly tally: Tally
  private readonly sample: Reservoir<SampleRow>
  private readonly top: TopList
  private readonly seen: SeenTable
  private readonly surrogate: Surrogate | null
  private readonly canonicals = new WeakMap<TwoFaceClass, CanonicalClass>()
  private readonly entered = new Set<string>()
  private readonly samplers = new Map<number, () => Float64Array>()
  private readonly passes = new Map<number, boolean>()
  private readonly given: GivenCandidates
  private readonly extended: ExtendedState | undefined
  readonly chain: Chain

  constructor(
    private readonly problem: SearchProblem,
    private readonly opened: SearchState,
    private readonly hooks: IslandHooks = {},
  ) {
    const { opened: given } = this
    this.stream = new RandomStream(given.generator)
    this.polytopeCount = problem.polytopes.count
    this.settings = problem.settings
    this.island = given.island
    this.budget = given.budget
    this.patience = problem.settings.patience
    this.descents = problem.settings.descents
    this.evaluations = given.evaluations
    this.proposals = given.proposals
    this.stalled = given.stalled
    this.ended = given.ended
    this.accepted = given.accepted
    this.restarts = given.restarts
    this.tally = new Tally(given)
    this.sample = new Reservoir(given.sample)
    this.top = new TopList(problem.settings.keep, given.top)
    this.seen = SeenTable.restore(given.seen)
    this.surrogate = helpsWith(problem) ? new Surrogate(given.surrogate) : null
    this.given = givenCandidates(problem, given, (polytope) => this.form(polytope))
    this.extended = given.extended
    this.chain = methods[problem.method].open(this, given.chain)
  }

  state(): SearchState {
    const given = this.given.state()
    const { extended } = this
    return {
      schema: 'tessellary.state/1',
      problem: this.opened.problem,
      method: this.opened.method,
      seed: this.opened.seed,
      island: this.island,
      budget: this.budget,
      evaluations: this.evaluations,
      proposals: this.proposals,
      accepted: this.accepted,
      restarts: this.restarts,
      ...this.tally.state(),
      generator: this.stream.state(),
      stalled: this.stalled,
      ended: this.ended,
      sample: this.sample.state(),
      top: this.settledTop(),
      seen: this.seen.state(),
      surrogate: this.surrogate?.state() ?? null,
      chain: this.chain.state(),
      ...(given && { given }),
      ...(extended && { extended }),
    }
  }

  /** The list of the best as plain data. */
  private settledTop(): readonly KeptFind[] {
    this.top.replace((row) => {
      if (!(row instanceof PendingFind)) return row
      const settled = row.settled()
      this.entered.add(settled.classKey)
      return settled
    })
    return [...this.top.list()]
  }

  /** Class keys of the candidates that entered the list of the best since this island was opened, as of the last `state()`. */
  get newcomers(): ReadonlySet<string> {
    return this.entered
  }

  /** What entered the uniform sample since this island was opened and is still in it, by place. */
  sampled(): SampledRow[] {
    const { rows } = this.sample.state()
    return [...this.samplers]
      .sort(([a], [b]) => a - b)
      .map(([place, heights]) => ({ place, ...rows[place], heights: codeOfHeights(heights()) }))
  }

  get stage(): Stage {
    const { by, begun } = this.extended ?? { by: [], begun: 0 }
    return { number: by.length, begun, budget: this.budget - begun }
  }

  get starts(): readonly Start[] {
    return this.given.ranked()
  }

  judgeStart(): boolean {
    const next = this.given.next()
    if (next === undefined) return false
    const { given, polytope } = next
    if (!this.polytopePasses(polytope)) {
      this.look()
      this.given.note(null)
      return true
    }
    const judgement = this.judge(polytope, proposalOf(this.given.placed(polytope, given)))
    if (judgement?.key !== given.classKey) {
      throw new InputError(
        'start.other-key',
        `The heights given for the candidate ${given.classKey} are those of ${judgement?.key ?? 'no regular class'}.`,
        'starts',
        given.classKey,
      )
    }
    this.given.note(judgement.merit)
    return true
  }

  startOn(polytope: number): PlacedHeights | undefined {
    return this.given.firstOn(polytope)
  }

  form(polytope: number): NormalForm {
    return this.problem.polytopes.at(polytope)
  }

  polytopePasses(polytope: number): boolean {
    let passes = this.passes.get(polytope)
    if (passes === undefined) {
      const form = this.form(polytope)
      const view = { polytope: form.polytope, symmetryOrder: form.automorphisms.length }
      passes = evaluatePolytopeStage(this.problem.rule, view) === null
      this.passes.set(polytope, passes)
    }
    return passes
  }

  judge(polytope: number, proposal: Proposal): Judgement | null {
    const form = this.form(polytope)
    const canonical = this.canonical(form, proposal.class)
    const [high, low] = classWords(form, proposal.class, canonical.key)
    this.proposals++
    const known = proposal.distinct ? null : this.seen.find(high, low)
    if (known !== null) {
      this.stalled++
      return known.kind === irregularKind ? null : { merit: known, key: canonical.key, isNew: false }
    }
    const heights = proposal.heights()
    if (heights === undefined) {
      this.stalled++
      if (!proposal.distinct) this.seen.add(high, low, irregularKind, 0)
      return null
    }
    const outcome = this.outcome(form, canonical.class, canonical.key)
    const merit = this.record(form, proposal.distinct ? null : [high, low], outcome, {
      key: canonical.key,
      hold() {},
      class: () => proposal.class,
      canonical: () => canonical,
      heights: () => heights,
      outcome: () => outcome,
    })
    this.surrogate?.learn(form, proposal.class, merit)
    return { merit, key: canonical.key, isNew: true }
  }

  motion(polytope: number, place: PlacedHeights): Motion {
    return new Motion(this.form(polytope), this.problem.rule, place)
  }

  judgeMotion(polytope: number, motion: Motion): Omit<Judgement, 'key'> | null {
    const form = this.form(polytope)
    const [high, low] = motion.words()
    this.proposals++
    const known = this.seen.find(high, low)
    if (known !== null) {
      this.stalled++
      return known.kind === irregularKind ? null : { merit: known, isNew: false }
    }
    const held = once(() => motion.snapshot())
    const canonical = once(() => canonicalClass(form, held().class()))
    const usual = once(() => this.outcome(form, canonical().class, canonical().key))
    const whole: EvaluatedClass = {
      key: null,
      hold: held,
      class: () => held().class(),
      canonical,
      heights: () => held().heights,
      outcome: usual,
    }
    const merit = this.record(form, [high, low], motion.outcome() ?? usual(), whole)
    return { merit, isNew: true }
  }

  /** Counts one evaluation and puts the class on the lists that it belongs to. */
  private record(
    form: NormalForm,
    words: readonly [number, number] | null,
    outcome: Outcome,
    whole: EvaluatedClass,
  ): Merit {
    const merit = meritOf(outcome)
    this.stalled = 0
    this.evaluations++
    if (words !== null) this.seen.add(...words, merit.kind, merit.value)
    // An enumeration meets everything, given or not.
    const isGiven = words !== null && this.given.has(words)
    if (isGiven) this.given.evaluations++
    this.tally.count(outcome, this.evaluations, isGiven)
    if (!isGiven) {
      const row = (): SampleRow => ({ polytopeKey: form.key, classKey: whole.canonical().key, ...merit })
      const place = this.sample.offerMade(row, this.stream)
      if (place !== null && this.hooks.sampled) this.samplers.set(place, witnesses(whole).heights)
    }
    if (this.top.admits(outcome, whole.key ?? afterAllKeys)) {
      const { canonical, outcome: full } = whole
      this.top.insert(
        new PendingFind(form.key, outcome, { canonical, outcome: full, heights: witnesses(whole).heights }),
      )
    }
    const { observe } = this.hooks
    if (observe !== undefined)
      observe({ form, classKey: whole.canonical().key, outcome: whole.outcome(), ...witnesses(whole) })
    return merit
  }

  choose<T>(draw: () => T, placeOf: (drawn: T) => Prospective | null): T {
    const { surrogate } = this
    if (surrogate === null) return draw()
    return surrogate.choose(this.stream, draw, (drawn) => {
      const place = placeOf(drawn)
      if (place === null) return null
      const form = this.form(place.polytope)
      const isKnown = (): boolean => this.seen.find(...classWords(form, place.class)) !== null
      return { form, class: place.class, isKnown }
    })
  }

  look(): void {
    this.proposals++
  }

  resize(budget: number): void {
    this.budget = budget
  }

  countAccepted(): void {
    this.accepted++
  }

  countRestart(): void {
    this.restarts++
  }

  end(reason: RunEnd): void {
    this.ended = reason
  }

  private canonical(form: NormalForm, cls: TwoFaceClass): CanonicalClass {
    let canonical = this.canonicals.get(cls)
    if (canonical === undefined) {
      canonical = canonicalClass(form, cls)
      this.canonicals.set(cls, canonical)
    }
    return canonical
  }

  private outcome(form: NormalForm, canonical: TwoFaceClass, key: string): Outcome {
    const { memo, instrument } = this.hooks
    const remembered = memo?.get(key)
    if (remembered !== undefined) return remembered
    const candidate = buildCandidate(form, canonical, key)
    const outcome = evaluateRule(this.problem.rule, instrument?.(candidate) ?? candidate)
    memo?.set(key, outcome)
    return outcome
  }
}

function givenCandidates(
  { method, polytopes, settings, starts = [] }: SearchProblem,
  { island, given }: SearchState,
  form: (polytope: number) => NormalForm,
): GivenCandidates {
  const used = usesStarts(method) ? starts : []
  const own = startsOfIsland(used.length, settings.islands, island)
  return new GivenCandidates(used, own, polytopes.keys, form, given)
}
