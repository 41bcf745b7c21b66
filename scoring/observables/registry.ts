import { axions } from './axions.ts'
import { components } from './components.ts'
import { coneObservables } from './cone.ts'
import { curves } from './curves.ts'
import { divisors } from './divisors.ts'
import { faces } from './faces.ts'
import { genusOneFibrations, k3Fibrations } from './fibrations.ts'
import { metricObservables } from './metric.ts'
import type { Field, Observable, RecordSet } from './observable.ts'
import { pairs } from './pairs.ts'
import { polytopeObservables } from './polytope.ts'
import { polytopeCounts } from './polytopeCounts.ts'
import { relations } from './relations.ts'
import { sections } from './sections.ts'
import { topologyObservables } from './topology.ts'
import { triangles, triples } from './triangles.ts'

/**
 * Every observable, in the order of the reference. The single truth: type checker, completion, hover text,
 * reference page and export headers are made from it. A new observable goes into its group's file (a new
 * group: a new file, listed here).
 */
export const OBSERVABLES: readonly Observable[] = [
  ...polytopeObservables,
  ...polytopeCounts,
  faces,
  sections,
  divisors,
  components,
  pairs,
  triples,
  triangles,
  curves,
  ...topologyObservables,
  k3Fibrations,
  genusOneFibrations,
  ...relations,
  ...coneObservables,
  ...metricObservables,
  ...axions,
]

const byName = new Map(OBSERVABLES.map((observable) => [observable.name, observable]))

/** The observable of a name, or undefined. */
export const findObservable = (name: string): Observable | undefined => byName.get(name)

/** The set of records of a name; for names that fields and relations refer to. */
export function recordSet(name: string): RecordSet {
  const found = byName.get(name)
  if (found?.kind !== 'records') throw new Error(`the registry has no set of records named ${name}`)
  return found
}

const fieldsByName = new Map(
  OBSERVABLES.flatMap((set) =>
    set.kind === 'records' ? [[set.name, new Map(set.fields.map((f) => [f.name, f]))]] : [],
  ),
)

/** The field of a set's elements, or undefined. */
export const findField = (set: RecordSet, name: string): Field | undefined =>
  fieldsByName.get(set.name)?.get(name)
