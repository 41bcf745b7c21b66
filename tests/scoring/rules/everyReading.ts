import { dependsOnBasis } from '../../../scoring/observables/metric.ts'
import type { Field } from '../../../scoring/observables/observable.ts'
import { OBSERVABLES } from '../../../scoring/observables/registry.ts'

/** Where fields that may be undefined are defined. */
const DEFINED: ReadonlyMap<string, string> = new Map([
  ['divisors.delPezzoDegree', 'x.delPezzo'],
  ['components.delPezzoDegree', 'x.delPezzo'],
  ['axions.separation', 'h11 > 1'],
  ['rigidAxions.separation', 'count(y in rigidAxions : true) > 1'],
  ['sections.type', 'x.dimension == 2'],
])

function readingsOfField(set: string, field: Field): string[] {
  if (field.kind === 'members')
    return ['max', 'sum'].map((fold) => `${fold}(x in ${set} : count(y in x.${field.name} : true))`)
  if (field.kind === 'element') return [`count(x in ${set} : any(y in ${field.of} : y == x.${field.name}))`]
  if (field.type === 'truth') return [`count(x in ${set} : x.${field.name})`]
  const defined = DEFINED.get(`${set}.${field.name}`)
  if ((defined === undefined) !== (field.undefinedWhen === undefined))
    throw new Error(`say where ${set}.${field.name} is defined`)
  const where = defined ? ` where ${defined}` : ''
  return ['min', 'max', 'sum', 'mean'].map((fold) => `${fold}(x in ${set}${where} : x.${field.name})`)
}

/** Expressions that read every observable and field that does not depend on a basis, several ways each. */
export const everyReading: readonly string[] = OBSERVABLES.filter(
  ({ name }) => !dependsOnBasis(name),
).flatMap((observable) => {
  switch (observable.kind) {
    case 'scalar':
      return [observable.name]
    case 'numbers':
      return ['min', 'max', 'sum'].map((fold) => `${fold}(x in ${observable.name} : x)`)
    case 'records':
      return observable.fields.flatMap((field) => readingsOfField(observable.name, field))
    case 'relation':
      return []
  }
})

/**
 * Patterns that join several divisors. Comparisons of volumes keep off equality: volumes that are equal in
 * exact arithmetic differ by rounding.
 */
export const patterns: readonly string[] = [
  'count(t in triples where t.number == 1 : any(d in divisors : all(x in t.divisors : not meet(x, d))))',
  'count(p in pairs : p.a.volume > 1.0000137 * p.b.volume and p.aab < 0)',
  'sum(a in divisors : sum(b in a.neighbours : kappa(a, a, b) * b.c2))',
  'max(a in divisors : min(b in a.neighbours : b.volume / a.volume) else 0)',
  'count(t in triangles where t.face.dualLength > 1 : any(d in t.divisors : d.carrier == 2))',
  'quantile(0.3, p in pairs : p.a.volume * p.b.volume)',
  'count(c in curves : any(d in c.divisors : d.rigid) and c.negative > 0)',
  'max(f in faces : sum(d in f.divisors : d.cubic))',
  'sum(s in sections where s.dimension == 3 : sum(d in s.divisors : d.c2) * count(t in s.inside : t.type > 4))',
  'count(g in genusOneFibrations where g.hasSection : any(k in g.k3Fibrations : k.section.corners > 4))',
  'max(x in axions : min(d in x.divisors : d.volume) * x.decayConstant) else 0',
]
