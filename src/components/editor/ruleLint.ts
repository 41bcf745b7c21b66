import { setDiagnostics, type Diagnostic } from '@codemirror/lint'
import { type EditorView, ViewPlugin, type ViewUpdate } from '@codemirror/view'
import { type RuleIssue, type RuleSuggestion } from '../../../scoring/index.ts'
import { codeParts } from './codeParts.ts'

const firstDelay = 300
/** An issue at the word under the cursor waits this long: nobody is scolded in the middle of a word. */
const wordDelay = 1_200

/** Issues that may be shown now; those at the word the cursor stands in are held back while it is typed. */
export function withoutWordAtCursor(issues: readonly RuleIssue[], text: string, cursor: number): RuleIssue[] {
  const before = /[a-zA-Z0-9_."]*$/.exec(text.slice(0, cursor))?.[0].length ?? 0
  const from = cursor - before
  return issues.filter((issue) => issue.to < from || issue.from > cursor)
}

/** Puts a repair into the text; `shift` is how far the text has moved since it was checked. */
export function applySuggestion(view: EditorView, suggestion: RuleSuggestion, shift = 0): void {
  const from = suggestion.from + shift
  view.dispatch({
    changes: { from, to: suggestion.to + shift, insert: suggestion.insert },
    selection: { anchor: from + suggestion.insert.length },
    userEvent: 'input.repair',
    scrollIntoView: true,
  })
  view.focus()
}

function message(issue: RuleIssue): HTMLElement {
  const element = document.createElement('span')
  for (const { text, code } of codeParts(issue.message)) {
    const part = document.createElement(code ? 'code' : 'span')
    part.textContent = text
    element.append(part)
  }
  return element
}

export function diagnosticOf(issue: RuleIssue, length: number): Diagnostic {
  const from = Math.min(issue.from, length)
  const { suggestion } = issue
  return {
    from,
    to: Math.max(from, Math.min(issue.to, length)),
    severity: issue.severity,
    message: issue.message,
    renderMessage: () => message(issue),
    actions: suggestion && [
      {
        name: suggestion.label,
        apply: (view, movedFrom) => applySuggestion(view, suggestion, movedFrom - issue.from),
      },
    ],
  }
}

/** Underlines what a checker finds, where it is, after a pause: for texts of a line, which take no time to check. */
export const lintBy = (issuesOf: (text: string) => readonly RuleIssue[]) =>
  ViewPlugin.fromClass(
    class {
      private timers: ReturnType<typeof setTimeout>[] = []

      constructor(private readonly view: EditorView) {
        this.timers = [setTimeout(() => this.show(true), 0)]
      }

      update(update: ViewUpdate): void {
        if (!update.docChanged) return
        this.stop()
        this.timers = [
          setTimeout(() => this.show(false), firstDelay),
          setTimeout(() => this.show(true), wordDelay),
        ]
      }

      destroy(): void {
        this.stop()
      }

      private stop(): void {
        for (const timer of this.timers) clearTimeout(timer)
      }

      private show(all: boolean): void {
        const { state } = this.view
        const text = state.doc.toString()
        const issues = issuesOf(text)
        const shown = all ? issues : withoutWordAtCursor(issues, text, state.selection.main.head)
        this.view.dispatch(
          setDiagnostics(
            state,
            shown.map((issue) => diagnosticOf(issue, text.length)),
          ),
        )
      }
    },
  )
