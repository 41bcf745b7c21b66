import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import { InvariantError } from '../errors.ts'
import { automorphismsFrom } from './automorphisms.ts'
import { hermiteForm } from './hermiteForm.ts'
import { compareLexicographic } from './integers.ts'
import { reducedBasis, rowsOf, transform } from './latticeReduction.ts'
import { PointIndex } from './pointIndex.ts'
import type { Polytope } from './polytope.ts'
import { polytopeFromPoints } from './polytope.ts'
import { vertexOrders } from './vertexOrders.ts'

/**
 * The normal form of a polytope under GL(4,Z): equal for equivalent polytopes, computed exactly. All stored
 * candidates, class keys and floating-point values refer to `polytope`, the one in normal-form coordinates.
 */
export interface NormalForm {
  /** The polytope in normal-form coordinates, with its points in its own fixed order. */
  readonly polytope: Polytope
  /** Point i of the polytope it was computed from is point `relabelling[i]` of `polytope`. */
  readonly relabelling: Int32Array
  /** 32 hexadecimal digits: hash of the normal form. The permanent address of the polytope. */
  readonly key: string
  /**
   * The automorphism group as permutations of the points: point i goes to `perm[i]`. The identity is first;
   * the order is fixed by the normal form.
   */
  readonly automorphisms: readonly Int32Array[]
}

/**
 * The normal form: of all Hermite forms of the vertex matrix, over the canonical orderings of the vertices
 * (`vertexOrders`), the lexicographically least one, in a reduced basis. Orderings that share it differ by an
 * automorphism in GL(4,Z); a symmetry of the pairing matrix that is none gives another Hermite form and drops out.
 */
export function normalForm(polytope: Polytope): NormalForm {
  const { vertexCount, pointCount } = polytope
  const basis = reducedBasis(rowsOf(polytope.points.subarray(0, 4 * vertexCount)))
  const reduced = transform(basis.matrix, polytope.points)
  const { form, orders } = leastHermiteForm(
    reduced,
    vertexCount,
    vertexOrdersOf(reduced, vertexCount, transform(basis.dual, polytope.facets)),
  )
  const columns = columnsOf(form, vertexCount)
  const short = reducedBasis(rowsOf(columns))
  const vertices = transform(short.matrix, columns)
  const normal = polytopeFromPoints(
    Array.from({ length: vertexCount }, (_, v) => vertices.slice(4 * v, 4 * v + 4)),
  )

  const order = orders[0]
  const carried = hermiteForm(
    [0, 1, 2, 3].flatMap((axis) => bordered(reduced, order, axis)),
    vertexCount,
  )
  const toHermite = [0, 1, 2, 3].map((axis) => {
    const start = axis * (vertexCount + 4) + vertexCount
    return Array.from(carried.subarray(start, start + 4), BigInt)
  })
  const images = transform(short.matrix, transform(toHermite, reduced))
  const index = new PointIndex(normal.points)
  const relabelling = Int32Array.from({ length: pointCount }, (_, i) => index.find(images, i))
  return {
    polytope: normal,
    relabelling,
    key: keyOf(normal),
    automorphisms: automorphismsFrom(
      normal.points,
      index,
      orders.map((other) => other.map((v) => relabelling[v])),
    ),
  }
}

function vertexOrdersOf(
  points: readonly number[],
  vertexCount: number,
  facets: readonly number[],
): number[][] {
  const facetCount = facets.length / 4
  const pairing = new Int32Array(vertexCount * facetCount)
  for (let v = 0; v < vertexCount; v++) {
    for (let a = 0; a < facetCount; a++) {
      let sum = 0
      for (let axis = 0; axis < 4; axis++) sum += points[4 * v + axis] * facets[4 * a + axis]
      pairing[v * facetCount + a] = sum
    }
  }
  return vertexOrders(pairing, vertexCount, facetCount)
}

/** The least Hermite form over the orderings, and the orderings that reach it. */
function leastHermiteForm(
  vertices: readonly number[],
  vertexCount: number,
  candidates: readonly (readonly number[])[],
): { form: Float64Array; orders: (readonly number[])[] } {
  let form: Float64Array | undefined
  let orders: (readonly number[])[] = []
  const matrix = new Float64Array(4 * vertexCount)
  for (const order of candidates) {
    order.forEach((v, position) => {
      for (let axis = 0; axis < 4; axis++) matrix[axis * vertexCount + position] = vertices[4 * v + axis]
    })
    const here = hermiteForm(matrix, vertexCount)
    const comparison = form === undefined ? -1 : compareLexicographic(here, form)
    if (comparison < 0) {
      form = here
      orders = [order]
    } else if (comparison === 0) orders.push(order)
  }
  if (form === undefined) throw new InvariantError('No ordering of the vertices was found.')
  return { form, orders }
}

/** One coordinate of the ordered vertices, followed by a row of the identity. */
const bordered = (vertices: readonly number[], order: readonly number[], axis: number): number[] => [
  ...order.map((v) => vertices[4 * v + axis]),
  ...[0, 1, 2, 3].map((other) => (other === axis ? 1 : 0)),
]

const columnsOf = (form: Float64Array, count: number): number[] =>
  Array.from({ length: 4 * count }, (_, i) => form[(i & 3) * count + (i >> 2)])

function keyOf(normal: Polytope): string {
  const vertices: string[] = []
  for (let v = 0; v < normal.vertexCount; v++)
    vertices.push(normal.points.subarray(4 * v, 4 * v + 4).join(','))
  return bytesToHex(sha256(utf8ToBytes(vertices.join(';')))).slice(0, 32)
}
