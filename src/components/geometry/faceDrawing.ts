import { type z } from 'zod'
import { type twoFaceSchema } from '../../../shared/polytopes.ts'
import { compactPlane, edgesOf, extent, type Point2 } from './facePlane.ts'

export type TwoFaceView = z.infer<typeof twoFaceSchema>
export type Triangle = readonly [number, number, number]

/** A 2-face ready to be drawn: coordinates per point index, and its triangulation when there is one. */
export interface FaceDrawing {
  /** Index of the 2-face in its polytope. */
  index: number
  dualLength: number
  area: number
  points: readonly number[]
  corners: readonly number[]
  at: ReadonlyMap<number, Point2>
  width: number
  height: number
  triangles: readonly Triangle[]
  edges: readonly (readonly [number, number])[]
}

export function drawingOf(face: TwoFaceView, index: number, triangles: readonly Triangle[]): FaceDrawing {
  const place = new Map(face.points.map((point, at) => [point, face.plane[at] ?? ([0, 0] as Point2)]))
  const cornerPlaces = face.corners.map((corner) => place.get(corner) ?? ([0, 0] as Point2))
  const compact = compactPlane(face.plane, cornerPlaces)
  const [width, height] = extent(compact)
  return {
    index,
    dualLength: face.dualLength,
    area: face.area,
    points: face.points,
    corners: face.corners,
    at: new Map(face.points.map((point, at) => [point, compact[at] ?? ([0, 0] as Point2)])),
    width,
    height,
    triangles,
    edges: edgesOf(triangles),
  }
}

/** Drawings of all 2-faces, largest first; `faceOf` gives the 2-face of each triangle. */
export function drawingsOf(
  faces: readonly TwoFaceView[],
  triangles: readonly Triangle[] = [],
  faceOf: readonly number[] = [],
): FaceDrawing[] {
  const byFace = faces.map((): Triangle[] => [])
  triangles.forEach((triangle, at) => byFace[faceOf[at] ?? -1]?.push(triangle))
  return faces
    .map((face, index) => drawingOf(face, index, byFace[index] ?? []))
    .sort((a, b) => b.area - a.area || a.index - b.index)
}

export function dualLengthsOf(faces: readonly { dualLength: number }[]): number[] {
  return [...new Set(faces.map(({ dualLength }) => dualLength))].sort((a, b) => a - b)
}
