import { compareLexicographic, gcd, gcdBig } from './integers.ts'
import { startSimplex } from './startSimplex.ts'
import { difference, orthogonalTo, TooLarge, value4 } from './vectors.ts'

/**
 * A facet of a hull: <normal, x> + offset >= 0 on the hull, with equality on the facet. The normal is primitive,
 * so for integer points the offset is the lattice distance of the facet from the origin (positive inside).
 */
export interface HullFacet {
  readonly normal: readonly number[]
  readonly offset: number
  /** Positions in `Hull.vertices` of the facet's vertices, ascending. */
  readonly vertices: readonly number[]
}

export interface Hull {
  readonly kind: 'hull'
  /** Indices of the vertices among the points given. */
  readonly vertices: readonly number[]
  readonly facets: readonly HullFacet[]
}

/** What stands in the way of a hull with the origin inside. */
export type HullRefusal =
  /** A facet of the hull that does not have the origin strictly inside: offset <= 0. */
  | { readonly kind: 'origin-not-interior'; readonly normal: readonly number[]; readonly offset: number }
  | { readonly kind: 'too-many-vertices' }
  /** Exact arithmetic would leave the safe integers. */
  | { readonly kind: 'too-large' }

/** More vertices than this and the hull is given up: incidences are kept in two 32-bit words. */
export const hullVertexLimit = 64

/** Normal, then offset. */
type Form = readonly number[]

interface WorkFacet {
  readonly form: Form
  readonly low: number
  readonly high: number
  /** No point lies beyond it. */
  settled: boolean
}

/**
 * Convex hull in four dimensions of points around the origin, exact, by double description over the cone of
 * (x, 1): facets are the extreme rays of the dual cone. Only vertices of the hull are ever inserted (each maximises
 * a facet's violation, ties broken lexicographically), so points in faces cost one evaluation per facet. Facets that
 * do not have the origin inside come first: the first of them that nothing lies beyond ends the work.
 *
 * All arithmetic is in doubles below 2^53, checked as it goes; combinations of facets beyond that are made in big
 * integers. Coordinates up to 2,000 in size always pass: normals stay below 6 (2B)^3, offsets below 192 B^4.
 *
 * @param points integer points, pairwise distinct
 * @throws InvariantError when the points do not span four dimensions affinely
 */
export function hull(points: readonly (readonly number[])[]): Hull | HullRefusal {
  const extent = [0, 0, 0, 0]
  for (const point of points)
    point.forEach((entry, axis) => (extent[axis] = Math.max(extent[axis], Math.abs(entry))))
  try {
    return hullWithin(points, extent)
  } catch (error) {
    if (error instanceof TooLarge) return { kind: 'too-large' }
    throw error
  }
}

function hullWithin(points: readonly (readonly number[])[], extent: readonly number[]): Hull | HullRefusal {
  const inserted = startSimplex(points)
  let facets = simplexFacets(inserted.map((index) => points[index]))
  for (;;) {
    for (const facet of facets) requireExact(facet.form, extent)
    const open =
      facets.find(({ form, settled }) => !settled && form[4] <= 0) ?? facets.find(({ settled }) => !settled)
    if (open === undefined) break
    const outermost = mostViolating(open.form, points)
    if (outermost === undefined) {
      open.settled = true
      const offset = open.form[4]
      if (offset <= 0) return { kind: 'origin-not-interior', normal: open.form.slice(0, 4), offset }
      continue
    }
    if (inserted.length === hullVertexLimit) return { kind: 'too-many-vertices' }
    inserted.push(outermost)
    facets = insert(facets, points[outermost], inserted.length - 1)
  }
  return {
    kind: 'hull',
    vertices: inserted,
    facets: facets.map((facet) => ({
      normal: facet.form.slice(0, 4),
      offset: facet.form[4],
      vertices: inserted.map((_, position) => position).filter((position) => contains(facet, position)),
    })),
  }
}

/** Every value of the form on the points is a sum of safe integers with a safe result. */
function requireExact(form: Form, extent: readonly number[]): void {
  const bound = extent.reduce((sum, size, axis) => sum + size * Math.abs(form[axis]), Math.abs(form[4]))
  if (bound > Number.MAX_SAFE_INTEGER) throw new TooLarge()
}

function simplexFacets(corners: readonly (readonly number[])[]): WorkFacet[] {
  return corners.map((opposite, position) => {
    const others = corners.filter((_, i) => i !== position)
    const base = others[0]
    const normal = primitive(orthogonalTo(others.slice(1).map((corner) => difference(corner, base))))
    const offset = -value4(normal, base)
    const sign = value4(normal, opposite) + offset > 0 ? 1 : -1
    return {
      form: [...normal, offset].map((entry) => sign * entry),
      low: 31 & ~(1 << position),
      high: 0,
      settled: false,
    }
  })
}

function mostViolating(form: Form, points: readonly (readonly number[])[]): number | undefined {
  const [m0, m1, m2, m3, offset] = form
  let best: number | undefined
  let least = 0
  for (let i = 0; i < points.length; i++) {
    const point = points[i]
    const here = m0 * point[0] + m1 * point[1] + m2 * point[2] + m3 * point[3] + offset
    if (here > least || here === 0) continue
    if (here < least || (best !== undefined && compareLexicographic(point, points[best]) > 0)) {
      best = i
      least = here
    }
  }
  return best
}

function insert(facets: readonly WorkFacet[], point: readonly number[], position: number): WorkFacet[] {
  const low = position < 32 ? 1 << position : 0
  const high = position < 32 ? 0 : 1 << (position - 32)
  const values = facets.map((facet) => value4(facet.form, point) + facet.form[4])
  const kept: WorkFacet[] = []
  facets.forEach((facet, i) => {
    if (values[i] > 0) kept.push(facet)
    else if (values[i] === 0) kept.push({ ...facet, low: facet.low | low, high: facet.high | high })
  })
  for (let i = 0; i < facets.length; i++) {
    if (values[i] <= 0) continue
    for (let j = 0; j < facets.length; j++) {
      if (values[j] >= 0) continue
      const sharedLow = facets[i].low & facets[j].low
      const sharedHigh = facets[i].high & facets[j].high
      if (bitCount(sharedLow) + bitCount(sharedHigh) < 3) continue
      // Adjacent exactly when no third facet contains all that the two share.
      const ridge = !facets.some(
        (other, k) =>
          k !== i &&
          k !== j &&
          (other.low & sharedLow) === sharedLow &&
          (other.high & sharedHigh) === sharedHigh,
      )
      if (!ridge) continue
      const form = combine(facets[i].form, values[i], facets[j].form, values[j])
      kept.push({ form, low: sharedLow | low, high: sharedHigh | high, settled: false })
    }
  }
  return kept
}

/** The primitive form through the ridge of two facets and the new point, where they take the values given. */
function combine(inner: Form, inside: number, outer: Form, outside: number): number[] {
  const common = gcd(inside, outside)
  const a = inside / common
  const b = -outside / common
  const form = inner.map((entry, i) => a * outer[i] + b * entry)
  const bound = inner.reduce(
    (most, entry, i) => Math.max(most, a * Math.abs(outer[i]) + b * Math.abs(entry)),
    0,
  )
  if (bound <= Number.MAX_SAFE_INTEGER) return primitive(form)
  const exact = inner.map((entry, i) => BigInt(a) * BigInt(outer[i]) + BigInt(b) * BigInt(entry))
  const divisor = exact.slice(0, 4).reduce(gcdBig, 0n)
  return exact.map((entry) => {
    const reduced = Number(entry / divisor)
    if (!Number.isSafeInteger(reduced)) throw new TooLarge()
    return reduced
  })
}

/** Divides by the gcd of the first four entries. */
function primitive(form: Form): number[] {
  const divisor = gcd(gcd(form[0], form[1]), gcd(form[2], form[3]))
  return form.map((entry) => entry / divisor)
}

function contains(facet: WorkFacet, position: number): boolean {
  return position < 32 ? (facet.low & (1 << position)) !== 0 : (facet.high & (1 << (position - 32))) !== 0
}

function bitCount(word: number): number {
  let bits = word - ((word >>> 1) & 0x55555555)
  bits = (bits & 0x33333333) + ((bits >>> 2) & 0x33333333)
  return (((bits + (bits >>> 4)) & 0x0f0f0f0f) * 0x01010101) >>> 24
}
