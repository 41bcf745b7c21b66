import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, concatBytes, utf8ToBytes } from '@noble/hashes/utils.js'
import type { Vector } from './determinants.ts'

/** Key of a polytope: 32 digits of the SHA-256 hash of its vertices in normal form, "x,y,z,t;x,y,z,t;...". */
export function keyOfVertices(vertices: readonly Vector[]): string {
  return bytesToHex(sha256(utf8ToBytes(vertices.map((vertex) => vertex.join(',')).join(';')))).slice(0, 32)
}

/**
 * Key of a candidate: 32 digits of the SHA-256 hash of a line with the scheme, a line with the polytope's key and
 * two bytes, the higher first, for each corner of each triangle.
 */
export function keyOfTriangles(polytopeKey: string, triangles: readonly (readonly number[])[]): string {
  const corners = triangles.flat()
  const bytes = Uint8Array.from({ length: 2 * corners.length }, (_, n) =>
    n % 2 === 0 ? corners[n / 2] >> 8 : corners[(n - 1) / 2] & 255,
  )
  const head = utf8ToBytes(`tessellary.class/1\n${polytopeKey}\n`)
  return bytesToHex(sha256(concatBytes(head, bytes))).slice(0, 32)
}
