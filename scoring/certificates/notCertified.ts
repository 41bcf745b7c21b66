import type { CheckedRule } from '../rules/checkedRule.ts'
import type { Certificate } from './schema.ts'

/**
 * Observables whose values rest on certified numbers alone: the number itself is compared, or the registry's
 * formula reads nothing but compared ones. A name stands for all that begin with it and a dot. Anything the
 * registry has beside these counts as not certified until it is listed here.
 */
export const certifiedNames: readonly string[] = [
  'favourable',
  'h11',
  'h21',
  'euler',
  'polytope.points',
  'polytope.vertices',
  'polytope.edges',
  'polytope.faces',
  'polytope.facets',
  'polytope.latticePoints',
  'polytope.dualLatticePoints',
  'polytope.edgePoints',
  'polytope.facePoints',
  'polytope.facetPoints',
  'polytope.normalisedVolume',
  'polytope.dualNormalisedVolume',
  'polytope.rigidDivisors',
  'polytope.rigidComponents',
  'divisors',
  'pairs',
  'triples',
  'triangles',
  'curves',
  'kappa',
  'meet',
  'swissCheese',
  'volume',
  'reference.norm',
  'reference.edgeCurvesSuffice',
  'metric.divisor',
  'metric.basis',
]

/** Exceptions among the names above, and reasons for names elsewhere. */
const reasons: readonly (readonly [string, string])[] = [
  ['triangles.face', 'The 2-faces as objects are the fast road’s.'],
  [
    'faces',
    'The 2-faces as objects are the fast road’s; their number and the triangles on them are certified.',
  ],
  ['sections', 'Reflexive sections are found by the fast road alone.'],
  ['k3Fibrations', 'Fibrations are read off the certified triangles, but by the fast road alone.'],
  ['genusOneFibrations', 'Fibrations are read off the certified triangles, but by the fast road alone.'],
  ['polytope.symmetry', 'Automorphisms are found by the fast road alone.'],
  ['axions', 'Follows from certified intersection numbers and volumes by the fast road’s code.'],
  ['rigidAxions', 'Follows from certified intersection numbers and volumes by the fast road’s code.'],
]

const byTheFastRoad = 'Read by the fast road alone.'

const covers = (name: string, mentioned: string): boolean =>
  mentioned === name || mentioned.startsWith(`${name}.`)

/** Why an observable or field is not certified; null when it is. */
export function reservation(mentioned: string): string | null {
  const reason = reasons.find(([name]) => covers(name, mentioned))?.[1]
  if (reason !== undefined) return reason
  return certifiedNames.some((name) => covers(name, mentioned)) ? null : byTheFastRoad
}

/** What a certificate does not vouch for, each with the reason. */
export function notCertified(favourable: boolean, rule: CheckedRule | null): Certificate['notCertified'] {
  const unsure = (rule?.observables ?? []).flatMap((what) => {
    const why = reservation(what)
    return why === null ? [] : [{ what, why }]
  })
  return [
    ...unsure,
    ...(favourable
      ? []
      : [
          {
            what: 'the part of H11 beyond toric divisors',
            why: 'The polytope is not favourable; divisors, cone and metric are those of the toric part.',
          },
        ]),
    {
      what: 'the whole Kaehler cone',
      why: 'The reference point is shown to lie in the inner cone; the cone of the threefold may be larger.',
    },
    {
      what: 'normal form and least image',
      why: 'The keys are shown to address these vertices and triangles; that no equivalent ones come first is the fast road’s word.',
    },
  ]
}
