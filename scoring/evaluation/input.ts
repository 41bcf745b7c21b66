import { z } from 'zod'
import { InputError } from '../errors.ts'
import { heightBound } from '../geometry/faceSheets.ts'
import { quadraticHeights } from '../geometry/heights.ts'
import { polytopeFromPoints, type Polytope } from '../geometry/polytope.ts'
import { polytopeFromWeights } from '../geometry/weights.ts'
import { checkRule } from '../rules/check.ts'
import type { CheckedRule } from '../rules/checkedRule.ts'

/** Parts of an evaluation that can be asked for one by one. */
export const evaluationParts = [
  'triangles',
  'intersections',
  'c2',
  'divisors',
  'curves',
  'reference',
  'metric',
] as const
export type EvaluationPart = (typeof evaluationParts)[number]

// The entries of points and weights are left to the geometry, whose messages say which is wrong and how.
const rows = z.array(z.array(z.unknown()))
const heightsSchema = z.union([
  z.strictObject({ points: rows, values: z.array(z.unknown()) }),
  z.strictObject({ seed: z.unknown().optional(), noise: z.unknown().optional() }),
])

/** A polytope as people give it: points, or a weight system and a side. */
export const polytopeInputShape = {
  vertices: rows.optional(),
  weights: z.array(z.unknown()).optional(),
  side: z.enum(['fan', 'newton']).optional(),
}

/** The input of a headless evaluation. */
export const evaluationInputSchema = z.strictObject({
  ...polytopeInputShape,
  heights: heightsSchema.optional(),
  rule: z.string().optional(),
  scale: z.number().positive().optional(),
  show: z.array(z.enum(evaluationParts)).optional(),
})
export type EvaluationInput = z.infer<typeof evaluationInputSchema>

/**
 * Checks an input against its schema.
 * @throws InputError input.not-an-object, input.unknown-field, input.wrong-type, with the path of the field
 */
export function parsedInput<T>(schema: z.ZodType<T>, input: unknown): T {
  const parsed = schema.safeParse(input, { reportInput: true })
  if (parsed.success) return parsed.data
  const [issue] = parsed.error.issues
  const path = jsonPath(issue.path)
  if (issue.code === 'unrecognized_keys') {
    const [name] = issue.keys
    const where = path === '' ? '' : ` of ${path}`
    throw new InputError(
      'input.unknown-field',
      `There is no field ${JSON.stringify(name)}${where}.`,
      path === '' ? name : `${path}.${name}`,
    )
  }
  if (path === '') {
    throw new InputError(
      'input.not-an-object',
      'The input is no object; give { "vertices": [...] } or the like.',
    )
  }
  const problem = issue.code === 'invalid_union' ? 'give points and values, or seed and noise' : issue.message
  throw new InputError('input.wrong-type', `${path}: ${problem}.`.replace(/\.\.$/, '.'), path, issue.input)
}

/** `a.b[2].c` of a list of names and indices. */
function jsonPath(parts: readonly PropertyKey[]): string {
  return parts.reduce<string>(
    (path, part) =>
      typeof part === 'number' ? `${path}[${part}]` : path === '' ? String(part) : `${path}.${String(part)}`,
    '',
  )
}

/** Runs a check of one field; the path of what it throws gets the field's name in front. */
export function within<T>(field: string, check: () => T): T {
  try {
    return check()
  } catch (error) {
    if (!(error instanceof InputError)) throw error
    const path =
      error.path === '' || error.path.startsWith('[') ? `${field}${error.path}` : `${field}.${error.path}`
    throw new InputError(error.code, error.message, path, error.found)
  }
}

/**
 * The polytope of an input.
 * @throws InputError of the geometry, and input.no-polytope, input.two-polytopes, input.no-side
 */
export function polytopeOfInput(input: Pick<EvaluationInput, 'vertices' | 'weights' | 'side'>): Polytope {
  const { vertices, weights, side } = input
  if (vertices !== undefined && weights !== undefined) {
    throw new InputError(
      'input.two-polytopes',
      'Both vertices and weights are given; give one of them.',
      'weights',
    )
  }
  if (vertices !== undefined) {
    if (side !== undefined) {
      throw new InputError(
        'input.two-polytopes',
        'A side belongs to weights; vertices have none.',
        'side',
        side,
      )
    }
    return within('vertices', () => polytopeFromPoints(vertices as number[][]))
  }
  if (weights === undefined) {
    throw new InputError('input.no-polytope', 'There is no polytope; give vertices, or weights and a side.')
  }
  if (side === undefined) {
    throw new InputError(
      'input.no-side',
      'Weights need a side: "fan" (the weighted hypersurface) or "newton" (its mirror).',
      'side',
    )
  }
  return within('weights', () => polytopeFromWeights(weights as number[], side))
}

/**
 * The heights of an input, one integer per point of the polytope; default |v|^2 with the least noise that breaks
 * ties.
 * @throws InputError heights.missing-point, heights.no-such-point, heights.point-twice, and those of the geometry
 */
export function heightsOfInput(polytope: Polytope, given: EvaluationInput['heights']): Float64Array {
  if (given === undefined) return quadraticHeights(polytope)
  if (!('points' in given)) {
    const { seed, noise } = given as { seed?: number; noise?: number }
    return within('heights', () => quadraticHeights(polytope, { seed, noise }))
  }
  const { points, values } = given
  if (points.length !== values.length) {
    throw new InputError(
      'heights.wrong-count',
      `${points.length} points have ${values.length} values; give one value for each point.`,
      'heights.values',
      values.length,
    )
  }
  const indexOf = new Map<string, number>()
  for (let p = 0; p < polytope.pointCount; p++) indexOf.set(pointName(polytope, p), p)
  const heights = new Float64Array(polytope.pointCount)
  const from = new Int32Array(polytope.pointCount).fill(-1)
  points.forEach((point, n) => {
    const name = point.map(String).join(', ')
    const p = indexOf.get(name)
    const path = `heights.points[${n}]`
    if (p === undefined) {
      throw new InputError(
        'heights.no-such-point',
        `(${name}) is no point of the polytope (the points are its lattice points but the origin and those inside facets).`,
        path,
        point,
      )
    }
    if (from[p] >= 0) {
      throw new InputError(
        'heights.point-twice',
        `(${name}) is listed twice, first as points[${from[p]}].`,
        path,
        point,
      )
    }
    from[p] = n
    heights[p] = typeof values[n] === 'number' ? values[n] : NaN
    if (!Number.isInteger(heights[p])) {
      throw new InputError(
        'heights.not-integers',
        `The height of (${name}) is ${JSON.stringify(values[n])}; heights are integers.`,
        `heights.values[${n}]`,
        values[n],
      )
    }
  })
  const missing = from.indexOf(-1)
  if (missing >= 0) {
    const count = from.filter((n) => n < 0).length
    const more = count > 1 ? ` and of ${count - 1} more` : ''
    throw new InputError(
      'heights.missing-point',
      `The height of (${pointName(polytope, missing)})${more} is missing; list every point.`,
      'heights.points',
    )
  }
  const bound = heightBound(polytope)
  const large = heights.findIndex((height) => Math.abs(height) > bound)
  if (large >= 0) {
    throw new InputError(
      'heights.too-large',
      `The height of (${pointName(polytope, large)}) is ${heights[large]}; beyond ${bound} in size the comparisons on this polytope would not be exact.`,
      `heights.values[${from[large]}]`,
      heights[large],
    )
  }
  return heights
}

function pointName({ points }: Polytope, p: number): string {
  return points.subarray(4 * p, 4 * p + 4).join(', ')
}

/**
 * The rule of an input.
 * @throws InputError with the code of the first error (`rule.CODE`), its line and column in the message
 */
export function ruleOfInput(text: string): CheckedRule {
  const check = checkRule(text)
  if (check.ok) return check.rule
  const issue = check.issues.find(({ severity }) => severity === 'error') ?? check.issues[0]
  const { code, line, column, message } = issue
  throw new InputError(`rule.${code}`, `line ${line}, column ${column}: ${message}`, 'rule', {
    line,
    column,
    found: issue.found ?? null,
  })
}
