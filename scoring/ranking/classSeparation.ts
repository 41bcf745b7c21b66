import type { NormalForm } from '../geometry/normalForm.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'

/**
 * Classes on one polytope of which each differs from all others in at least `least` triangles, the difference being
 * the one of `trianglesApart`: triangles that one has and the other has not, the least over the automorphisms of the
 * polytope. The images of the classes taken in are kept as lists of numbered triangles, so that a comparison is one
 * pass over one list which ends as soon as the difference is large enough.
 */
export class ClassSeparation {
  /** Of every class taken in, one list per automorphism. */
  private readonly images: (readonly Int32Array[])[] = []
  private readonly numbers = new Map<number, number>()
  /** For each numbered triangle the last class looked at that has it. */
  private seenIn: Int32Array = new Int32Array(1024).fill(-1)
  private looks = 0

  /**
   * @param form the polytope; classes are given on `form.polytope`
   * @param least at least this many triangles apart; 1 keeps out equivalent classes only
   */
  constructor(
    private readonly form: NormalForm,
    private readonly least: number,
  ) {}

  /** Takes a class in, unless one that was taken in before is nearer than allowed. Returns whether it was. */
  admit(cls: TwoFaceClass): boolean {
    const own = this.numbered(cls.triangles, undefined)
    const look = this.looks++
    for (const triangle of own) this.seenIn[triangle] = look
    if (this.images.some((images) => images.some((image) => !this.differs(image, look)))) return false
    this.images.push(this.form.automorphisms.map((image) => this.numbered(cls.triangles, image)))
    return true
  }

  private differs(image: Int32Array, look: number): boolean {
    let missing = 0
    for (const triangle of image) if (this.seenIn[triangle] !== look && ++missing >= this.least) return true
    return this.least <= 0
  }

  private numbered(triangles: ArrayLike<number>, image: ArrayLike<number> | undefined): Int32Array {
    const n = this.form.polytope.pointCount
    const list = new Int32Array(triangles.length / 3)
    for (let t = 0; t < list.length; t++) {
      const at = (corner: number) => {
        const point = triangles[3 * t + corner]
        return image === undefined ? point : image[point]
      }
      const [p, q, r] = [at(0), at(1), at(2)]
      const low = Math.min(p, q, r)
      const high = Math.max(p, q, r)
      list[t] = this.numberOf((low * n + (p + q + r - low - high)) * n + high)
    }
    return list
  }

  private numberOf(code: number): number {
    const known = this.numbers.get(code)
    if (known !== undefined) return known
    const number = this.numbers.size
    this.numbers.set(code, number)
    if (number >= this.seenIn.length) {
      const longer = new Int32Array(2 * this.seenIn.length).fill(-1)
      longer.set(this.seenIn)
      this.seenIn = longer
    }
    return number
  }
}
