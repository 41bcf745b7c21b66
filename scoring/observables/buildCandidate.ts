import { axionSector, type AxionSector } from '../geometry/axions.ts'
import { curveRows } from '../geometry/curves.ts'
import { divisorTopology } from '../geometry/divisors.ts'
import { fibrations } from '../geometry/fibrations.ts'
import { intersectionNumbers } from '../geometry/intersectionNumbers.ts'
import { normalisedVolumes } from '../geometry/normalisedVolume.ts'
import type { NormalForm } from '../geometry/normalForm.ts'
import type { Polytope } from '../geometry/polytope.ts'
import { referencePoint } from '../geometry/referencePoint.ts'
import { reflexiveSections } from '../geometry/sections.ts'
import { basisSpectrum, divisorSpectrum, topEigenvalue } from '../geometry/spectra.ts'
import type { TwoFaceClass } from '../geometry/twoFaceClass.ts'
import { pairNumbers, volumes, type Volumes } from '../geometry/volumes.ts'
import type { Candidate, Instantons } from './candidate.ts'

export interface GivenStages extends Partial<
  Pick<Candidate, 'numbers' | 'reference' | 'topEigenvalue' | 'divisorSpectrum' | 'basisSpectrum'>
> {
  /** Volumes of the threefold and its divisors; those of curves are products of their classes. */
  readonly volumes?: () => Omit<Volumes, 'curves'>
}

const topologies = new WeakMap<Polytope, ReturnType<typeof divisorTopology>>()

/**
 * The candidate of a canonical class: every stage is computed on first use and kept. What depends on the
 * polytope alone is shared among its candidates.
 *
 * @param form normal form of the polytope
 * @param canonical the representative that gave the class key, on `form.polytope`
 * @param given stages known from elsewhere, such as certified ones; the others follow from them
 */
export function buildCandidate(
  form: NormalForm,
  canonical: TwoFaceClass,
  classKey: string,
  given: GivenStages = {},
): Candidate {
  const { polytope } = form
  const numbers = given.numbers ?? once(() => intersectionNumbers(canonical))
  const curves = once(() => curveRows(canonical, numbers()))
  const reference = given.reference ?? once(() => referencePoint(canonical, numbers(), curves()))
  const pairs = once(() => pairNumbers(numbers(), reference().weights))
  const volume = once(() => ({
    ...volumes(numbers(), curves(), reference().weights, pairs()),
    ...given.volumes?.(),
  }))
  return {
    polytope,
    symmetryOrder: form.automorphisms.length,
    class: canonical,
    classKey,
    sections: () => reflexiveSections(polytope),
    normalisedVolumes: () => normalisedVolumes(polytope),
    numbers,
    divisorTopology: () => topologyOf(polytope),
    curves,
    fibrations: once(() => fibrations(canonical, numbers())),
    reference,
    volumes: volume,
    topEigenvalue: given.topEigenvalue ?? once(() => topEigenvalue(polytope, pairs(), volume()).value),
    divisorSpectrum: given.divisorSpectrum ?? once(() => divisorSpectrum(polytope, pairs(), volume())),
    basisSpectrum: given.basisSpectrum ?? once(() => basisSpectrum(polytope, pairs(), volume())),
    axions: lastOfEach((scale, instantons) =>
      polytope.favourable
        ? axionSector(polytope, pairs(), volume(), instantonDivisors(polytope, instantons), scale)
        : undefined,
    ),
  }
}

function topologyOf(polytope: Polytope): ReturnType<typeof divisorTopology> {
  const known = topologies.get(polytope) ?? divisorTopology(polytope)
  topologies.set(polytope, known)
  return known
}

function instantonDivisors(polytope: Polytope, instantons: Instantons): Int32Array {
  const { rigid } = topologyOf(polytope)
  const all = Int32Array.from(rigid, (_, p) => p)
  return instantons === 'all' ? all : all.filter((p) => rigid[p] === 1)
}

/** Keeps, for either choice of instantons, the sector at the scale asked for last. */
function lastOfEach(compute: Candidate['axions']): Candidate['axions'] {
  const kept = new Map<Instantons, { readonly scale: number; readonly sector: AxionSector | undefined }>()
  return (scale, instantons) => {
    const last = kept.get(instantons)
    if (last?.scale === scale) return last.sector
    const sector = compute(scale, instantons)
    kept.set(instantons, { scale, sector })
    return sector
  }
}

/** Computes a value on the first call and keeps it. */
function once<T>(compute: () => T): () => T {
  let kept: { readonly value: T } | undefined
  return () => (kept ??= { value: compute() }).value
}
