import type { NormalForm } from '../../geometry/normalForm.ts'

const known = new WeakMap<NormalForm, readonly number[]>()

/** Numbers of a polytope that cost nothing once it is built, the same in all coordinates. */
export function polytopeFeatures(form: NormalForm): readonly number[] {
  let features = known.get(form)
  if (features === undefined) {
    const { polytope } = form
    const { hodge, carrierDimension, twoFaces, dualInterior } = polytope
    const carried = [0, 1, 2].map((dimension) => carrierDimension.filter((d) => d === dimension).length)
    const areas = twoFaces.map(({ area }) => area)
    features = [
      hodge.h11,
      Math.log1p(hodge.h21),
      polytope.pointCount,
      ...carried,
      polytope.facetCount,
      twoFaces.length,
      polytope.edges.length,
      polytope.favourable ? 1 : 0,
      Math.log(form.automorphisms.length),
      Math.log(polytope.latticePoints),
      Math.log(polytope.dualLatticePoints),
      Math.log1p(dualInterior.reduce((sum, n) => sum + n, 0)),
      Math.log(twoFaces.reduce((sum, { dualLength }) => sum + dualLength, 0)),
      Math.max(...areas),
      Math.log(areas.reduce((sum, area) => sum + area * area, 0)),
    ]
    known.set(form, features)
  }
  return features
}
