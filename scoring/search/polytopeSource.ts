import { InputError } from '../errors.ts'
import { normalForm, type NormalForm } from '../geometry/normalForm.ts'
import { polytopeFromPoints } from '../geometry/polytope.ts'

/** The polytopes of a scope: how many, their permanent addresses, and each in normal form on demand. */
export interface PolytopeSource {
  readonly count: number
  readonly keys: readonly string[]
  at(index: number): NormalForm
}

/** One polytope as plain data. */
export interface PolytopeEntry {
  /** Key of its normal form. */
  readonly key: string
  /** Vertices (or any points whose hull it is), in any coordinates. */
  readonly vertices: readonly (readonly number[])[]
}

/**
 * Normal forms by key, as many as hold `limit` points together (and the last one in any case); the one used
 * longest ago makes room. Shared by the segments of one worker. What it holds never changes a result, only the
 * time it takes.
 */
export class FormCache {
  private readonly forms = new Map<string, NormalForm>()
  private points = 0

  constructor(private readonly limit = 10_000) {}

  form({ key, vertices }: PolytopeEntry, path = ''): NormalForm {
    const known = this.forms.get(key)
    if (known !== undefined) {
      this.forms.delete(key)
      this.forms.set(key, known)
      return known
    }
    const form = normalForm(polytopeFromPoints(vertices))
    if (form.key !== key) {
      throw new InputError(
        'polytope.key',
        `The polytope given under the key ${key} has the key ${form.key}.`,
        path,
        key,
      )
    }
    this.forms.set(key, form)
    this.points += form.polytope.pointCount
    for (const [oldest, { polytope }] of this.forms) {
      if (this.points <= this.limit || this.forms.size === 1) break
      this.forms.delete(oldest)
      this.points -= polytope.pointCount
    }
    return form
  }
}

/**
 * A source made from vertex lists. Each polytope is built when it is first asked for.
 * @throws InputError for an empty list, a key named twice, and (from `at`) a key that is not the polytope's
 */
export function polytopeSource(
  entries: readonly PolytopeEntry[],
  cache: FormCache = new FormCache(),
): PolytopeSource {
  if (entries.length === 0) {
    throw new InputError('scope.empty', 'The scope holds no polytope; give at least one.', 'scope.polytopes')
  }
  const keys = entries.map((entry) => entry.key)
  const seen = new Set<string>()
  for (const [n, key] of keys.entries()) {
    if (seen.has(key)) {
      throw new InputError(
        'scope.twice',
        `Polytope ${n} of the scope has the normal form ${key} of an earlier one; name each once.`,
        `scope.polytopes[${n}]`,
        key,
      )
    }
    seen.add(key)
  }
  return {
    count: entries.length,
    keys,
    at(index) {
      return cache.form(entries[index], `scope.polytopes[${index}]`)
    },
  }
}
