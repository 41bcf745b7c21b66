import { csvSeparator, readCsvCandidates } from './csvCandidates.ts'
import type { CandidateReading, Orientation } from './given.ts'
import { readJsonCandidates } from './jsonCandidates.ts'
import { readTextCandidates } from './textCandidates.ts'

/**
 * Candidates of a text in any of the formats that are read: JSON when it begins with an object (or a list of them), a
 * table when its first line names columns, plain text in sections otherwise. Nothing is computed here; what is no
 * candidate is listed with its line, and does not spoil the others.
 *
 * @param orientation of square matrices that could be read both ways; without it they are listed as ambiguous
 */
export function readCandidates(text: string, orientation?: Orientation): CandidateReading {
  if (/^\uFEFF?\s*(?:\{\s*["}]|\{\s*$|\[\s*(?:\{|\]|$))/.test(text)) return readJsonCandidates(text)
  const separator = csvSeparator(text)
  return separator === undefined ? readTextCandidates(text, orientation) : readCsvCandidates(text, separator)
}
