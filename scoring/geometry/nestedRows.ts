/** One list of rows inside brackets, as written: entries are still text. */
export interface NestedBlock {
  readonly line: number
  readonly rows: readonly { readonly line: number; readonly entries: readonly string[] }[]
}

export interface NestedReading {
  readonly blocks: readonly NestedBlock[]
  /** Index of the first line that was not taken. */
  readonly next: number
  /** Line on which a list begins that is never closed. */
  readonly open: number | undefined
}

interface Group {
  readonly line: number
  readonly entries: string[]
  readonly rows: { line: number; entries: readonly string[] }[]
  /** Holds lists of rows, or nothing but them. */
  nested: boolean
}

/** Does a nested list begin here: a bracket followed by another one, or by the end of the line? */
export const opensNestedRows = (content: string): boolean => /^[[({]\s*([[({]|$)/.test(content)

/**
 * Reads nested lists of rows, `[[1,0,0,0],[0,1,0,0],..]`, alone or in a list of such lists, over any number of lines.
 * Reading ends with the line on which all brackets are closed. A list that stays open is given up at a blank line,
 * or where the next list begins, so that the ones behind it are not lost.
 *
 * @param lines the text without comments
 * @param start index of the line; `column` is that of the first bracket
 */
export function readNestedRows(lines: readonly string[], start: number, column: number): NestedReading {
  const blocks: NestedBlock[] = []
  const open: Group[] = []
  for (let index = start; index < lines.length; index++) {
    const content = index === start ? lines[index].slice(column) : lines[index]
    const inner = open.at(-1)
    if (content.trim() === '' && inner !== undefined && (inner.rows.length > 0 || inner.entries.length > 0)) {
      return { blocks, next: index, open: listOf(open).line }
    }
    for (const [token] of content.matchAll(/[[({\])}]|[^[\](){}\s,;]+/g)) {
      if (/[[({]/.test(token)) {
        const parent = open.at(-1)
        const grandparent = open.at(-2)
        if (parent !== undefined && grandparent !== undefined && grandparent.rows.length > 0) {
          // A list where a row should be: the list before it was never closed.
          return { blocks, next: index, open: grandparent.line }
        }
        if (parent !== undefined) parent.nested = true
        open.push({ line: index + 1, entries: [], rows: [], nested: false })
      } else if (/[\])}]/.test(token)) {
        const group = open.pop()
        const parent = open.at(-1)
        if (group === undefined) continue
        if (group.rows.length > 0) blocks.push({ line: group.line, rows: group.rows })
        else if (!group.nested) parent?.rows.push({ line: group.line, entries: group.entries })
      } else {
        open.at(-1)?.entries.push(token)
      }
    }
    if (open.length === 0) return { blocks, next: index + 1, open: undefined }
  }
  return { blocks, next: lines.length, open: listOf(open).line }
}

/** The list that is being read: the innermost group with rows, or else the outermost. */
const listOf = (open: readonly Group[]): Group => open.findLast(({ rows }) => rows.length > 0) ?? open[0]
