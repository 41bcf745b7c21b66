import type { NormalForm } from '../../geometry/normalForm.ts'
import type { TwoFaceClass } from '../../geometry/twoFaceClass.ts'
import { compareMerits, type Merit } from '../merit.ts'
import type { RandomStream } from '../randomStream.ts'
import { classFeatures } from './classFeatures.ts'
import { midranks, normalScores, rankCorrelation } from './ranks.ts'
import type { SurrogateReport } from './report.ts'
import { fitRidge, type RidgeModel } from './ridge.ts'
import { emptyWindow, LessonWindow, type WindowState } from './window.ts'

/** Evaluations between two fits, those a fit looks back on, and those before the first. */
const [fitInterval, fitWindow, fewestToFit] = [16, 256, 32]
/** Predictions that the skill is taken over, and the fewest that count. */
const [skillWindow, fewestPredictions] = [200, 16]
/** Below this skill the surrogate steps aside. */
const leastSkill = 0.2
/** Proposals among which one is chosen, and the share of steps where it has no say. */
const [choices, exploration] = [6, 0.1]

/** Bytes of a state that is full, as JSON, rounded up. */
export const surrogateStateBytes = 200_000

export interface SurrogateState extends SurrogateReport {
  readonly window: WindowState
}

interface Measured {
  readonly at: number
  readonly skill: number | null
  readonly predictions: number
}

/** A class that could be proposed. */
export interface Prospect {
  readonly form: NormalForm
  readonly class: TwoFaceClass
  /** Scored before, or found to be irregular. Asked of the most promising ones only. */
  isKnown(): boolean
}

/**
 * Learns from the candidates a run has evaluated how a class will fare, by ridge regression of normal scores of their
 * order on `classFeatures`, and chooses the most promising of a few proposals. It looks back on the last 256
 * evaluations and is fitted anew after every 16. Its skill is the rank correlation of what it said of candidates
 * before they were evaluated with how they fared; while that is low it steps aside and only learns. Whatever it
 * chooses is evaluated by the rule: it never decides a rank.
 */
export class Surrogate {
  private readonly window: LessonWindow
  private offered: number
  private chosen: number
  /** The model in force and the number of lessons it was fitted after. */
  private model: { readonly at: number; readonly fitted: RidgeModel } | undefined
  private measured: Measured | undefined

  constructor(state: SurrogateState | null) {
    this.window = new LessonWindow(
      Math.max(fitWindow + fitInterval, skillWindow),
      state?.window ?? emptyWindow,
    )
    this.offered = state?.offered ?? 0
    this.chosen = state?.chosen ?? 0
  }

  state(): SurrogateState {
    const { skill, predictions } = this.measure()
    return {
      skill,
      predictions,
      aside: !this.isTrusted,
      offered: this.offered,
      chosen: this.chosen,
      window: this.window.state(),
    }
  }

  /** Takes in what an evaluation came to, after noting what would have been said of it. */
  learn(form: NormalForm, cls: TwoFaceClass, merit: Merit): void {
    const features = classFeatures(form, cls)
    this.window.add({ features, merit, predicted: this.fitted()?.predict(features) ?? NaN })
  }

  /**
   * Rank correlation of the latest predictions, made before the evaluation, with the outcomes' order; null while
   * there are too few.
   */
  get skill(): number | null {
    return this.measure().skill
  }

  get isTrusted(): boolean {
    return (this.skill ?? 0) >= leastSkill
  }

  /**
   * The best of a few draws, as far as the surrogate can tell; plainly the next draw while it is not trusted, and
   * sometimes in any case, so that it also learns from what it would not choose.
   *
   * @param prospectOf what a draw leads to; null when it leads nowhere
   */
  choose<T>(stream: RandomStream, draw: () => T, prospectOf: (drawn: T) => Prospect | null): T {
    const model = this.isTrusted ? this.fitted() : undefined
    if (model === undefined || stream.uniform() < exploration) return draw()
    const draws = Array.from({ length: choices }, draw)
    const ranked = draws
      .flatMap((drawn) => {
        const prospect = prospectOf(drawn)
        if (prospect === null) return []
        return [{ drawn, prospect, predicted: model.predict(classFeatures(prospect.form, prospect.class)) }]
      })
      .sort((a, b) => b.predicted - a.predicted)
    this.offered += ranked.length
    const best = ranked.find(({ prospect }) => !prospect.isKnown())
    if (best === undefined) return draws[0]
    this.chosen++
    return best.drawn
  }

  /** The number of lessons after which the model in force was, or will be, fitted. */
  private lastFit(): number {
    return this.window.total - (this.window.total % fitInterval)
  }

  private fitted(): RidgeModel | undefined {
    const at = this.lastFit()
    if (at < fewestToFit) return undefined
    if (this.model?.at !== at) {
      const lessons = this.window.between(at - fitWindow, at)
      const ranks = midranks(
        lessons.map(({ merit }) => merit),
        (a, b) => compareMerits(b, a),
      )
      this.model = {
        at,
        fitted: fitRidge(
          lessons.map(({ features }) => features),
          normalScores(ranks),
        ),
      }
    }
    return this.model.fitted
  }

  private measure(): Measured {
    const at = this.lastFit()
    if (this.measured?.at !== at) this.measured = { at, ...this.skillBefore(at) }
    return this.measured
  }

  private skillBefore(at: number): Omit<Measured, 'at'> {
    const lessons = this.window
      .between(at - skillWindow, at)
      .filter(({ predicted }) => !Number.isNaN(predicted))
    const predictions = lessons.length
    if (predictions < fewestPredictions) return { skill: null, predictions }
    const said = midranks(
      lessons.map(({ predicted }) => predicted),
      (a, b) => a - b,
    )
    const came = midranks(
      lessons.map(({ merit }) => merit),
      (a, b) => compareMerits(b, a),
    )
    return { skill: rankCorrelation(said, came), predictions }
  }
}
