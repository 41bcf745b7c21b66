export interface DifferenceLine {
  kind: 'same' | 'removed' | 'added'
  text: string
}

/** What to change in `before`, line by line, to get `after` (longest common subsequence). */
export function lineDifferences(before: string, after: string): DifferenceLine[] {
  const a = before.split('\n')
  const b = after.split('\n')
  const width = b.length + 1
  const longest = new Uint32Array((a.length + 1) * width)
  const at = (i: number, j: number) => longest[i * width + j] ?? 0
  for (let i = a.length - 1; i >= 0; i--) {
    for (let j = b.length - 1; j >= 0; j--) {
      longest[i * width + j] = a[i] === b[j] ? at(i + 1, j + 1) + 1 : Math.max(at(i + 1, j), at(i, j + 1))
    }
  }
  const lines: DifferenceLine[] = []
  let i = 0
  let j = 0
  while (i < a.length || j < b.length) {
    if (i < a.length && j < b.length && a[i] === b[j]) {
      lines.push({ kind: 'same', text: a[i] ?? '' })
      i += 1
      j += 1
    } else if (j >= b.length || (i < a.length && at(i + 1, j) >= at(i, j + 1))) {
      lines.push({ kind: 'removed', text: a[i] ?? '' })
      i += 1
    } else {
      lines.push({ kind: 'added', text: b[j] ?? '' })
      j += 1
    }
  }
  return lines
}
