import { z } from 'zod'
import { InputError } from '../errors.ts'
import { parsedInput, polytopeInputShape, polytopeOfInput, ruleOfInput, within } from '../evaluation/input.ts'
import { normalForm } from '../geometry/normalForm.ts'
import { isMethodName, methodNames } from '../search/methods.ts'
import { nullSizeLimit } from '../search/nullSample.ts'
import type { PolytopeEntry } from '../search/polytopeSource.ts'
import { searchSettingsSchema, type SearchSettings } from '../search/settings.ts'

const settings = searchSettingsSchema.shape

/** A search without a database. */
export const searchSpecSchema = z.strictObject({
  schema: z.literal('tessellary.search/1'),
  scope: z.strictObject({ polytopes: z.array(z.strictObject(polytopeInputShape)).min(1).max(10_000) }),
  rule: z.string(),
  method: z.string().default('annealing'),
  budget: settings.budget,
  seed: z
    .number()
    .int()
    .min(0)
    .max(2 ** 31)
    .default(1),
  islands: settings.islands,
  keep: settings.keep,
  settings: z
    .strictObject({
      patience: settings.patience,
      descents: settings.descents,
      sample: settings.sample,
    })
    .partial()
    .default({}),
  /** A null sample of so many candidates beside the search, to compare with. */
  null: z
    .strictObject({
      size: z.number().int().min(1).max(nullSizeLimit),
      seed: z
        .number()
        .int()
        .min(0)
        .max(2 ** 31)
        .default(1),
    })
    .optional(),
})

/** A search as jobs need it. */
export interface SearchSpec {
  readonly polytopes: readonly PolytopeEntry[]
  readonly ruleText: string
  readonly method: string
  readonly seed: number
  readonly settings: SearchSettings
  readonly null?: { readonly size: number; readonly seed: number }
}

/**
 * Checks a specification and brings its polytopes to normal form.
 * @throws InputError with the path of the field at fault
 */
export function searchSpec(raw: unknown): SearchSpec {
  const spec = parsedInput(searchSpecSchema, raw)
  if (!isMethodName(spec.method)) {
    throw new InputError(
      'search.method',
      `There is no method ${JSON.stringify(spec.method)}; use one of ${methodNames.join(', ')}.`,
      'method',
      spec.method,
    )
  }
  ruleOfInput(spec.rule)
  const polytopes = spec.scope.polytopes.map((given, n) => {
    const { polytope, key } = within(`scope.polytopes[${n}]`, () => normalForm(polytopeOfInput(given)))
    const vertices = Array.from({ length: polytope.vertexCount }, (_, v) => [
      ...polytope.points.subarray(4 * v, 4 * v + 4),
    ])
    return { key, vertices }
  })
  return {
    polytopes,
    ruleText: spec.rule,
    method: spec.method,
    seed: spec.seed,
    settings: searchSettingsSchema.parse({
      budget: spec.budget,
      islands: spec.islands,
      keep: spec.keep,
      ...spec.settings,
    }),
    ...(spec.null && { null: spec.null }),
  }
}
