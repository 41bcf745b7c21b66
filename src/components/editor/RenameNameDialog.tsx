import { useEffect, useRef, useState, type FormEvent } from 'react'
import { type EditorView } from '@codemirror/view'
import { nameProblem, type RenamableName } from '../../../scoring/index.ts'
import { Button } from '../ui/Button.tsx'
import { Dialog } from '../ui/Dialog.tsx'
import { TextField } from '../ui/Field.tsx'
import { counted } from '../../lib/numbers.ts'
import { renameIn } from './renameCommand.ts'

export interface AskedRename {
  readonly view: EditorView
  readonly name: RenamableName
}

/** Another name for one that the rule gives itself, wherever it stands. */
export function RenameNameDialog({ asked, onClose }: { asked: AskedRename | null; onClose: () => void }) {
  const editor = useRef<EditorView | null>(null)
  useEffect(() => {
    if (asked) editor.current = asked.view
  }, [asked])
  return (
    <Dialog
      open={asked !== null}
      onOpenChange={(open) => !open && onClose()}
      title={asked ? `Rename “${asked.name.name}”` : 'Rename'}
      description={
        asked
          ? `${asked.name.kind === 'let' ? 'A name of the rule' : 'The variable of one fold'}, at ${counted(asked.name.spans.length, 'place')}.`
          : undefined
      }
      onCloseFocus={() => editor.current?.focus()}
    >
      {asked && <RenameForm asked={asked} onClose={onClose} />}
    </Dialog>
  )
}

function RenameForm({ asked: { view, name }, onClose }: { asked: AskedRename; onClose: () => void }) {
  const [next, setNext] = useState(name.name)
  const [tried, setTried] = useState(false)
  const problem = nameProblem(view.state.doc.toString(), name.name, next.trim())
  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (problem) return
    onClose()
    renameIn(view, name, next.trim())
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <TextField
        label="New name"
        autoFocus
        spellCheck={false}
        autoComplete="off"
        className="font-mono"
        value={next}
        error={tried || next !== name.name ? problem : null}
        onChange={(event) => setNext(event.target.value)}
        onFocus={(event) => event.target.select()}
      />
      <Button kind="primary" type="submit" className="self-start">
        Rename everywhere
      </Button>
    </form>
  )
}
