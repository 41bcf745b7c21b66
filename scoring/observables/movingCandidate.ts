import { curveRows, type CurveRows } from '../geometry/curves.ts'
import { divisorTopology, type DivisorTopology } from '../geometry/divisors.ts'
import { fibrations, type Fibrations } from '../geometry/fibrations.ts'
import type { IntersectionNumbers } from '../geometry/intersectionNumbers.ts'
import type { MovingNumbers } from '../geometry/moving/movingNumbers.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import { normalisedVolumes } from '../geometry/normalisedVolume.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { reflexiveSections } from '../geometry/sections.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import type { Candidate } from './candidate.ts'

/**
 * The candidate of a class in motion, up to the stage "topology": numbers are those that follow the exchanges, the
 * rest is computed on first use after an exchange. Points keep the labels of the class that moves, which is not in
 * general the canonical representative. `renew` must be called after every exchange.
 */
export class MovingCandidate implements Candidate {
  readonly polytope: Polytope
  readonly symmetryOrder: number
  /** The class in motion has no address: see `canonicalClass`. */
  readonly classKey = ''
  private now: TwoFaceClass
  private itsNumbers: IntersectionNumbers
  /** Of the polytope, hence never forgotten. */
  private itsTopology: DivisorTopology | undefined
  private itsCurves: CurveRows | undefined
  private itsFibrations: Fibrations | undefined

  constructor(
    form: NormalForm,
    private readonly moving: MovingNumbers,
  ) {
    this.polytope = form.polytope
    this.symmetryOrder = form.automorphisms.length
    this.now = moving.classNow()
    this.itsNumbers = moving.numbersNow()
  }

  /** Forgets what was computed before the last exchange. New objects, since some keep results by object. */
  renew(): void {
    this.now = this.moving.classNow()
    this.itsNumbers = this.moving.numbersNow()
    this.itsCurves = undefined
    this.itsFibrations = undefined
  }

  get class(): TwoFaceClass {
    return this.now
  }

  sections(): ReturnType<Candidate['sections']> {
    return reflexiveSections(this.polytope)
  }

  normalisedVolumes(): ReturnType<Candidate['normalisedVolumes']> {
    return normalisedVolumes(this.polytope)
  }

  numbers(): IntersectionNumbers {
    return this.itsNumbers
  }

  divisorTopology(): DivisorTopology {
    return (this.itsTopology ??= divisorTopology(this.polytope))
  }

  curves(): CurveRows {
    return (this.itsCurves ??= curveRows(this.now, this.itsNumbers))
  }

  fibrations(): Fibrations {
    return (this.itsFibrations ??= fibrations(this.now, this.itsNumbers))
  }

  reference(): never {
    throw beyondTopology()
  }

  volumes(): never {
    throw beyondTopology()
  }

  topEigenvalue(): never {
    throw beyondTopology()
  }

  divisorSpectrum(): never {
    throw beyondTopology()
  }

  basisSpectrum(): never {
    throw beyondTopology()
  }

  axions(): never {
    throw beyondTopology()
  }
}

function beyondTopology(): Error {
  // Not an InvariantError of the geometry, which a rule would take for an undefined value.
  return new TypeError('A class in motion has no stage after "topology".')
}
