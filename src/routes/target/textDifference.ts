import { lineDifferences } from './lineDifferences.ts'

/** A stretch of a line; `changed` where the other text has none like it. */
export interface Piece {
  readonly text: string
  readonly changed: boolean
}

/** A row of two texts laid side by side; null where one has no such line. */
export interface DifferenceRow {
  readonly before: readonly Piece[] | null
  readonly after: readonly Piece[] | null
  readonly same: boolean
}

/** The two texts line against line, words marked inside lines that have changed. */
export function textDifference(before: string, after: string): DifferenceRow[] {
  const rows: DifferenceRow[] = []
  let removed: string[] = []
  let added: string[] = []
  const flush = () => {
    for (let at = 0; at < Math.max(removed.length, added.length); at++)
      rows.push(pairOf(removed[at] ?? null, added[at] ?? null))
    removed = []
    added = []
  }
  for (const { kind, text } of lineDifferences(before, after)) {
    if (kind === 'removed') removed.push(text)
    else if (kind === 'added') added.push(text)
    else {
      flush()
      const whole = [{ text, changed: false }]
      rows.push({ before: whole, after: whole, same: true })
    }
  }
  flush()
  return rows
}

const whole = (text: string): Piece[] => [{ text, changed: true }]

function pairOf(before: string | null, after: string | null): DifferenceRow {
  if (before === null || after === null)
    return {
      before: before === null ? null : whole(before),
      after: after === null ? null : whole(after),
      same: false,
    }
  const words = lineDifferences(wordsOf(before), wordsOf(after))
  const kept = words.filter(({ kind, text }) => kind === 'same' && /\w/.test(text)).length
  // Two lines that share no word are two lines, not one that has changed.
  if (kept === 0) return { before: whole(before), after: whole(after), same: false }
  return {
    before: piecesOf(words.filter(({ kind }) => kind !== 'added')),
    after: piecesOf(words.filter(({ kind }) => kind !== 'removed')),
    same: false,
  }
}

/** Names, numbers, blanks and signs, one a line; a line of a rule holds no line break. */
const wordsOf = (line: string): string => (line.match(/[\w.]+|\s+|[^\w\s]/g) ?? []).join('\n')

function piecesOf(words: readonly { readonly kind: string; readonly text: string }[]): Piece[] {
  const pieces: { text: string; changed: boolean }[] = []
  for (const { kind, text } of words) {
    const changed = kind !== 'same'
    const last = pieces.at(-1)
    if (last?.changed === changed) last.text += text
    else pieces.push({ text, changed })
  }
  return pieces
}
