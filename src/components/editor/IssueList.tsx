import { memo } from 'react'
import { type EditorView } from '@codemirror/view'
import { CircleAlert, TriangleAlert, Wrench } from 'lucide-react'
import { type RuleIssue } from '../../../scoring/index.ts'
import { Button } from '../ui/Button.tsx'
import { Message } from './Message.tsx'
import { applySuggestion } from './ruleLint.ts'

interface IssueListProps {
  issues: readonly RuleIssue[]
  view: EditorView | null
  /** The text has changed since: places and repairs are those of a text some keys ago. */
  outdated: boolean
}

/** What the checker says, in words and with its place; a repair that is known takes one click. */
export const IssueList = memo(function IssueList({ issues, view, outdated }: IssueListProps) {
  if (issues.length === 0) return null
  const goTo = (issue: RuleIssue) => {
    if (!view) return
    const end = view.state.doc.length
    view.dispatch({
      selection: { anchor: Math.min(issue.from, end), head: Math.min(issue.to, end) },
      scrollIntoView: true,
    })
    view.focus()
  }
  return (
    <ul aria-label="Messages about the rule" className="border-x border-b border-edge bg-sheet">
      {issues.map((issue, index) => {
        const { suggestion } = issue
        const error = issue.severity === 'error'
        const Shape = error ? CircleAlert : TriangleAlert
        return (
          <li
            key={index}
            className="flex flex-wrap items-start gap-x-2 gap-y-1 border-b px-2 py-1.5 last:border-b-0"
          >
            <Shape
              size={15}
              className={`mt-0.5 shrink-0 ${error ? 'text-rejected' : 'text-found'}`}
              aria-label={error ? 'Error' : 'Warning'}
            />
            <button
              type="button"
              onClick={() => goTo(issue)}
              className="shrink-0 font-mono text-xs leading-5 text-action hover:underline"
              aria-label={`Go to line ${issue.line}, column ${issue.column}`}
            >
              {issue.line}:{issue.column}
            </button>
            <span className="min-w-40 flex-1">
              <Message text={issue.message} />
            </span>
            {suggestion && (
              <Button
                kind="quiet"
                className="-my-1"
                unavailable={outdated && 'The rule has changed and is being checked.'}
                onClick={() => view && applySuggestion(view, suggestion)}
              >
                <Wrench size={13} aria-hidden />
                <Message text={suggestion.label} />
              </Button>
            )}
          </li>
        )
      })}
    </ul>
  )
})
