import type { Candidate } from '../../../scoring/observables/candidate.ts'

/** Which parts of an invented candidate were asked for, and how often. */
export type Calls = Record<string, number>

/**
 * A candidate of five divisors with invented numbers (no real geometry: small integers one can check by eye),
 * which counts what it is asked for. `change` replaces single parts.
 */
export function inventedCandidate(change: Partial<Candidate> = {}): Candidate & { readonly calls: Calls } {
  const calls: Calls = {}
  const counted = <T>(name: string, value: T) => {
    return (): T => {
      calls[name] = (calls[name] ?? 0) + 1
      return value
    }
  }
  const edges = Int32Array.of(0, 1, 0, 2, 0, 3, 1, 2, 1, 3, 2, 3, 3, 4)
  const triangles = Int32Array.of(0, 1, 2, 0, 1, 3, 1, 2, 3)
  const triangleNumbers = Float64Array.of(1, 2, 1)
  const polytope: Candidate['polytope'] = {
    points: Int32Array.of(1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, -1, -1, -2, -2),
    pointCount: 5,
    vertexCount: 3,
    carrierDimension: Uint8Array.of(0, 0, 0, 1, 2),
    dualInterior: Int32Array.of(0, 1, 0, 2, 1),
    components: Int32Array.of(1, 1, 1, 1, 2),
    facets: new Int32Array(24),
    facetCount: 6,
    twoFaces: [
      {
        facets: [0, 1],
        dualLength: 1,
        points: Int32Array.of(0, 1, 2),
        plane: new Int32Array(6),
        corners: Int32Array.of(0, 1, 2),
        area: 1,
      },
      {
        facets: [1, 2],
        dualLength: 2,
        points: Int32Array.of(0, 1, 3, 4),
        plane: new Int32Array(8),
        corners: Int32Array.of(0, 1, 3),
        area: 3,
      },
    ],
    edges: [Int32Array.of(0, 1), Int32Array.of(0, 3, 2), Int32Array.of(1, 2)],
    hodge: { h11: 2, h21: 86, euler: -168 },
    favourable: true,
    latticePoints: 8,
    dualLatticePoints: 105,
  }
  return {
    calls,
    polytope,
    symmetryOrder: 4,
    class: { polytope, triangles, faceOf: Int32Array.of(0, 1, 1) },
    classKey: '0123456789abcdef0123456789abcdef',
    sections: counted('sections', {
      planar: [{ points: Int32Array.of(0, 1, 5), turns: Int32Array.of(-1, -1, -1), type: 1 }],
      solid: [
        {
          functional: [0, 0, 0, 1],
          points: Int32Array.of(0, 1, 2, 3, 5),
          vertices: Int32Array.of(0, 1, 2, 3),
        },
        { functional: [0, 0, 1, 0], points: Int32Array.of(1, 2, 3, 4), vertices: Int32Array.of(1, 2, 3, 4) },
      ],
      nested: [[0], []],
    }),
    normalisedVolumes: counted('normalisedVolumes', { own: 8, dual: 512 }),
    numbers: counted('numbers', {
      pointCount: 5,
      triangles,
      triangleNumbers,
      edges,
      edgeNumbers: Float64Array.of(0, 1, 0, -2, 0, 0, 3, 0, -1, 0, 0, 4, 0, -2),
      cubes: Float64Array.of(0, 8, 1, 0, -16),
      secondChern: Float64Array.of(24, 56, 10, 24, 8),
      euler: -168,
    }),
    divisorTopology: counted('divisorTopology', {
      chi: new Int32Array(5),
      h1: new Int32Array(5),
      h2: new Int32Array(5),
      components: new Int32Array(5),
      rigid: new Uint8Array(5),
    }),
    curves: counted('curves', {
      starts: Int32Array.of(0, 2, 3, 5, 6, 7, 8, 9),
      points: Int32Array.of(0, 2, 1, 1, 3, 0, 2, 1, 4),
      coefficients: Float64Array.of(1, -2, 3, 1, -1, 1, 2, 1, -2),
    }),
    fibrations: counted('fibrations', {
      k3: [{ section: 0, fibre: Float64Array.of(1, 0, 0, 0, 0) }],
      genusOne: [
        { section: 0, baseRays: Int32Array.of(1, 0, 0, 1, -1, -1), degree: 3 },
        { section: 0, baseRays: Int32Array.of(1, 0, 0, 1, -1, 0, 0, -1), degree: 1 },
      ],
      nested: [[0, 0]],
    }),
    reference: counted('reference', {
      weights: Float64Array.of(3, 0, 4, 0, 12),
      edgeCurvesSuffice: true,
      rounds: 0,
    }),
    volumes: counted('volumes', {
      total: 3.5,
      divisors: Float64Array.of(24, 16, 2.5, 2.5, 0.5),
      curves: Float64Array.of(1, 1, 2, 3, 1, 4, 1),
    }),
    topEigenvalue: counted('topEigenvalue', 0.01),
    divisorSpectrum: counted('divisorSpectrum', Float64Array.of(0.0001, 0.001, 0.01)),
    basisSpectrum: counted('basisSpectrum', {
      basis: Int32Array.of(1, 2, 3),
      eigenvalues: Float64Array.of(0.001, 0.1),
    }),
    axions: (scale, instantons) => {
      counted('axions', null)()
      const rigid = instantons === 'rigid'
      return {
        decayConstants: rigid ? Float64Array.of(0.02) : Float64Array.of(0.02, 0.5 / scale ** 2),
        logMasses: rigid ? Float64Array.of(-3) : Float64Array.of(-3, -9),
        logScales: rigid ? Float64Array.of(-2.5) : Float64Array.of(-2.5, -5 * scale),
        separations: rigid ? Float64Array.of(Infinity) : Float64Array.of(2.5, 2.5),
        divisors: rigid ? [Int32Array.of(2)] : [Int32Array.of(2), Int32Array.of(0, 4)],
      }
    },
    ...change,
  }
}
