/** Inner product of `length` values from a and from b on, summed in four strands. */
export function innerProduct(values: Float64Array, a: number, b: number, length: number): number {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let k = 0
  for (; k + 3 < length; k += 4) {
    s0 += values[a + k] * values[b + k]
    s1 += values[a + k + 1] * values[b + k + 1]
    s2 += values[a + k + 2] * values[b + k + 2]
    s3 += values[a + k + 3] * values[b + k + 3]
  }
  for (; k < length; k++) s0 += values[a + k] * values[b + k]
  return s0 + s1 + (s2 + s3)
}
