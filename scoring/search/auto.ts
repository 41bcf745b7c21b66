import { InputError } from '../errors.ts'
import { annealing } from './annealing.ts'
import { ArmRun, noCounts, type ArmCounts } from './armRun.ts'
import { hopelessFactor, openExhaustive } from './exhaustive.ts'
import { genetic } from './genetic.ts'
import { compareMerits } from './merit.ts'
import type { Chain, Method, Run } from './method.ts'
import { Scouting, type ScoutingState } from './scouting.ts'
import type { Json } from './state.ts'
import { tempering } from './tempering.ts'

/** What the arms of a portfolio can be. */
const armMethods = { annealing, genetic, tempering } as const

/** The portfolio on one polytope, and the number of evaluations below which it is its first method alone. */
const portfolio = ['annealing', 'genetic', 'tempering'] as const
const fewEvaluations = 300
/** Fewest evaluations of an arm in a round: with less than this a method cannot show what it is good for. */
const leastShare = 120

/** On several polytopes: share of the budget that scouting may take, and polytopes with an arm each. */
const [scoutingShare, polytopeArms] = [0.25, 8]

interface ArmState {
  readonly method: keyof typeof armMethods
  /** The polytope the arm searches; null: the scope's only one. */
  readonly polytope: number | null
  /** Evaluations that the arm may use up to the end of its round. */
  readonly budget: number
  readonly counts: ArmCounts
  readonly chain: Json
}

interface AutoState {
  readonly phase: 'enumeration' | 'starts' | 'scouting' | 'arms'
  readonly enumeration: { readonly budget: number; readonly counts: ArmCounts; readonly chain: Json } | null
  readonly scouting: ScoutingState | null
  readonly arms: readonly ArmState[]
  /** Arms of the present round, and whose turn it is. */
  readonly round: readonly number[]
  readonly turn: number
  /** Polytopes whose arms have found nothing new for as long as `patience` says. */
  readonly spent: readonly number[]
}

interface Arm {
  readonly method: keyof typeof armMethods
  readonly polytope: number | null
  readonly run: ArmRun
  readonly chain: Chain
}

/**
 * Chooses by itself. It enumerates when the scope has no more classes than the budget: where no polytope's upper
 * bound is above a thousand times the budget it counts, and gives up when the budget, or eight times as many classes
 * before symmetry, are passed. Else, on one polytope, it runs a portfolio of annealing, genetic search and parallel
 * tempering by successive halving: each round gets an equal part of what is left of the budget, shared equally, and
 * the better half of the arms goes on, by their best candidates. On several polytopes a quarter of the budget at
 * most goes to scouting (see `Scouting`; given candidates count as draws on their polytopes), and the best eight polytopes get an arm of annealing each. Everything is
 * counted in evaluations and draws.
 */
export const auto: Method = {
  name: 'auto',
  version: 5,
  description:
    'Enumerates when the scope has no more classes than the budget; else a portfolio of annealing, genetic search ' +
    'and tempering, on several polytopes after scouting, where the better half goes on after each round.',
  open: (run, state) => new AutoChain(run, state as unknown as AutoState | null),
}

class AutoChain implements Chain {
  private phase: AutoState['phase']
  private enumeration: { run: ArmRun; chain: Chain } | null
  private readonly scouting: Scouting
  private readonly arms: Arm[]
  private round: number[]
  private turn: number
  private readonly spent: Set<number>

  constructor(
    private readonly run: Run,
    state: AutoState | null,
  ) {
    this.phase = state?.phase ?? 'enumeration'
    const allowance = Math.max(1, Math.floor(run.budget * scoutingShare))
    this.scouting = new Scouting(run, allowance, polytopeArms, state?.scouting ?? null)
    this.arms = (state?.arms ?? []).map((arm) => this.opened(arm))
    this.round = [...(state?.round ?? [])]
    this.turn = state?.turn ?? 0
    this.spent = new Set(state?.spent ?? [])
    this.enumeration = null
    if (this.phase === 'enumeration') {
      const { budget, counts, chain } = state?.enumeration ?? {
        budget: run.budget,
        counts: noCounts,
        chain: null,
      }
      const armRun = new ArmRun(run, null, budget, counts)
      const all = run.settings.budget
      const limits = { walked: 8 * all, bound: hopelessFactor * all }
      this.enumeration = { run: armRun, chain: openExhaustive(armRun, chain, limits) }
    }
  }

  state(): Json {
    const { phase, enumeration, round, turn } = this
    const state: AutoState = {
      phase,
      enumeration: enumeration && {
        budget: enumeration.run.budget,
        counts: enumeration.run.counts(),
        chain: enumeration.chain.state(),
      },
      scouting: phase === 'enumeration' ? null : this.scouting.state(),
      arms: this.arms.map(({ method, polytope, run, chain }) => ({
        method,
        polytope,
        budget: run.budget,
        counts: run.counts(),
        chain: chain.state(),
      })),
      round,
      turn,
      spent: [...this.spent],
    }
    return state as unknown as Json
  }

  step(): void {
    if (this.phase === 'enumeration') this.enumerate()
    else if (this.phase === 'starts') this.takeStarts()
    else if (this.phase === 'scouting') this.scout()
    else this.runArms()
  }

  private enumerate(): void {
    const { run, enumeration } = this
    if (enumeration === null) return
    try {
      enumeration.chain.step()
    } catch (error) {
      if (!(error instanceof InputError) || error.code !== 'search.too-many-classes') throw error
      this.enumeration = null
      this.phase = 'starts'
      return
    }
    if (enumeration.run.ended !== null) run.end(enumeration.run.ended)
  }

  /** Scores what was given. Each arm begins from those on its own polytope. */
  private takeStarts(): void {
    const { run, scouting } = this
    if (run.judgeStart()) return
    for (const { polytope, merit } of run.starts) scouting.learn(polytope, merit)
    this.phase = run.polytopeCount === 1 ? 'arms' : 'scouting'
  }

  private scout(): void {
    const { run, scouting } = this
    scouting.step()
    if (!scouting.done) return
    if (scouting.ranking().length === 0) run.end('no-polytope-passes')
    else this.phase = 'arms'
  }

  private runArms(): void {
    const arm = this.turn < this.round.length ? this.arms[this.round[this.turn]] : undefined
    if (arm === undefined) this.nextRound()
    else if (arm.run.ended !== null || arm.run.evaluations >= arm.run.budget) this.turn++
    else arm.chain.step()
  }

  /** The better half of the round's arms goes on, or new arms begin where none has anything left to find. */
  private nextRound(): void {
    const { run, arms } = this
    const better = (a: number, b: number): number => compareArms(arms[a], arms[b]) || a - b
    const isOpen = (n: number): boolean => arms[n].run.ended === null
    const half = [...this.round].sort(better).slice(0, Math.ceil(this.round.length / 2))
    this.turn = 0
    this.round = half.filter(isOpen)
    if (this.round.length === 0) {
      this.round = [...arms.keys()].filter(isOpen).sort(better).slice(0, 1)
    }
    if (this.round.length === 0 && !this.begin()) {
      run.end('space-exhausted')
      return
    }
    // One part for each halving to come, and one for the arm that is left.
    const parts = Math.ceil(Math.log2(this.round.length)) + 1
    const left = run.budget - run.evaluations
    const share = Math.max(leastShare, Math.floor(left / (parts * this.round.length)))
    for (const n of this.round) arms[n].run.budget = arms[n].run.evaluations + share
  }

  /** Replaces the arms by new ones; false when there is nothing left to begin with. */
  private begin(): boolean {
    const { run, arms, spent } = this
    const budget = Math.ceil(run.budget / 4)
    const open = (polytope: number | null, method: ArmState['method']): Arm =>
      this.opened({ method, polytope, budget, counts: noCounts, chain: null })
    for (const { polytope } of arms) spent.add(polytope ?? 0)
    arms.length = 0
    if (run.polytopeCount === 1) {
      if (spent.size > 0) return false
      const methods = run.budget < fewEvaluations ? portfolio.slice(0, 1) : portfolio
      arms.push(...methods.map((method) => open(null, method)))
    } else {
      const best = this.scouting.ranking().filter((p) => !spent.has(p) && run.polytopePasses(p))
      arms.push(...best.slice(0, polytopeArms).map((polytope) => open(polytope, 'annealing')))
    }
    this.round = [...arms.keys()]
    return arms.length > 0
  }

  private opened({ method, polytope, budget, counts, chain }: ArmState): Arm {
    const run = new ArmRun(this.run, polytope === null ? null : [polytope], budget, counts)
    return { method, polytope, run, chain: armMethods[method].open(run, chain) }
  }
}

function compareArms(a: Arm, b: Arm): number {
  if (a.run.best === null || b.run.best === null)
    return Number(a.run.best === null) - Number(b.run.best === null)
  return compareMerits(a.run.best, b.run.best)
}
