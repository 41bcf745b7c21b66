/** Orthonormal basis of the span of linearly independent vectors: Gram-Schmidt, each vector swept twice. */
export function orthonormalColumns(columns: readonly Float64Array[]): Float64Array[] {
  const result: Float64Array[] = []
  for (const column of columns) {
    const vector = Float64Array.from(column)
    for (let sweep = 0; sweep < 2; sweep++) removeComponents(result, vector)
    const length = Math.sqrt(innerProduct(vector, vector))
    result.push(vector.map((entry) => entry / length))
  }
  return result
}

/** Subtracts from `vector` its components along orthonormal `directions`, one after the other. */
export function removeComponents(directions: readonly Float64Array[], vector: Float64Array): void {
  for (const direction of directions) {
    const share = innerProduct(direction, vector)
    for (let k = 0; k < vector.length; k++) vector[k] -= share * direction[k]
  }
}

export function innerProduct(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let k = 0; k < a.length; k++) sum += a[k] * b[k]
  return sum
}
