import {
  canonicalClass,
  countClasses,
  normalForm,
  polytopeFromPoints,
  ReverseSearch,
  type WalkPosition,
} from '../../../scoring/index.ts'

/** Exact numbers as far as short walks give them; as digits, since a product may be large. */
export interface ClassNumbers {
  readonly classes: string | null
  /** Modulo automorphisms. */
  readonly candidates: string | null
}

/** Most classes walked in one piece: a second or two. */
const shortWalk = 1_000

/** What products over independent 2-faces and short walks tell of the number of classes. */
export function classNumbers({ vertices }: Pick<ClassCountInput, 'vertices'>): ClassNumbers {
  const { classes, candidates } = countClasses(normalForm(polytopeFromPoints(vertices)), shortWalk)
  return { classes: classes?.toString() ?? null, candidates: candidates?.toString() ?? null }
}

export interface ClassCountInput {
  /** In normal-form coordinates. */
  readonly vertices: readonly (readonly number[])[]
  /** Where the walk over all classes stands; null: at its beginning. */
  readonly position: WalkPosition | null
  /** How many classes to go through in this slice. */
  readonly most: number
}

export interface ClassCountSlice {
  /** null when all classes have been met. */
  readonly position: WalkPosition | null
  readonly classes: number
  /** Class keys met in this slice: one per orbit of the automorphism group, each once. */
  readonly keys: string[]
}

/** A slice of a walk that meets every fine regular 2-face class of a polytope once. */
export function classCount({ vertices, position, most }: ClassCountInput): ClassCountSlice {
  const form = normalForm(polytopeFromPoints(vertices))
  const walk = new ReverseSearch(form.polytope, position ?? undefined)
  const keys = new Set<string>()
  let classes = 0
  const meet = () => {
    classes += 1
    keys.add(canonicalClass(form, walk.class).key)
  }
  if (position === null) meet()
  while (classes < most) {
    if (!walk.next()) return { position: null, classes, keys: [...keys] }
    meet()
  }
  return { position: walk.position(), classes, keys: [...keys] }
}
