import type { AxionSector } from '../geometry/axions.ts'
import type { CurveRows } from '../geometry/curves.ts'
import type { IntersectionNumbers } from '../geometry/intersectionNumbers.ts'
import type { Fibrations } from '../geometry/fibrations.ts'
import type { NormalisedVolumes } from '../geometry/normalisedVolume.ts'
import type { DivisorTopology } from '../geometry/divisors.ts'
import type { Polytope } from '../geometry/polytope.ts'
import type { ReferencePoint } from '../geometry/referencePoint.ts'
import type { ReflexiveSections } from '../geometry/sections.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { Volumes } from '../geometry/volumes.ts'
import type { BasisSpectrum } from '../geometry/spectra.ts'

/** The prime toric divisors whose instantons count. */
export type Instantons = 'all' | 'rigid'

/**
 * One candidate as the observables see it: the canonical representative of a 2-face class, with every later
 * stage computed on first use and kept. All cone and metric quantities are
 * at scale 1 (at the reference point).
 */
export interface Candidate {
  readonly polytope: Polytope
  readonly symmetryOrder: number
  readonly class: TwoFaceClass
  readonly classKey: string
  /** Stage "polytope". */
  sections(): ReflexiveSections
  normalisedVolumes(): NormalisedVolumes
  /** Stage "topology". */
  numbers(): IntersectionNumbers
  divisorTopology(): DivisorTopology
  curves(): CurveRows
  fibrations(): Fibrations
  /** Stage "cone". */
  reference(): ReferencePoint
  volumes(): Volumes
  /** Stage "metric". Largest eigenvalue of the divisor spectrum, by Lanczos. */
  topEigenvalue(): number
  /** All non-zero eigenvalues of the field-space metric over all prime toric divisors, ascending. */
  divisorSpectrum(): Float64Array
  basisSpectrum(): BasisSpectrum
  /**
   * Stage "axions", at `scale` times the reference point: masses from instantons on all prime toric divisors, or on
   * those of one component that are rigid. Undefined where the polytope is not favourable.
   */
  axions(scale: number, instantons: Instantons): AxionSector | undefined
}
