import { BlockCollector, type BlockProblem, type PointBlock } from './blockCollector.ts'
import { opensNestedRows, readNestedRows } from './nestedRows.ts'

export type { BlockProblem, PointBlock }

/**
 * Reads matrices of integer points out of plain text. A block is a run of lines of integers (separated by blanks,
 * tabs or commas; brackets around a row are fine), ended by a blank line or a line of text; or a nested list of rows
 * in brackets, on one line or over several. Each is a matrix with 4 columns (points as rows) or with 4 rows and at
 * least 5 columns (points as columns; 4 x 4 is read as rows).
 *
 * Lines of text before a matrix are its heading, and so is a line of two integers that give its shape. Text behind
 * `#` or `//` is a comment. Whether the points make a reflexive polytope is not looked at here.
 */
export function parsePointBlocks(text: string): { polytopes: PointBlock[]; problems: BlockProblem[] } {
  const lines = text
    .replace(/^\uFEFF/, '')
    .replaceAll('\u2212', '-')
    .split(/\r\n|\n|\r/)
  const bare = lines.map((line) => line.replace(/(#|\/\/).*$/, ''))
  const blocks = new BlockCollector()
  let index = 0
  while (index < lines.length) {
    const content = bare[index].trim()
    const label = headingBefore(content)
    if (content === '') {
      if (lines[index].trim() === '') blocks.blank()
      index++
    } else if (opensNestedRows(content.slice(label.length))) {
      blocks.close()
      const reading = readNestedRows(bare, index, bare[index].indexOf(content) + label.length)
      for (const { line, rows } of reading.blocks) blocks.nested(line, rows)
      if (reading.open !== undefined) blocks.openBracket(reading.open)
      index = Math.max(reading.next, index + 1)
    } else {
      blocks.line(content.slice(label.length), index + 1)
      index++
    }
  }
  blocks.end()
  return { polytopes: blocks.polytopes, problems: blocks.problems.sort((a, b) => a.line - b.line) }
}

/** Text in front of a list on the same line: up to a nested list, or a name with = or : before a bracket. */
function headingBefore(content: string): string {
  const nested = /^.*?(?=[[({]\s*(?:[[({]|$))/.exec(content)
  const named = /^[\w"' .-]*[=:]\s*(?=[[({])/.exec(content)
  return nested?.[0] ?? named?.[0] ?? ''
}
