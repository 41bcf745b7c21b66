import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import { type EditorView } from '@codemirror/view'
import { BookOpen, Plus, X } from 'lucide-react'
import { checkColumn } from '../../../scoring/index.ts'
import { explorationColumnLimit } from '../../../shared/explorations.ts'
import { ColumnEditor } from '../../components/editor/ColumnEditor.tsx'
import { Message } from '../../components/editor/Message.tsx'
import { ReferenceList } from '../../components/editor/ReferenceList.tsx'
import { applySuggestion } from '../../components/editor/ruleLint.ts'
import { Button, IconButton } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { useDelayed } from '../../lib/useDelayed.ts'

const typingPause = 500
const roles = ['across', 'up', 'colour']

interface Draft {
  readonly id: number
  readonly text: string
}

/** What is wrong with each text, and names that occur twice. */
export function draftFaults(texts: readonly string[]): (string | null)[] {
  const names = new Map<string, number>()
  return texts.map((text, at) => {
    const check = checkColumn(text)
    if (!check.ok) return check.issues[0]?.message ?? 'this column has an error'
    const { name } = check.column
    const earlier = names.get(name)
    if (earlier !== undefined)
      return `column ${earlier + 1} has the same name; write another before it, as in \`other = …\``
    names.set(name, at)
    return null
  })
}

/** The columns as they are typed; they take effect together, after a pause, when none has an error. */
export function ColumnFields({
  columns,
  onColumns,
}: {
  columns: readonly string[]
  onColumns: (columns: string[]) => void
}) {
  const nextId = useRef(columns.length)
  const [drafts, setDrafts] = useState<readonly Draft[]>(() => columns.map((text, id) => ({ id, text })))
  const [view, setView] = useState<EditorView | null>(null)
  const [choosing, setChoosing] = useState(false)
  const texts = useMemo(() => drafts.map(({ text }) => text), [drafts])
  const faults = useMemo(() => draftFaults(texts), [texts])
  const settled = useDelayed(texts, typingPause)

  // What the address says and the fields do not, because somebody went back, goes into the fields.
  const taken = useRef(JSON.stringify(columns))
  const given = JSON.stringify(columns)
  useEffect(() => {
    if (given === taken.current) return
    taken.current = given
    setDrafts((JSON.parse(given) as string[]).map((text) => ({ id: nextId.current++, text })))
  }, [given])
  useEffect(() => {
    const wanted = JSON.stringify(settled)
    if (settled !== texts || wanted === taken.current || faults.some((fault) => fault !== null)) return
    taken.current = wanted
    onColumns([...settled])
  }, [settled, texts, faults, onColumns])

  const insert = useCallback(
    (piece: string) => {
      setChoosing(false)
      const end = view?.dom.isConnected ? view : null
      if (!end) {
        setDrafts((old) => [...old, { id: nextId.current++, text: piece }])
        return
      }
      end.dispatch(end.state.replaceSelection(piece))
      end.focus()
    },
    [view],
  )

  return (
    <div className="flex flex-col gap-3">
      <ol className="flex flex-col gap-2">
        {drafts.map(({ id, text }, at) => (
          <li key={id}>
            <div className="mb-1 flex items-baseline justify-between text-xs font-medium text-soft">
              Column {at + 1}
              {drafts.length > 1 && roles[at] && <span className="font-normal">{roles[at]}</span>}
            </div>
            <div className="flex items-start gap-1">
              <div className="min-w-0 flex-1">
                <ColumnEditor
                  label={`Column ${at + 1}`}
                  value={text}
                  onFocus={setView}
                  onChange={(changed) =>
                    setDrafts((old) => old.map((one) => (one.id === id ? { id, text: changed } : one)))
                  }
                />
              </div>
              <IconButton
                label={`Remove column ${at + 1}`}
                unavailable={drafts.length === 1 && 'A table has one column at least.'}
                onClick={() => setDrafts((old) => old.filter((one) => one.id !== id))}
              >
                <X size={14} aria-hidden />
              </IconButton>
            </div>
            {settled === texts && faults[at] && (
              <p role="alert" className="mt-1 text-xs text-rejected">
                <Message text={faults[at]} />
                <Repair text={text} view={view} />
              </p>
            )}
          </li>
        ))}
      </ol>
      <div className="flex flex-wrap gap-2">
        <Button
          unavailable={
            drafts.length >= explorationColumnLimit && `At most ${explorationColumnLimit} columns.`
          }
          onClick={() => setDrafts((old) => [...old, { id: nextId.current++, text: nextColumn(texts) }])}
        >
          <Plus size={14} aria-hidden />
          Add a column
        </Button>
        <Button onClick={() => setChoosing(true)}>
          <BookOpen size={14} aria-hidden />
          Observables
        </Button>
      </div>
      <Dialog
        wide
        open={choosing}
        onOpenChange={setChoosing}
        title="Observables"
        description="What you insert goes into the column you were in last, at its cursor."
      >
        <ReferenceList onInsert={insert} />
      </Dialog>
    </div>
  )
}

/** One click where the checker knows a repair; only for the column that is being edited. */
function Repair({ text, view }: { text: string; view: EditorView | null }) {
  const suggestion = checkColumn(text).issues.find((issue) => issue.suggestion)?.suggestion
  if (!suggestion || view?.state.doc.toString() !== text) return null
  return (
    <Button kind="quiet" className="ml-1 -my-1" onClick={() => applySuggestion(view, suggestion)}>
      <Message text={suggestion.label} />
    </Button>
  )
}

/** Something sound that is not there yet, to be changed by whoever adds a column. */
const usual = [
  'volume',
  'count(d in divisors : d.k3)',
  'min(d in divisors : d.volume)',
  'log10(metric.divisor.top)',
  'max(d in divisors : d.cubic)',
  'h11',
  'h21',
  'c2 = max(d in divisors : d.c2)',
]
const nextColumn = (texts: readonly string[]) => usual.find((text) => !texts.includes(text)) ?? 'h11 + h21'
