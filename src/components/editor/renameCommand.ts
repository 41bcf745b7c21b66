import { keymap, type Command, type EditorView } from '@codemirror/view'
import { nameAt, type RenamableName } from '../../../scoring/index.ts'

/** The rule's own name that the cursor stands at. */
export const nameAtCursor = ({ state }: EditorView): RenamableName | null =>
  nameAt(state.doc.toString(), state.selection.main.head)

/** Changes a name everywhere at once; one undo takes it back. */
export function renameIn(view: EditorView, { spans }: RenamableName, next: string): void {
  view.dispatch({
    changes: spans.map(({ from, to }) => ({ from, to, insert: next })),
    userEvent: 'input.rename',
    scrollIntoView: true,
  })
  view.focus()
}

/** F2 at a name asks for another. */
export function renameKey(ask: (view: EditorView, name: RenamableName) => void) {
  const run: Command = (view) => {
    const name = nameAtCursor(view)
    if (name) ask(view, name)
    return name !== null
  }
  return keymap.of([{ key: 'F2', run }])
}
