import { classFromHeights, InvariantError, polytopeFromPoints } from '../../../scoring/index.ts'
import type { ClassPicture } from '../../../shared/candidates.ts'
import { presentTwoFace } from './polytopeShape.ts'

export interface ClassPicturesInput {
  /** Vertices in normal-form coordinates. */
  readonly vertices: readonly number[][]
  readonly candidates: readonly { readonly key: string; readonly heights: readonly number[] }[]
}

/** 2-faces in a picture. */
const facesShown = 2

/** Pictures of stored candidates on one polytope, in their order: its largest 2-faces with their triangles. */
export function classPictures({ vertices, candidates }: ClassPicturesInput): ClassPicture[] {
  const polytope = polytopeFromPoints(vertices)
  const shown = polytope.twoFaces
    .map((face, index) => ({ face, index }))
    .sort((a, b) => b.face.area - a.face.area || a.index - b.index)
    .slice(0, facesShown)
  const dualLengths = [...new Set(polytope.twoFaces.map(({ dualLength }) => dualLength))].sort(
    (a, b) => a - b,
  )
  return candidates.map(({ key, heights }) => {
    const given = classFromHeights(polytope, heights)
    if (!given.fine) throw new InvariantError(`The stored heights of candidate ${key} are not fine.`)
    const { triangles, faceOf } = given.class
    const faces = shown.map(({ face, index }) => {
      const own: [number, number, number][] = []
      faceOf.forEach((of, t) => {
        if (of === index) own.push([triangles[3 * t], triangles[3 * t + 1], triangles[3 * t + 2]])
      })
      return { ...presentTwoFace(face), index, triangles: own }
    })
    return { key, faces, dualLengths }
  })
}
