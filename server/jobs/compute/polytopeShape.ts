import { dualPolytope, normalForm, polytopeFromPoints, type TwoFace } from '../../../scoring/index.ts'
import type { PolytopeDetail } from '../../../shared/polytopes.ts'
import { rowsOfFour } from './polytopeFacts.ts'

/** What a polytope's page shows beyond its row in the library, and the key under which its dual would stand. */
export type PolytopeShape = Pick<
  PolytopeDetail,
  'pointCoordinates' | 'carrierDimension' | 'components' | 'facetNormals' | 'twoFaces'
> & { readonly dualKey: string }

/** @param vertices in normal-form coordinates */
export function polytopeShape({ vertices }: { readonly vertices: readonly number[][] }): PolytopeShape {
  const polytope = polytopeFromPoints(vertices)
  return {
    pointCoordinates: rowsOfFour(polytope.points),
    carrierDimension: [...polytope.carrierDimension],
    components: [...polytope.components],
    facetNormals: rowsOfFour(polytope.facets),
    twoFaces: polytope.twoFaces.map(presentTwoFace),
    dualKey: normalForm(dualPolytope(polytope)).key,
  }
}

export function presentTwoFace(face: TwoFace): PolytopeDetail['twoFaces'][number] {
  return {
    dualLength: face.dualLength,
    points: [...face.points],
    plane: Array.from({ length: face.points.length }, (_, i): [number, number] => [
      face.plane[2 * i],
      face.plane[2 * i + 1],
    ]),
    corners: [...face.corners],
    area: face.area,
  }
}
