import { InputError, InvariantError } from '../errors.ts'
import { classOfMesh, orient } from './classMesh.ts'
import { meshOf } from './faceMesh.ts'
import { faceSheets, faceWith, type FaceSheets } from './faceSheets.ts'
import { listed, type PointNames } from './pointNames.ts'
import type { Polytope } from './polytope.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/** A triangle that has passed the checks on itself; its corners counterclockwise. */
interface Placed {
  /** Where it stands in the list given. */
  readonly at: number
  readonly face: number
  readonly corners: Int32Array
  /** Normalised area, 1 for a unimodular triangle. */
  readonly area: number
}

/** The 2-faces, and how messages name their points. */
interface NamedSheets extends FaceSheets {
  readonly names: PointNames
}

/**
 * A class from its triangles in any order, as a file or another program may give them. Proves that they are a fine
 * triangulation of every 2-face: all are unimodular, and each edge has one triangle on either side, or one where it
 * lies on the face's boundary. So the number of triangles over a point of the face is the same almost everywhere:
 * one. Regularity is for `isRegular` to say.
 *
 * @param triangles 3 point indices per triangle
 * @param names how messages name points
 * @throws InputError that names the first triangle, edge or 2-face at fault: triangles.wrong-size, .no-such-point,
 *   .repeated-point, .not-on-a-face, .degenerate, .twice, .not-fine, .not-unimodular, .overlap, .gap
 */
export function classFromTriangles(
  polytope: Polytope,
  triangles: ArrayLike<number>,
  names: PointNames = String,
): TwoFaceClass {
  if (triangles.length % 3 !== 0)
    throw fault('wrong-size', `${triangles.length} point indices do not make whole triangles.`)
  const sheets: NamedSheets = { ...faceSheets(polytope), names }
  const placed: Placed[] = []
  const seen = new Map<string, number>()
  for (let at = 0; 3 * at < triangles.length; at++) {
    const named = [triangles[3 * at], triangles[3 * at + 1], triangles[3 * at + 2]]
    placed.push(place(sheets, named, at))
    const name = [...named].sort((p, q) => p - q).join()
    const earlier = seen.get(name)
    if (earlier !== undefined)
      throw fault('twice', `Triangles ${earlier} and ${at} are the same ${listed(named, names)}.`, at, named)
    seen.set(name, at)
  }
  for (const triangle of placed) if (triangle.area !== 1) refuseCoarse(sheets, placed, triangle)
  requirePairs(sheets, placed)
  requireCover(sheets, placed)
  const from = new Int32Array(3 * sheets.triangleCount)
  const filled = sheets.slot.slice(0, -1)
  for (const { face, corners } of placed) from.set(corners, 3 * filled[face]++)
  return classOfMesh(meshOf(sheets, from))
}

function place(sheets: NamedSheets, named: readonly number[], at: number): Placed {
  const { pointCount } = sheets.polytope
  const refuse = (code: string, what: string): never => {
    throw fault(code, `Triangle ${at} ${listed(named, sheets.names)} ${what}.`, at, named)
  }
  for (const p of named) {
    if (!Number.isInteger(p) || p < 0 || p >= pointCount)
      refuse('no-such-point', `names ${p}, which is no point; indices run from 0 to ${pointCount - 1}`)
  }
  const [i, j, k] = [...named].sort((p, q) => p - q)
  if (i === j || j === k) refuse('repeated-point', 'names a point twice')
  const face = faceWith(sheets, i, j, k)
  if (face < 0) refuse('not-on-a-face', 'does not lie on one 2-face')
  const corners = new Int32Array(3)
  const area = Math.abs(orient(sheets, face, i, j, k, corners, 0))
  if (area === 0) refuse('degenerate', 'is degenerate: its points lie on a line')
  return { at, face, corners, area }
}

/** A triangle larger than the unit contains another lattice point. */
function refuseCoarse(sheets: NamedSheets, placed: readonly Placed[], triangle: Placed): never {
  const { start, point } = sheets
  const { at, face, area } = triangle
  const inside: number[] = []
  for (let c = start[face]; c < start[face + 1]; c++)
    if (!triangle.corners.includes(c) && contains(sheets, triangle, c)) inside.push(c)
  const used = new Set(placed.filter((other) => other.face === face).flatMap(({ corners }) => [...corners]))
  const unused = inside.filter((c) => !used.has(c)).map((c) => point[c])
  const named = name(sheets, triangle)
  if (unused.length > 0)
    throw fault(
      'not-fine',
      `The triangles are not fine: triangle ${named} contains ${unused.length === 1 ? 'point' : 'points'} ` +
        `${unused.map((p) => sheets.names(p)).join(', ')}, not used on 2-face ${face}.`,
      at,
      unused,
    )
  throw fault(
    'not-unimodular',
    `Triangle ${named} has area ${area} in place of 1: it contains point ${sheets.names(point[inside[0]])}.`,
    at,
    inside.map((c) => point[c]),
  )
}

/** Every edge has one triangle on either side, but for those on the boundary of their 2-face. */
function requirePairs(sheets: NamedSheets, placed: readonly Placed[]): void {
  const { point } = sheets
  const sideOf = new Map<string, Placed>()
  for (const triangle of placed) {
    const [p, q, r] = triangle.corners
    for (const [c, d] of [
      [p, q],
      [q, r],
      [r, p],
    ]) {
      const edge = `${c},${d}`
      const other = sideOf.get(edge)
      if (other !== undefined)
        throw fault(
          'overlap',
          `Triangles ${name(sheets, other)} and ${name(sheets, triangle)} overlap: they lie on the same side of ` +
            `the edge ${listed([point[c], point[d]], sheets.names)}.`,
          triangle.at,
          [point[c], point[d]],
        )
      sideOf.set(edge, triangle)
    }
  }
  for (const [edge, triangle] of sideOf) {
    const [c, d] = edge.split(',').map(Number)
    if (sideOf.has(`${d},${c}`) || onBoundary(sheets, triangle.face, c, d)) continue
    throw fault(
      'gap',
      `No triangle lies on the other side of the edge ${listed([point[c], point[d]], sheets.names)} of triangle ` +
        `${name(sheets, triangle)} on 2-face ${triangle.face}.`,
      triangle.at,
      [point[c], point[d]],
    )
  }
}

/**
 * A boundary edge of a 2-face has one triangle, so the face is covered once by as many triangles as its area says,
 * unless it has none at all.
 */
function requireCover(sheets: NamedSheets, placed: readonly Placed[]): void {
  const { slot, polytope } = sheets
  const counts = new Int32Array(polytope.twoFaces.length)
  for (const { face } of placed) counts[face]++
  counts.forEach((count, face) => {
    const { corners } = polytope.twoFaces[face]
    if (count === 0)
      throw fault(
        'gap',
        `No triangle lies on 2-face ${face}, with the corners ${Array.from(corners, (p) => sheets.names(p)).join(', ')}.`,
      )
    const area = slot[face + 1] - slot[face]
    if (count !== area)
      throw new InvariantError(
        `${count} triangles cover 2-face ${face}, which has area ${area}, exactly once.`,
      )
  })
}

function name({ point, names }: NamedSheets, { at, corners }: Placed): string {
  const points = Array.from(corners, (c) => point[c]).sort((p, q) => p - q)
  return `${at} ${listed(points, names)}`
}

/** Twice the area of the triangle c, d, e of corners, positive when they run counterclockwise. */
function turn({ x, y }: FaceSheets, c: number, d: number, e: number): number {
  return (x[d] - x[c]) * (y[e] - y[c]) - (y[d] - y[c]) * (x[e] - x[c])
}

function contains(sheets: FaceSheets, { corners: [p, q, r] }: Placed, c: number): boolean {
  return turn(sheets, p, q, c) >= 0 && turn(sheets, q, r, c) >= 0 && turn(sheets, r, p, c) >= 0
}

function onBoundary(sheets: FaceSheets, face: number, p: number, q: number): boolean {
  const { start } = sheets
  for (let c = start[face]; c < start[face + 1]; c++) if (turn(sheets, p, q, c) < 0) return false
  return true
}

function fault(code: string, message: string, at?: number, found?: unknown): InputError {
  return new InputError(
    `triangles.${code}`,
    message,
    at === undefined ? 'triangles' : `triangles[${at}]`,
    found,
  )
}
