import { opensNestedRows, readNestedRows } from '../geometry/nestedRows.ts'
import type { CandidateReading, Orientation } from './given.ts'
import { integerLine } from './integerText.ts'
import { SectionCollector, type SectionName } from './sectionCollector.ts'

const headings: readonly (readonly [pattern: RegExp, section: SectionName])[] = [
  [/^vertices$/, 'vertices'],
  [/^points$/, 'points'],
  [/^lifted(?: points)?$/, 'lifted'],
  [/^heights$/, 'heights'],
  [/^simplices$/, 'simplices'],
  [/^triangles$/, 'triangles'],
  [/^weights$/, 'weights'],
]

/**
 * Candidates in plain text, in sections. A line with a word alone (and perhaps `:` or `=`) opens one:
 *
 *     candidate NAME          begins a candidate and names it (also `name NAME`); optional
 *     vertices                a point a row, or a point a column
 *     weights 1 1 1 6 9 fan   instead: a weight system and the side
 *     polytope KEY            instead: the key of a polytope of the library
 *     points                  the points that heights and indices refer to; without it the rows of `vertices`
 *     heights                 one integer per point
 *     lifted points           points with their heights, five entries a row, instead of points and heights
 *     simplices, triangles    rows of indices, instead of heights
 *     indices from 1          when the first point is called 1
 *
 * A block of integers without a heading is taken by its shape: 4 columns or rows for the points of a new candidate,
 * one row or column for heights, 3 columns for triangles, 5 for simplices. Blank lines part blocks, `#` and `//`
 * begin comments. A candidate without a polytope of its own stands on the one before. Other lines are skipped and
 * listed.
 */
export function readTextCandidates(text: string, orientation?: Orientation): CandidateReading {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/)
  const bare = lines.map((line) => line.replace(/(#|\/\/).*$/, ''))
  const sections = new SectionCollector(orientation)
  let index = 0
  while (index < lines.length) {
    const line = index + 1
    const whole = bare[index].trim()
    if (whole === '') {
      if (lines[index].trim() === '') sections.blank()
      index++
      continue
    }
    const content = heading(whole, line, sections)
    if (content === '') {
      index++
      continue
    }
    if (opensNestedRows(content)) {
      const reading = readNestedRows(bare, index, bare[index].lastIndexOf(content))
      for (const block of reading.blocks) sections.nested(block)
      if (reading.open !== undefined) {
        sections.fault(
          reading.open,
          'blocks.open-bracket',
          `The list that begins on line ${reading.open} is never closed`,
        )
      }
      index = Math.max(reading.next, index + 1)
      continue
    }
    sections.content(integerLine(content), line, lines[index].trim())
    index++
  }
  return sections.end()
}

/** Opens what the line announces; returns what is left of it. */
function heading(content: string, line: number, sections: SectionCollector): string {
  const named = /^(?:candidate|name)\b\s*[:=]?\s*(.*)$/i.exec(content)
  if (named && !/^[[({]/.test(named[1])) {
    sections.candidate(named[1].trim(), line)
    return ''
  }
  const polytope = /^polytope\s*[:=]?\s*([0-9a-f]{32})$/i.exec(content)
  if (polytope) {
    sections.polytope(polytope[1].toLowerCase(), line)
    return ''
  }
  const from = /^ind(?:ices|ex) from\s*[:=]?\s*([01])$/i.exec(content)
  if (from) {
    sections.indicesFrom(from[1] === '1' ? 1 : 0, line)
    return ''
  }
  const weights = /^weights\s*[:=]?\s*([\d\s,+]+?)[\s,]*(fan|newton)$/i.exec(content)
  if (weights) {
    const entries = weights[1].split(/[\s,]+/).filter((entry) => entry !== '')
    sections.weights(entries.map(Number), weights[2].toLowerCase() as 'fan' | 'newton', line)
    return ''
  }
  const word = /^([a-z ]+?)\s*(?:[:=]\s*(.*)|((?:[[({]|[-+\d]).*))?$/i.exec(content)
  const section = word && headings.find(([pattern]) => pattern.test(word[1].toLowerCase()))?.[1]
  if (!word || section === undefined || section === null) return content
  const rest = (word[2] ?? word[3] ?? '').trim()
  if (section === 'weights') {
    sections.fault(
      line,
      'input.no-side',
      'Weights are five integers and a side, "fan" or "newton", on one line',
    )
    return ''
  }
  sections.open(section, line)
  return rest
}
