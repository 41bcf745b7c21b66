import { sweep } from './faceMesh.ts'
import type { FaceSheets } from './faceSheets.ts'

/**
 * Regular triangulations for heights that leave points out: per 2-face the exact lower hull, with unused points
 * removed. Slow road, for reports only; ties between used points are broken by point index as in `regularise`.
 *
 * A face is triangulated with all points, made convex by exchanges, and every point found at an edge that is
 * reflex but has no convex quadrilateral lies above (or on) the hull of the other three: it is removed and the
 * face is triangulated again without it.
 */
export function lowerHull(
  sheets: FaceSheets,
  lifted: Float64Array,
): { readonly unused: Int32Array; readonly triangles: Int32Array } {
  const unused = new Set<number>()
  const triangles: number[][] = []
  for (let f = 0; f + 1 < sheets.start.length; f++) {
    let corners: number[] = []
    for (let c = sheets.start[f]; c < sheets.start[f + 1]; c++) corners.push(c)
    for (;;) {
      const found = convexTriangulation(sheets, lifted, corners)
      if (found.removed.length === 0) {
        for (const [i, j, k] of found.triangles) {
          triangles.push([sheets.point[i], sheets.point[j], sheets.point[k]].sort((p, q) => p - q))
        }
        break
      }
      for (const c of found.removed) unused.add(sheets.point[c])
      const removed = new Set(found.removed)
      corners = corners.filter((c) => !removed.has(c))
    }
  }
  triangles.sort((s, t) => s[0] - t[0] || s[1] - t[1] || s[2] - t[2])
  return { unused: Int32Array.from(unused).sort(), triangles: Int32Array.from(triangles.flat()) }
}

type Triangle = [number, number, number]

interface Attempt {
  readonly triangles: Triangle[]
  /** Corners that are no vertices of the hull; empty when the triangulation is the regular one. */
  readonly removed: number[]
}

/** Exchanges until every reflex edge is one that cannot be exchanged; names the points these edges condemn. */
function convexTriangulation(sheets: FaceSheets, lifted: Float64Array, corners: readonly number[]): Attempt {
  const { x, y } = sheets
  const area = (p: number, q: number, r: number): number =>
    (x[q] - x[p]) * (y[r] - y[p]) - (y[q] - y[p]) * (x[r] - x[p])
  const flat = sweep(corners, x, y)
  const triangles: Triangle[] = []
  for (let t = 0; t < flat.length; t += 3) triangles.push([flat[t], flat[t + 1], flat[t + 2]])
  const sideOf = new Map<string, number>()
  const name = (p: number, q: number): string => `${p},${q}`
  const enter = (t: number): void => {
    const [i, j, k] = triangles[t]
    sideOf.set(name(i, j), t)
    sideOf.set(name(j, k), t)
    sideOf.set(name(k, i), t)
  }
  triangles.forEach((_, t) => enter(t))
  const apex = (t: number, i: number, j: number): number =>
    triangles[t].find((c) => c !== i && c !== j) as number

  const strict = new Set<number>()
  const touching = new Set<number>()
  const stack: [number, number][] = [...sideOf.keys()].map(
    (edge) => edge.split(',').map(Number) as [number, number],
  )
  while (stack.length > 0) {
    const [i, j] = stack.pop() as [number, number]
    const s = sideOf.get(name(i, j))
    const t = sideOf.get(name(j, i))
    if (s === undefined || t === undefined) continue
    const k = apex(s, i, j)
    const l = apex(t, i, j)
    const value = liftedSign(x, y, lifted, i, j, k, l)
    if (value > 0) continue
    // The quadrilateral i l j k is convex at i and at j when both turns are to the left.
    const convexAtI = area(k, i, l) > 0
    const convexAtJ = area(l, j, k) > 0
    if (!convexAtI || !convexAtJ) {
      const reflex = convexAtI ? j : i
      if (value < 0) strict.add(reflex)
      else touching.add(reflex)
      continue
    }
    if (value === 0 && Math.min(k, l) < Math.min(i, j)) continue
    triangles[s] = [l, j, k]
    triangles[t] = [k, i, l]
    sideOf.delete(name(i, j))
    sideOf.delete(name(j, i))
    enter(s)
    enter(t)
    stack.push([l, j], [j, k], [k, i], [i, l])
  }
  // Points strictly above the hull go together: the hull is the same without them. One that only touches it
  // may carry another that touches it, so these go one at a time.
  if (strict.size > 0) return { triangles, removed: [...strict] }
  if (touching.size > 0) return { triangles, removed: [Math.max(...touching)] }
  const hidden = flattened()
  return { triangles, removed: hidden === undefined ? [] : [hidden] }

  /** A point inside a flat cell, or inside an edge between flat cells, of the convex surface. */
  function flattened(): number | undefined {
    const convexEnds = new Map<number, number[]>()
    for (const edge of sideOf.keys()) {
      const [i, j] = edge.split(',').map(Number)
      const s = sideOf.get(edge) as number
      const t = sideOf.get(name(j, i))
      const isFlat = t !== undefined && liftedSign(x, y, lifted, i, j, apex(s, i, j), apex(t, i, j)) === 0
      if (!convexEnds.has(i)) convexEnds.set(i, [])
      if (!convexEnds.has(j)) convexEnds.set(j, [])
      if (isFlat) continue
      convexEnds.get(i)?.push(j)
      if (t === undefined) convexEnds.get(j)?.push(i)
    }
    let hidden: number | undefined
    for (const [c, ends] of convexEnds) {
      const straight = ends.length === 2 && area(ends[0], c, ends[1]) === 0 && isBetween(ends[0], c, ends[1])
      if (ends.length === 0 || straight) hidden = Math.max(hidden ?? -1, c)
    }
    return hidden
  }

  function isBetween(p: number, c: number, q: number): boolean {
    return (x[p] - x[c]) * (x[q] - x[c]) + (y[p] - y[c]) * (y[q] - y[c]) < 0
  }
}

/**
 * Sign of how far l lies above the plane through the lifted counterclockwise triangle i, j, k: positive when
 * the surface is convex at ij. In doubles when a rounding bound settles it, else in BigInt.
 */
function liftedSign(
  x: Int32Array,
  y: Int32Array,
  w: Float64Array,
  i: number,
  j: number,
  k: number,
  l: number,
): number {
  const xj = x[j] - x[i]
  const yj = y[j] - y[i]
  const xk = x[k] - x[i]
  const yk = y[k] - y[i]
  const xl = x[l] - x[i]
  const yl = y[l] - y[i]
  // The three minors are exact small integers; height differences are exact below 2^53.
  const minorL = xj * yk - yj * xk
  const minorK = xj * yl - yj * xl
  const minorJ = xk * yl - yk * xl
  const l1 = minorL * (w[l] - w[i])
  const k1 = minorK * (w[k] - w[i])
  const j1 = minorJ * (w[j] - w[i])
  const value = l1 - k1 + j1
  const error = 4 * Number.EPSILON * (Math.abs(l1) + Math.abs(k1) + Math.abs(j1))
  if (Math.abs(value) > error) return Math.sign(value)
  const exact =
    BigInt(minorL) * BigInt(w[l] - w[i]) -
    BigInt(minorK) * BigInt(w[k] - w[i]) +
    BigInt(minorJ) * BigInt(w[j] - w[i])
  return exact > 0n ? 1 : exact < 0n ? -1 : 0
}
