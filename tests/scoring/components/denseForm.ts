import {
  intersectionNumber,
  type IntersectionNumbers,
} from '../../../scoring/geometry/intersectionNumbers.ts'

/** A form with all numbers written out, as `kappa[i][j][k]`. */
export interface DenseForm {
  readonly kappa: readonly (readonly (readonly number[])[])[]
  readonly chern: readonly number[]
}

export function dense(form: IntersectionNumbers): DenseForm {
  const all = Array.from({ length: form.pointCount }, (_, i) => i)
  return {
    kappa: all.map((i) => all.map((j) => all.map((k) => intersectionNumber(form, i, j, k)))),
    chern: [...form.secondChern],
  }
}

/** The form on the vectors of a matrix's rows in place of the generators: any number of them. */
export function onVectors({ kappa, chern }: DenseForm, rows: readonly (readonly number[])[]): DenseForm {
  const dot = (row: readonly number[], values: readonly number[]) =>
    row.reduce((sum, entry, i) => sum + entry * values[i], 0)
  return {
    kappa: rows.map((a) =>
      rows.map((b) =>
        rows.map((c) =>
          dot(
            a,
            kappa.map((slice) =>
              dot(
                b,
                slice.map((line) => dot(c, line)),
              ),
            ),
          ),
        ),
      ),
    ),
    chern: rows.map((row) => dot(row, chern)),
  }
}

export function sparse({ kappa, chern }: DenseForm): IntersectionNumbers {
  const triangles: number[] = []
  const triangleNumbers: number[] = []
  const edges: number[] = []
  const edgeNumbers: number[] = []
  for (let i = 0; i < chern.length; i++) {
    for (let j = i + 1; j < chern.length; j++) {
      edges.push(i, j)
      edgeNumbers.push(kappa[i][i][j], kappa[i][j][j])
      for (let k = j + 1; k < chern.length; k++) {
        triangles.push(i, j, k)
        triangleNumbers.push(kappa[i][j][k])
      }
    }
  }
  return {
    pointCount: chern.length,
    triangles: Int32Array.from(triangles),
    triangleNumbers: Float64Array.from(triangleNumbers),
    edges: Int32Array.from(edges),
    edgeNumbers: Float64Array.from(edgeNumbers),
    cubes: Float64Array.from(chern, (_, i) => kappa[i][i][i]),
    secondChern: Float64Array.from(chern),
    euler: 0,
  }
}
