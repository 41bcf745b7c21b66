import type { Vector } from './determinants.ts'

/** What is to be certified: a polytope, heights, and everything the fast road says about them. */
export interface Claims {
  readonly polytopeKey: string
  readonly candidateKey: string
  /** In normal form. */
  readonly vertices: readonly Vector[]
  /** All points that carry a divisor, in the order every index refers to; vertices first. */
  readonly points: readonly Vector[]
  /** One integer per point. */
  readonly heights: readonly number[]
  readonly numbers: ClaimedNumbers
}

export interface ClaimedNumbers {
  readonly facets: number
  readonly faces: { readonly edges: number; readonly twoFaces: number }
  readonly normalisedVolumes: { readonly own: number; readonly dual: number }
  readonly latticePoints: number
  readonly dualLatticePoints: number
  readonly hodge: { readonly h11: number; readonly h21: number; readonly euler: number }
  readonly favourable: boolean
  /** Per point: dimension of the carrier, components of the divisor, interior points of the dual face. */
  readonly carriers: readonly number[]
  readonly components: readonly number[]
  readonly dualInterior: readonly number[]
  /** Triangles of the 2-face class, i < j < k, lexicographic order. */
  readonly triangles: readonly (readonly number[])[]
  /** Maximal cones of the certified fan; null before it was found (the fast road knows none). */
  readonly simplices: readonly (readonly number[])[] | null
  /** Non-zero [i, j, k, kappa_ijk], i <= j <= k, lexicographic order. */
  readonly intersections: readonly (readonly number[])[]
  readonly c2: readonly number[]
  /** Reference point at scale 1, one weight per point. */
  readonly reference: { readonly weights: readonly number[]; readonly edgeCurvesSuffice: boolean }
  readonly volumes: { readonly total: number; readonly divisors: readonly number[] }
  readonly metric: {
    readonly top: number
    readonly divisorSpectrum: readonly number[]
    readonly basis: readonly number[]
    readonly basisSpectrum: readonly number[]
  }
}
