import { classOfMesh, meshOfClass } from '../../geometry/classMesh.ts'
import { copyMesh, isInside, type FaceMesh } from '../../geometry/faceMesh.ts'
import { ClassSums, hasSums } from '../../geometry/moving/classSums.ts'
import { heightsBetween } from '../../geometry/moving/heightsBetween.ts'
import { LineMotion } from '../../geometry/moving/lineMotion.ts'
import { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { NormalForm } from '../../geometry/normalForm.ts'
import type { TwoFaceClass } from '../../geometry/twoFaceClass.ts'
import type { CheckedRule } from '../../rules/checkedRule.ts'
import { isTopological, MovingEvaluation } from '../../rules/moving/movingEvaluation.ts'
import type { Outcome } from '../../rules/outcome.ts'
import { searchHeightBound } from '../heightGauge.ts'
import type { PlacedHeights } from '../sampling.ts'
import { classWords, wordsOfSums } from '../seenWords.ts'

/** Where a motion stood once, to go back to. */
export interface Checkpoint {
  readonly heights: Float64Array
  readonly mesh: FaceMesh
  readonly numbers: MovingNumbers
  readonly sums: ClassSums | null
}

/**
 * A class that moves along lines of heights on one polytope, with what a search asks of every class on the way: the
 * words by which it is remembered and what a topological rule says, both mended at every exchange.
 */
export class Motion {
  private mesh: FaceMesh
  private numbers: MovingNumbers
  private sums: ClassSums | null
  private evaluation: MovingEvaluation | undefined
  private line: LineMotion | undefined
  /** Where the present line begins; in the present class before one is begun. */
  heights: Float64Array
  private direction: Float64Array | undefined

  /** @param place heights that give their class with every circuit positive */
  constructor(
    readonly form: NormalForm,
    private readonly rule: CheckedRule,
    place: PlacedHeights,
  ) {
    this.heights = place.heights
    this.mesh = copyMesh(meshOfClass(place.class))
    this.numbers = new MovingNumbers(place.class)
    this.sums = hasSums(form) ? new ClassSums(form, place.class) : null
    this.evaluation = this.evaluationOf(this.numbers)
  }

  /** From here on along h + t d, 0 <= t <= 1, h being the heights it started from or was taken back to. */
  aim(direction: Float64Array): void {
    this.direction = direction
    this.line = new LineMotion(this.mesh, this.heights, direction, (i, j, k, l, face) => {
      this.numbers.exchange(i, j, k, l, face)
      this.sums?.exchange(i, j, k, l)
      this.evaluation?.exchanged()
    })
  }

  /** Crosses the next wall of the line; false when its end comes first, or that of the fine cone. */
  cross(): boolean {
    const ahead = this.line?.ahead
    if (this.line === undefined || ahead === undefined || ahead.over >= ahead.under) return false
    return this.line.cross() === 'crossed'
  }

  /** As in `classWords`. */
  words(): [number, number] {
    return this.sums === null ? classWords(this.form, this.class()) : wordsOfSums(this.form, this.sums)
  }

  /** What the rule says, all but the report; undefined: to be asked on the canonical representative. */
  outcome(): Outcome | undefined {
    return this.evaluation?.outcome()
  }

  /** The present class. */
  class(): TwoFaceClass {
    return classOfMesh(copyMesh(this.mesh))
  }

  /** The present class, with heights that may miss it by rounding; good also when the motion has gone on. */
  snapshot(): { class(): TwoFaceClass; readonly heights: Float64Array } {
    const mesh = copyMesh(this.mesh)
    let cls: TwoFaceClass | undefined
    return { class: () => (cls ??= classOfMesh(mesh)), heights: this.here() }
  }

  /**
   * Integer heights about halfway to the next wall. Rounding may have taken them out of the class where walls lie
   * close together: see `liesInside`.
   */
  here(): Float64Array {
    const { line, direction, heights } = this
    if (line === undefined || direction === undefined) return heights
    const { ahead } = line
    const end = ahead === undefined || ahead.over > ahead.under ? { over: 1, under: 1 } : ahead
    return heightsBetween(line.at, end, heights, direction, searchHeightBound) ?? heights
  }

  /** Whether heights give the present class, every circuit positive. */
  liesInside(heights: Float64Array): boolean {
    return isInside(this.mesh, heights)
  }

  /** The present class with heights inside it, to go back to; undefined where none are found on the line. */
  checkpoint(): Checkpoint | undefined {
    const heights = this.here()
    if (!this.liesInside(heights)) return undefined
    return {
      heights,
      mesh: copyMesh(this.mesh),
      numbers: this.numbers.copy(),
      sums: this.sums?.copy() ?? null,
    }
  }

  /** Goes back, ready for another line. The checkpoint is used up. */
  goBack({ heights, mesh, numbers, sums }: Checkpoint): void {
    this.heights = heights
    this.mesh = mesh
    this.numbers = numbers
    this.sums = sums
    this.evaluation = this.evaluationOf(numbers)
    this.line = undefined
    this.direction = undefined
  }

  private evaluationOf(numbers: MovingNumbers): MovingEvaluation | undefined {
    return isTopological(this.rule) ? new MovingEvaluation(this.rule, this.form, numbers) : undefined
  }
}
