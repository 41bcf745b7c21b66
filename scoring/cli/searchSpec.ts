import { z } from 'zod'
import { InputError } from '../errors.ts'
import { parsedInput, polytopeInputShape, polytopeOfInput, ruleOfInput, within } from '../evaluation/input.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { classFromHeights } from '../geometry/twoFaceClass.ts'
import { isMethodName, methodNames } from '../search/methods.ts'
import type { NullLawName } from '../search/nullLaws.ts'
import { nullSizeLimit } from '../search/nullSample.ts'
import { extensionsSchema } from '../search/extensions.ts'
import type { PolytopeEntry } from '../search/polytopeSource.ts'
import { searchSettingsSchema, type SearchSettings } from '../search/settings.ts'
import { requireSoundStarts, startSchema, type GivenStart } from '../search/givenStarts.ts'

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
  settings: searchSettingsSchema.omit({ budget: true, islands: true, keep: true }).partial().default({}),
  /** Candidates to begin from, the best first; heights as in the lines of finds. */
  starts: z.array(startSchema).default([]),
  /** Budget added after that: see `extensionsSchema`. */
  extensions: extensionsSchema.default([]),
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
      law: settings.law,
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
  readonly starts: readonly GivenStart[]
  readonly extensions: readonly number[]
  readonly null?: { readonly size: number; readonly seed: number; readonly law?: NullLawName | undefined }
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
  const named = new Set(spec.starts.map(({ polytopeKey }) => polytopeKey))
  const forms = new Map<string, NormalForm>()
  const polytopes = spec.scope.polytopes.map((given, n) => {
    const form = within(`scope.polytopes[${n}]`, () => normalForm(polytopeOfInput(given)))
    const { polytope, key } = form
    if (named.has(key)) forms.set(key, form)
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
    starts: startsOf(spec.starts, forms),
    extensions: spec.extensions,
    ...(spec.null && { null: spec.null }),
  }
}

/** The specification in full, of polytopes in normal form: read again it gives the same search. */
export function specOf(spec: SearchSpec): z.input<typeof searchSpecSchema> {
  const { budget, islands, keep, ...settings } = spec.settings
  return {
    schema: 'tessellary.search/1',
    scope: {
      polytopes: spec.polytopes.map(({ vertices }) => ({ vertices: vertices.map((row) => [...row]) })),
    },
    rule: spec.ruleText,
    method: spec.method,
    budget,
    seed: spec.seed,
    islands,
    keep,
    settings,
    ...(spec.starts.length > 0 && {
      starts: spec.starts.map((start) => ({ ...start, heights: [...start.heights] })),
    }),
    ...(spec.extensions.length > 0 && { extensions: [...spec.extensions] }),
    ...(spec.null && { null: spec.null }),
  }
}

/** The given candidates with their addresses, which are checked where they are stated. */
function startsOf(
  starts: readonly z.infer<typeof startSchema>[],
  forms: ReadonlyMap<string, NormalForm>,
): GivenStart[] {
  const given = starts.map(({ polytopeKey, classKey, heights }, n) => {
    const form = forms.get(polytopeKey)
    // Outside the scope: said below, with its place.
    if (form === undefined) return { polytopeKey, classKey: classKey ?? '', heights }
    const outcome = within(`starts[${n}]`, () => classFromHeights(form.polytope, heights))
    if (!outcome.fine) {
      throw new InputError(
        'start.not-fine',
        `The heights are not fine: ${outcome.unused.length} points would not be used.`,
        `starts[${n}].heights`,
        [...outcome.unused],
      )
    }
    const { key } = canonicalClass(form, outcome.class)
    if (classKey !== undefined && classKey !== key) {
      throw new InputError(
        'start.other-key',
        `The heights are those of the candidate ${key}, not of ${classKey}.`,
        `starts[${n}].classKey`,
        classKey,
      )
    }
    return { polytopeKey, classKey: key, heights }
  })
  requireSoundStarts(given, [...forms.keys()])
  return given
}
