import {
  assemble,
  ClassSeparation,
  classFromHeights,
  InvariantError,
  normalForm,
  polytopeFromPoints,
  type AssemblyRule,
  type Contender,
  type NormalForm,
  type TwoFaceClass,
} from '../../../scoring/index.ts'

export interface AssembleInput {
  readonly contenders: readonly Contender[]
  readonly rule: Omit<AssemblyRule, 'admit'>
  /** Triangles by which candidates on one polytope differ, at least. */
  readonly apart: number
  /** Heights by candidate key and vertices by polytope key, as JSON texts: most are never looked at. */
  readonly heights: Readonly<Record<string, string>>
  readonly polytopes: Readonly<Record<string, string>>
}

/** Draws a list whose members on one polytope differ in enough triangles. */
export function assembleShortlist({ contenders, rule, apart, heights, polytopes }: AssembleInput) {
  const polytopeOf = new Map(contenders.map(({ key, polytopeKey }) => [key, polytopeKey]))
  const separations = new Map<string, Separation>()
  const admit = (key: string): boolean => {
    const polytopeKey = polytopeOf.get(key)
    if (polytopeKey === undefined) throw new InvariantError(`The candidate ${key} has no polytope.`)
    let separation = separations.get(polytopeKey)
    if (separation === undefined) {
      separation = new Separation(polytopes[polytopeKey], apart, (one) => heights[one])
      separations.set(polytopeKey, separation)
    }
    return separation.admit(key)
  }
  const { chosen, ...rest } = assemble(contenders, { ...rule, admit })
  return { ...rest, chosen: chosen.map(({ contender, front }) => ({ key: contender.key, front })) }
}

/** The candidates taken so far on one polytope. The first is compared with nothing, and often it is the only one. */
class Separation {
  private first: string | undefined
  private form: NormalForm | undefined
  private classes: ClassSeparation | undefined

  constructor(
    private readonly vertices: string,
    private readonly apart: number,
    private readonly heightsOf: (key: string) => string,
  ) {}

  admit(key: string): boolean {
    if (this.first === undefined) {
      this.first = key
      return true
    }
    if (this.form === undefined || this.classes === undefined) {
      this.form = normalForm(polytopeFromPoints(JSON.parse(this.vertices) as number[][]))
      this.classes = new ClassSeparation(this.form, this.apart)
      this.classes.admit(this.classOf(this.form, this.first))
    }
    return this.classes.admit(this.classOf(this.form, key))
  }

  private classOf(form: NormalForm, key: string): TwoFaceClass {
    const heights = JSON.parse(this.heightsOf(key)) as number[]
    const outcome = classFromHeights(form.polytope, heights)
    if (!outcome.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
    return outcome.class
  }
}
