import type { CheckedRule } from '../rules/checkedRule.ts'
import type { Certificate } from './schema.ts'

const fieldsOf = (set: string, ...fields: readonly string[]): string[] => [
  set,
  ...fields.map((field) => `${set}.${field}`),
]

/**
 * Observables whose values rest on certified numbers alone: the number itself is compared, or the registry's
 * formula reads nothing but compared ones. Anything the registry has beside these counts as not certified until it
 * is listed here.
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
  ...fieldsOf('divisors', 'volume', 'cubic', 'c2', 'euler', 'chi', 'h1', 'h2', 'components', 'rigid'),
  ...fieldsOf('divisors', 'carrier', 'k3', 'enriques', 'abelian', 'delPezzo', 'delPezzoDegree', 'neighbours'),
  ...fieldsOf('pairs', 'a', 'b', 'aab', 'abb', 'genus'),
  ...fieldsOf('triples', 'number', 'divisors'),
  ...fieldsOf('triangles', 'divisors'),
  ...fieldsOf('curves', 'volume', 'least', 'greatest', 'negative', 'divisors'),
  'kappa',
  'meet',
  'swissCheese',
  'volume',
  'reference.norm',
  'reference.edgeCurvesSuffice',
  ...['divisor', 'basis'].flatMap((kind) => fieldsOf(`metric.${kind}`, 'top', 'bottom', 'spectrum').slice(1)),
]

const sections = 'Reflexive sections are found by the fast road alone.'
const fibrations = 'Fibrations are read off the certified triangles, but by the fast road alone.'
const faces =
  'The 2-faces as objects are the fast road’s; their number and the triangles on them are certified.'
const axions = 'Follows from certified intersection numbers and volumes by the fast road’s code.'

/** Reasons for the others; a name stands for all that begin with it and a dot. */
const reasons: Readonly<Record<string, string>> = {
  'triangles.face': faces,
  faces,
  sections,
  'polytope.planarSections': sections,
  'polytope.solidSections': sections,
  'polytope.nestedSections': sections,
  k3Fibrations: fibrations,
  genusOneFibrations: fibrations,
  'polytope.symmetry': 'Automorphisms are found by the fast road alone.',
  components: 'Follows from certified sums over components by the fast road’s code.',
  axions,
  rigidAxions: axions,
}

/** Why an observable or field is not certified; null when it is. */
export function reservation(mentioned: string): string | null {
  if (certifiedNames.includes(mentioned)) return null
  const name = Object.keys(reasons).find(
    (prefix) => mentioned === prefix || mentioned.startsWith(`${prefix}.`),
  )
  return name === undefined ? 'Read by the fast road alone.' : reasons[name]
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
