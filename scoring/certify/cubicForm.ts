import type { Vector } from './determinants.ts'
import type { CertifiedNumbers } from './intersectionChecks.ts'

/**
 * The cubic form of the intersection numbers, V(w) = 1/6 sum kappa_ijk w_i w_j w_k, with its derivatives: divisor
 * volumes tau_i = 1/2 sum kappa_ijk w_j w_k and A_ij = sum kappa_ijk w_k. Units 2 pi sqrt(alpha') = 1.
 */
export class CubicForm {
  constructor(
    private readonly triples: CertifiedNumbers['triples'],
    readonly size: number,
  ) {}

  /** tau_i at w. */
  divisorVolumes(w: ArrayLike<number>): Float64Array {
    const tau = new Float64Array(this.size)
    for (const [i, j, k, value] of this.triples) {
      if (i === k) tau[i] += 0.5 * value * w[i] * w[i]
      else if (i === j) {
        tau[i] += value * w[i] * w[k]
        tau[k] += 0.5 * value * w[i] * w[i]
      } else if (j === k) {
        tau[k] += value * w[k] * w[i]
        tau[i] += 0.5 * value * w[k] * w[k]
      } else {
        tau[i] += value * w[j] * w[k]
        tau[j] += value * w[i] * w[k]
        tau[k] += value * w[i] * w[j]
      }
    }
    return tau
  }

  /** Sum of the sizes of the terms of each tau_i: what rounding is relative to. */
  termSizes(w: ArrayLike<number>): Float64Array {
    const sizes = this.triples.map(([i, j, k, value]) => [i, j, k, Math.abs(value)] as const)
    return new CubicForm(sizes, this.size).divisorVolumes(Array.from(w, Math.abs))
  }

  /** V at w, by Euler's theorem from the divisor volumes: V = 1/3 sum tau_i w_i. */
  volume(w: ArrayLike<number>, tau: ArrayLike<number> = this.divisorVolumes(w)): number {
    let sum = 0
    for (let i = 0; i < this.size; i++) sum += tau[i] * w[i]
    return sum / 3
  }

  /** The symmetric matrix A at w, dense, by rows. */
  pairMatrix(w: ArrayLike<number>): Float64Array[] {
    const a = Array.from({ length: this.size }, () => new Float64Array(this.size))
    const put = (i: number, j: number, value: number): void => {
      a[i][j] += value
      if (i !== j) a[j][i] += value
    }
    for (const [i, j, k, value] of this.triples) {
      if (i === k) put(i, i, value * w[i])
      else if (i === j) {
        put(i, i, value * w[k])
        put(i, k, value * w[i])
      } else if (j === k) {
        put(k, k, value * w[i])
        put(i, k, value * w[k])
      } else {
        put(i, j, value * w[k])
        put(i, k, value * w[j])
        put(j, k, value * w[i])
      }
    }
    return a
  }
}

/**
 * An orthogonal change of coordinates of R^N after which the four linear relations <m, v_k> are the first four
 * axes: four Householder reflections. The others span the toric part of H^{1,1}, of dimension N - 4.
 */
export class ToricPart {
  private readonly reflections: Float64Array[] = []

  constructor(points: readonly Vector[]) {
    const columns = [0, 1, 2, 3].map((axis) => Float64Array.from(points, (point) => point[axis]))
    for (let n = 0; n < 4; n++) {
      const column = columns[n]
      let square = 0
      for (let p = n; p < column.length; p++) square += column[p] * column[p]
      const mirror = new Float64Array(column.length)
      for (let p = n; p < column.length; p++) mirror[p] = column[p]
      mirror[n] += column[n] < 0 ? -Math.sqrt(square) : Math.sqrt(square)
      const length = Math.sqrt(mirror.reduce((sum, entry) => sum + entry * entry, 0))
      for (let p = n; p < mirror.length; p++) mirror[p] /= length
      this.reflections.push(mirror)
      for (const other of columns) reflect(mirror, other)
    }
  }

  /** The last N - 4 coordinates of a vector. */
  project(vector: ArrayLike<number>): Float64Array {
    const image = Float64Array.from(vector)
    for (const mirror of this.reflections) reflect(mirror, image)
    return image.slice(4)
  }

  /** The vector orthogonal to the relations with these coordinates. */
  lift(coordinates: ArrayLike<number>): Float64Array {
    const vector = new Float64Array(coordinates.length + 4)
    vector.set(Array.from(coordinates), 4)
    for (const mirror of [...this.reflections].reverse()) reflect(mirror, vector)
    return vector
  }

  /** The block of a symmetric matrix on the toric part. */
  block(matrix: readonly Float64Array[]): Float64Array[] {
    const rows = matrix.map((row) => this.project(row))
    const transposed = rows[0].map(() => 0)
    return Array.from(transposed, (_, c) => this.project(rows.map((row) => row[c])))
  }
}

function reflect(mirror: Float64Array, x: Float64Array): void {
  let sum = 0
  for (let p = 0; p < x.length; p++) sum += mirror[p] * x[p]
  for (let p = 0; p < x.length; p++) x[p] -= 2 * sum * mirror[p]
}
