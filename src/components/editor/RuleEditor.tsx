import { useEffect, useMemo, useState } from 'react'
import CodeMirror from '@uiw/react-codemirror'
import { EditorView } from '@codemirror/view'
import { linter, lintGutter } from '@codemirror/lint'
import { type RenamableName, type RuleReport } from '../../../scoring/index.ts'
import { editorTheme } from './editorTheme.ts'
import { renameKey } from './renameCommand.ts'
import { ruleHover } from './ruleHover.ts'
import { ruleLanguage } from './ruleLanguage.ts'
import { setReport, shownReport } from './shownReport.ts'

/** One object for all time: a new one would make the editor set itself up again. */
const basics = { foldGutter: false, searchKeymap: false, highlightSelectionMatches: false, lintKeymap: true }

interface RuleEditorProps {
  value: string
  onChange: (text: string) => void
  onReady?: (view: EditorView) => void
  /** What the checker says; underlined while it is of the text in the editor. */
  report: RuleReport | null
  /** Asked for by F2 at a name of the rule. */
  onRename: (view: EditorView, name: RenamableName) => void
  label: string
}

/** The editor for scoring rules: colours, completion, hover, and located messages from the shared checker. */
export function RuleEditor({ value, onChange, onReady, report, onRename, label }: RuleEditorProps) {
  const [view, setView] = useState<EditorView | null>(null)
  const extensions = useMemo(
    () => [
      ruleLanguage(),
      linter(null),
      shownReport,
      lintGutter(),
      ruleHover,
      renameKey(onRename),
      editorTheme,
      EditorView.lineWrapping,
      EditorView.contentAttributes.of({ 'aria-label': label }),
    ],
    [label, onRename],
  )
  useEffect(() => {
    if (view && report) view.dispatch({ effects: setReport.of(report) })
  }, [view, report])
  return (
    <CodeMirror
      value={value}
      onChange={onChange}
      onCreateEditor={(created) => {
        setView(created)
        onReady?.(created)
      }}
      theme="none"
      indentWithTab={false}
      minHeight="264px"
      maxHeight="60vh"
      extensions={extensions}
      basicSetup={basics}
      className="border border-edge"
    />
  )
}
