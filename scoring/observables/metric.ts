import type { Candidate } from './candidate.ts'
import { ofMetric, SOURCES } from './described.ts'
import type { NumberSet, Observable, ScalarObservable } from './observable.ts'

const metric = {
  unit: 'M_pl^2',
  scaling: -4,
  source: SOURCES.volumes,
}

const DIVISOR_BASIS =
  'over all prime toric divisors (the toric part of H^{1,1}), free of a choice of basis; L = -G (dtau dtau + dtheta dtheta), theta of period 1'
const LATTICE_BASIS =
  'in the lattice basis of all points but the first four that span; depends on that choice, for comparison with the literature'

const eigenvalue = (
  name: string,
  description: string,
  convention: string,
  formula: string,
  read: (candidate: Candidate) => number,
  cost: 'moderate' | 'dear' = 'dear',
): ScalarObservable => ({
  kind: 'scalar',
  type: 'number',
  ...ofMetric({ ...metric, name, description, convention, formula, cost }),
  read,
})

const spectrum = (
  name: string,
  description: string,
  convention: string,
  formula: string,
  values: (candidate: Candidate) => ArrayLike<number>,
): NumberSet => ({
  kind: 'numbers',
  type: 'number',
  ...ofMetric({ ...metric, name, description, convention, formula, cost: 'dear' }),
  values,
})

const last = (values: ArrayLike<number>): number => values[values.length - 1]

/** Eigenvalues of the field-space metric, in the two spectra. */
export const metricObservables: readonly Observable[] = [
  eigenvalue(
    'metric.divisor.top',
    'Largest eigenvalue of the field-space metric, divisor spectrum: large means a long axion range.',
    DIVISOR_BASIS,
    '\\lambda_{\\max}(G),\\quad M_{ij} = 4(\\tau_i\\tau_j - V A_{ij})',
    (candidate) => candidate.topEigenvalue(),
    'moderate',
  ),
  eigenvalue(
    'metric.divisor.bottom',
    'Smallest non-zero eigenvalue of the field-space metric, divisor spectrum.',
    DIVISOR_BASIS,
    '\\lambda_{\\min}(G)',
    (candidate) => candidate.divisorSpectrum()[0],
  ),
  spectrum(
    'metric.divisor.spectrum',
    'All non-zero eigenvalues of the field-space metric, divisor spectrum.',
    DIVISOR_BASIS,
    '\\mathrm{spec}(G)',
    (candidate) => candidate.divisorSpectrum(),
  ),
  eigenvalue(
    'metric.basis.top',
    'Largest eigenvalue of the field-space metric in a lattice basis. Depends on the basis.',
    LATTICE_BASIS,
    '\\lambda_{\\max}(G_{\\text{basis}})',
    (candidate) => last(candidate.basisSpectrum().eigenvalues),
  ),
  eigenvalue(
    'metric.basis.bottom',
    'Smallest eigenvalue of the field-space metric in a lattice basis. Depends on the basis.',
    LATTICE_BASIS,
    '\\lambda_{\\min}(G_{\\text{basis}})',
    (candidate) => candidate.basisSpectrum().eigenvalues[0],
  ),
  spectrum(
    'metric.basis.spectrum',
    'All eigenvalues of the field-space metric in a lattice basis. They depend on the basis.',
    LATTICE_BASIS,
    '\\mathrm{spec}(G_{\\text{basis}})',
    (candidate) => candidate.basisSpectrum().eigenvalues,
  ),
]

/** True for observables whose value depends on a choice of basis: for reports, not for scores. */
export const dependsOnBasis = (name: string): boolean => name.startsWith('metric.basis.')
