import { useMemo } from 'react'
import CodeMirror from '@uiw/react-codemirror'
import { EditorView } from '@codemirror/view'
import { linter, lintGutter } from '@codemirror/lint'
import { editorTheme } from './editorTheme.ts'
import { ruleHover } from './ruleHover.ts'
import { ruleLanguage } from './ruleLanguage.ts'
import { ruleLint } from './ruleLint.ts'

/** One object for all time: a new one would make the editor set itself up again. */
const basics = { foldGutter: false, searchKeymap: false, highlightSelectionMatches: false, lintKeymap: true }

interface RuleEditorProps {
  value: string
  onChange: (text: string) => void
  onReady?: (view: EditorView) => void
  label: string
  readOnly?: boolean
}

/** The editor for scoring rules: colours, completion, hover, and located messages from the shared checker. */
export function RuleEditor({ value, onChange, onReady, label, readOnly }: RuleEditorProps) {
  const extensions = useMemo(
    () => [
      ruleLanguage(),
      linter(null),
      ruleLint,
      lintGutter(),
      ruleHover,
      editorTheme,
      EditorView.lineWrapping,
      EditorView.contentAttributes.of({ 'aria-label': label }),
    ],
    [label],
  )
  return (
    <CodeMirror
      value={value}
      onChange={onChange}
      onCreateEditor={onReady}
      readOnly={readOnly}
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
