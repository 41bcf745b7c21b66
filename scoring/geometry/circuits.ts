import { meshOfClass } from './classMesh.ts'
import { circuitCoefficient, previous } from './faceMesh.ts'
import type { TwoFaceClass } from './twoFaceClass.ts'

/**
 * The circuits of a class, one per edge ij interior to a 2-face, k and l opposite:
 * v_k + v_l = a v_i + b v_j with a + b = 2. Ordered by (i, j); i < j and k < l are point indices. Heights w
 * give the class exactly when w_k + w_l - a w_i - b w_j > 0 for all of them; the edge can be exchanged when
 * a = b = 1.
 */
export interface Circuits {
  readonly count: number
  readonly i: Int32Array
  readonly j: Int32Array
  readonly k: Int32Array
  readonly l: Int32Array
  readonly a: Int32Array
  readonly b: Int32Array
}

const known = new WeakMap<TwoFaceClass, Circuits>()

/** The circuits of a class, computed once. */
export function circuits(cls: TwoFaceClass): Circuits {
  let found = known.get(cls)
  if (found === undefined) {
    found = read(cls)
    known.set(cls, found)
  }
  return found
}

function read(cls: TwoFaceClass): Circuits {
  const mesh = meshOfClass(cls)
  const { from, twin, sheets } = mesh
  const { point } = sheets
  const n = cls.polytope.pointCount
  // An edge interior to a 2-face belongs to no other, so (i, j) names it. Sorted with its half-edge.
  let count = 0
  for (let h = 0; h < twin.length; h++) if (twin[h] > h) count++
  const codes = new Float64Array(count)
  let at = 0
  for (let h = 0; h < twin.length; h++) {
    if (twin[h] <= h) continue
    const p = point[from[h]]
    const q = point[from[twin[h]]]
    codes[at++] = (Math.min(p, q) * n + Math.max(p, q)) * twin.length + h
  }
  codes.sort()
  const rows = {
    count,
    i: new Int32Array(count),
    j: new Int32Array(count),
    k: new Int32Array(count),
    l: new Int32Array(count),
    a: new Int32Array(count),
    b: new Int32Array(count),
  }
  for (let row = 0; row < count; row++) {
    const h = codes[row] % twin.length
    const p = point[from[h]]
    const q = point[from[twin[h]]]
    const r = point[from[previous(h)]]
    const s = point[from[previous(twin[h])]]
    const b = circuitCoefficient(mesh, h)
    rows.i[row] = Math.min(p, q)
    rows.j[row] = Math.max(p, q)
    rows.k[row] = Math.min(r, s)
    rows.l[row] = Math.max(r, s)
    rows.a[row] = p < q ? 2 - b : b
    rows.b[row] = p < q ? b : 2 - b
  }
  return rows
}

/** w_k + w_l - a w_i - b w_j per circuit; exact for integer heights within `heightBound`. */
export function circuitValues(
  { count, i, j, k, l, a, b }: Circuits,
  heights: ArrayLike<number>,
): Float64Array {
  const values = new Float64Array(count)
  for (let row = 0; row < count; row++) {
    values[row] = heights[k[row]] + heights[l[row]] - a[row] * heights[i[row]] - b[row] * heights[j[row]]
  }
  return values
}

/** Rows of `circuits(cls)` that vanish on the heights: the walls of the class they lie on. */
export function tiedCircuits(cls: TwoFaceClass, heights: ArrayLike<number>): Int32Array {
  const values = circuitValues(circuits(cls), heights)
  return Int32Array.from(values.keys()).filter((row) => values[row] === 0)
}

/** True when the heights give exactly this class, strictly: every circuit is positive. */
export function isGeneric(cls: TwoFaceClass, heights: ArrayLike<number>): boolean {
  return circuitValues(circuits(cls), heights).every((value) => value > 0)
}
