import { useMemo } from 'react'
import CodeMirror from '@uiw/react-codemirror'
import { autocompletion } from '@codemirror/autocomplete'
import { linter } from '@codemirror/lint'
import { EditorState, RangeSetBuilder, type Extension } from '@codemirror/state'
import { Decoration, EditorView, ViewPlugin, type DecorationSet, type ViewUpdate } from '@codemirror/view'
import { syntaxHighlighting } from '@codemirror/language'
import { highlightTree } from '@lezer/highlight'
import { checkColumn, columnLead } from '../../../scoring/index.ts'
import { editorTheme } from './editorTheme.ts'
import { hoverAfter } from './ruleHover.ts'
import { colouredParser, completionSource, highlighting } from './ruleLanguage.ts'
import { lintBy } from './ruleLint.ts'

/** One object for all time: a new one would make the editor set itself up again. */
const basics = {
  foldGutter: false,
  lineNumbers: false,
  highlightActiveLine: false,
  searchKeymap: false,
  highlightSelectionMatches: false,
  autocompletion: false,
  lintKeymap: true,
}

/** Line breaks that are pasted become spaces. */
const oneLine = EditorState.transactionFilter.of((transaction) => {
  if (!transaction.docChanged || transaction.newDoc.lines === 1) return transaction
  const text = transaction.newDoc.toString().replace(/\s*\n\s*/g, ' ')
  const end = transaction.startState.doc.length
  return { changes: { from: 0, to: end, insert: text }, selection: { anchor: text.length } }
})

/** Colours of an expression, which is no rule of its own: those it has behind the words that make it one. */
const colours = ViewPlugin.fromClass(
  class {
    decorations: DecorationSet

    constructor(view: EditorView) {
      this.decorations = coloursOf(view)
    }

    update(update: ViewUpdate): void {
      if (update.docChanged) this.decorations = coloursOf(update.view)
    }
  },
  { decorations: (plugin) => plugin.decorations },
)

function coloursOf({ state }: EditorView): DecorationSet {
  const found = new RangeSetBuilder<Decoration>()
  const lead = columnLead.length
  highlightTree(colouredParser.parse(columnLead + state.doc.toString()), highlighting, (from, to, style) => {
    if (from >= lead) found.add(from - lead, to - lead, Decoration.mark({ class: style }))
  })
  return found.finish()
}

const expression: Extension = [
  oneLine,
  colours,
  syntaxHighlighting(highlighting),
  autocompletion({ override: [completionSource(columnLead)] }),
  linter(null),
  lintBy((text) => checkColumn(text).issues),
  hoverAfter(columnLead),
  editorTheme,
  EditorView.lineWrapping,
  EditorView.theme({ '.cm-content': { padding: '4px 0' }, '.cm-line': { padding: '0 8px' } }),
]

interface ColumnEditorProps {
  value: string
  onChange: (text: string) => void
  onFocus?: (view: EditorView) => void
  label: string
}

/** One line for one expression of the scoring language: colours, completion, hover and located messages as in a rule. */
export function ColumnEditor({ value, onChange, onFocus, label }: ColumnEditorProps) {
  const extensions = useMemo(
    () => [
      expression,
      EditorView.contentAttributes.of({ 'aria-label': label }),
      EditorView.domEventHandlers({ focus: (_event, view) => onFocus?.(view) }),
    ],
    [label, onFocus],
  )
  return (
    <CodeMirror
      value={value}
      onChange={onChange}
      theme="none"
      indentWithTab={false}
      extensions={extensions}
      basicSetup={basics}
      className="border border-edge"
    />
  )
}
