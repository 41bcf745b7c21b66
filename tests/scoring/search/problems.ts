import { readFileSync } from 'node:fs'
import { normalForm } from '../../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../../scoring/geometry/polytope.ts'
import { checkRule } from '../../../scoring/rules/check.ts'
import type { CheckedRule } from '../../../scoring/rules/checkedRule.ts'
import type { MethodName } from '../../../scoring/search/methods.ts'
import type { SearchProblem } from '../../../scoring/search/problem.ts'
import { polytopeSource, type PolytopeEntry } from '../../../scoring/search/polytopeSource.ts'
import { searchSettingsSchema, type SearchSettings } from '../../../scoring/search/settings.ts'

interface Bundled {
  readonly id: string
  readonly vertices: number[][]
}

const files = ['polytopes-large', 'polytopes-small', 'polytopes-h11-5']
const read = new Map<string, readonly Bundled[]>()

function bundledIn(file: string): readonly Bundled[] {
  let list = read.get(file)
  if (list === undefined) {
    const url = new URL(`../../../server/library/data/${file}.json`, import.meta.url)
    list = (JSON.parse(readFileSync(url, 'utf8')) as { polytopes: Bundled[] }).polytopes
    read.set(file, list)
  }
  return list
}

/** A bundled polytope as search jobs take it. */
export function bundledEntry(id: string): PolytopeEntry {
  for (const file of files) {
    const found = bundledIn(file).find((polytope) => polytope.id === id)
    if (found === undefined) continue
    return { key: normalForm(polytopeFromPoints(found.vertices)).key, vertices: found.vertices }
  }
  throw new Error(`there is no bundled polytope ${id}`)
}

export function ruleOf(text: string): CheckedRule {
  const check = checkRule(text)
  if (!check.ok) throw new Error(check.issues.map(({ message }) => message).join('; '))
  return check.rule
}

export function problemOf(
  ids: readonly string[],
  rule: string,
  method: MethodName,
  settings: Partial<SearchSettings> & Pick<SearchSettings, 'budget'>,
): SearchProblem {
  return {
    polytopes: polytopeSource(ids.map(bundledEntry)),
    rule: ruleOf(rule),
    method,
    settings: searchSettingsSchema.parse(settings),
  }
}
