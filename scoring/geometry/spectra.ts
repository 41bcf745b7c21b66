/** Eigenvalues of the field-space metric G in the lattice basis formed by `basis`, ascending. */
export interface BasisSpectrum {
  readonly basis: Int32Array
  readonly eigenvalues: Float64Array
}
