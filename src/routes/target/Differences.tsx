import { useMemo } from 'react'
import { textDifference, type DifferenceRow, type Piece } from './textDifference.ts'

interface DifferencesProps {
  before: string
  after: string
  /** What the two are called. */
  names: readonly [before: string, after: string]
  sideBySide: boolean
}

/** Two texts of a rule, compared. Removed and added are told apart by sign and word, too. */
export function Differences({ before, after, names, sideBySide }: DifferencesProps) {
  const rows = useMemo(() => withoutLastBreak(textDifference(before, after)), [before, after])
  if (before === after) return <p className="mt-2 text-soft">The two texts are the same.</p>
  return sideBySide ? <Beside rows={rows} names={names} /> : <Inline rows={rows} names={names} />
}

/** The line break at the end of both texts is no line to look at. */
function withoutLastBreak(rows: readonly DifferenceRow[]): readonly DifferenceRow[] {
  const last = rows.at(-1)
  return last?.same && last.after?.every(({ text }) => text === '') ? rows.slice(0, -1) : rows
}

interface RowsProps {
  rows: readonly DifferenceRow[]
  names: readonly [before: string, after: string]
}

const cell = 'px-1.5 align-top whitespace-pre-wrap break-words'

function Beside({ rows, names: [before, after] }: RowsProps) {
  return (
    <table className="mt-2 w-full table-fixed border-collapse font-mono text-xs leading-5">
      <thead>
        <tr className="border-b text-left font-sans">
          <th scope="col" className="px-1.5 font-medium">
            {before}
          </th>
          <th scope="col" className="border-l px-1.5 font-medium">
            {after}
          </th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row, index) => (
          <tr key={index}>
            <td className={`${cell} ${row.same ? 'text-soft' : row.before ? 'bg-rejected-wash' : ''}`}>
              <Pieces pieces={row.before} kind="removed" plain={row.same} />
            </td>
            <td className={`${cell} border-l ${row.same ? 'text-soft' : row.after ? 'bg-action-wash' : ''}`}>
              <Pieces pieces={row.after} kind="added" plain={row.same} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}

function Inline({ rows, names: [before, after] }: RowsProps) {
  return (
    <div role="list" aria-label={`From ${before} to ${after}`} className="mt-2 font-mono text-xs leading-5">
      {rows.map((row, index) =>
        row.same ? (
          <Line key={index} pieces={row.after} sign=" " kind="added" plain />
        ) : (
          <div role="presentation" key={index}>
            {row.before && <Line pieces={row.before} sign="−" kind="removed" word={`only in ${before}: `} />}
            {row.after && <Line pieces={row.after} sign="+" kind="added" word={`only in ${after}: `} />}
          </div>
        ),
      )}
    </div>
  )
}

function Line({
  pieces,
  sign,
  kind,
  word = '',
  plain = false,
}: {
  pieces: readonly Piece[] | null
  sign: string
  kind: 'removed' | 'added'
  word?: string
  plain?: boolean
}) {
  const wash = plain ? 'text-soft' : kind === 'removed' ? 'bg-rejected-wash' : 'bg-action-wash'
  return (
    <div role="listitem" className={`flex ${wash}`}>
      <span aria-hidden className="w-4 shrink-0 text-center">
        {sign}
      </span>
      <span className="sr-only">{word}</span>
      <span className={`min-w-0 flex-1 ${cell}`}>
        <Pieces pieces={pieces} kind={kind} plain={plain} />
      </span>
    </div>
  )
}

/** Changed words are underlined or struck through, so that they show without colour. */
const marks = {
  removed: 'line-through decoration-rejected',
  added: 'font-semibold underline decoration-action',
}

function Pieces({
  pieces,
  kind,
  plain,
}: {
  pieces: readonly Piece[] | null
  kind: 'removed' | 'added'
  plain: boolean
}) {
  if (pieces === null) return null
  if (plain || pieces.every(({ changed }) => changed))
    return <>{pieces.map(({ text }) => text).join('') || '\u00a0'}</>
  return (
    <>
      {pieces.map(({ text, changed }, index) =>
        changed ? (
          <span key={index} className={marks[kind]}>
            {text}
          </span>
        ) : (
          <span key={index}>{text}</span>
        ),
      )}
    </>
  )
}
