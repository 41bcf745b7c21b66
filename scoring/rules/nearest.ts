/** Edit distance with transposition of neighbours, cut off above `limit`. */
function distance(a: string, b: string, limit: number): number {
  if (Math.abs(a.length - b.length) > limit) return limit + 1
  let before: number[] = []
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const row = [i]
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1]
      let best = Math.min(previous[j] + 1, row[j - 1] + 1, previous[j - 1] + (same ? 0 : 1))
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        best = Math.min(best, before[j - 2] + 1)
      row.push(best)
    }
    before = previous
    previous = row
  }
  return previous[b.length]
}

/**
 * The name in `names` that `found` is most likely a misspelling of, or undefined when none is near. Case does
 * not count; among equally near names the first wins. A last part counts too: `top` is near
 * `metric.divisor.top`.
 */
export function nearestName(found: string, names: Iterable<string>): string | undefined {
  const wanted = found.toLowerCase().slice(0, 80)
  const limit = Math.max(1, Math.floor(wanted.length / 3))
  let best: string | undefined
  let bestDistance = limit + 1
  for (const name of names) {
    const candidate = name.toLowerCase()
    let d = distance(wanted, candidate, limit)
    if (d > 0 && !wanted.includes('.') && candidate.endsWith(`.${wanted}`)) d = Math.min(d, limit)
    if (d < bestDistance) {
      best = name
      bestDistance = d
    }
  }
  return best
}
