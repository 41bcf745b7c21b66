/** By number of members each: the longest list of starts so far. */
const known = new Map<number, Int32Array>()

/** Where the members of each element start, when every element has the same number of them and `items` holds all. */
export function startsOfEqual(each: number, items: ArrayLike<number>): Int32Array {
  const count = items.length / each + 1
  let starts = known.get(each)
  if (starts === undefined || starts.length < count) {
    starts = new Int32Array(count)
    for (let n = 0; n < count; n++) starts[n] = each * n
    known.set(each, starts)
  }
  return starts
}
