import type { Certificate } from './schema.ts'

/** What a certificate does not vouch for, each with the reason. */
export function notCertified(favourable: boolean): Certificate['notCertified'] {
  return [
    ...(favourable
      ? []
      : [
          {
            what: 'the part of H11 beyond toric divisors',
            why: 'The polytope is not favourable; divisors, cone and metric are those of the toric part.',
          },
        ]),
    {
      what: 'normal form and least image',
      why: 'The keys are shown to address these vertices and triangles; that no equivalent ones come first is the fast road’s word.',
    },
  ]
}
