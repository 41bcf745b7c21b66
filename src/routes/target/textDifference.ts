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
    rows.push(...pairsOf(removed, added))
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

/** Lines that were changed, each beside the one it became: the pairs in order that share the most words. */
function pairsOf(removed: readonly string[], added: readonly string[]): DifferenceRow[] {
  const width = added.length + 1
  const most = new Float64Array((removed.length + 1) * width)
  const shared = (i: number, j: number) => sharedWords(removed[i] ?? '', added[j] ?? '')
  for (let i = removed.length - 1; i >= 0; i--)
    for (let j = added.length - 1; j >= 0; j--)
      most[i * width + j] = Math.max(
        most[(i + 1) * width + j] ?? 0,
        most[i * width + j + 1] ?? 0,
        (most[(i + 1) * width + j + 1] ?? 0) + shared(i, j),
      )
  const rows: DifferenceRow[] = []
  let [i, j] = [0, 0]
  while (i < removed.length || j < added.length) {
    const worth = most[i * width + j] ?? 0
    if (i < removed.length && j < added.length && worth > 0) {
      if (worth === (most[(i + 1) * width + j] ?? 0)) rows.push(pairOf(removed[i++] ?? '', null))
      else if (worth === (most[i * width + j + 1] ?? 0)) rows.push(pairOf(null, added[j++] ?? ''))
      else rows.push(pairOf(removed[i++] ?? '', added[j++] ?? ''))
    } else if (i < removed.length) rows.push(pairOf(removed[i++] ?? '', null))
    else rows.push(pairOf(null, added[j++] ?? ''))
  }
  return rows
}

/** Names and numbers that two lines have in common, in order; the word that opens the statement counts most. */
function sharedWords(a: string, b: string): number {
  const common = lineDifferences(wordsOf(a), wordsOf(b)).filter(
    ({ kind, text }) => kind === 'same' && /\w/.test(text),
  ).length
  const opens = common > 0 && a.trim().split(/\s/)[0] === b.trim().split(/\s/)[0]
  return common + (opens ? 3 : 0)
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
