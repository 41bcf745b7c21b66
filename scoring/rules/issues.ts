/** A change to the text that would mend an issue: put `insert` in place of the characters `from .. to`. */
export interface RuleSuggestion {
  readonly label: string
  readonly from: number
  readonly to: number
  readonly insert: string
}

/**
 * Something wrong or doubtful in the text of a rule, located. `from`, `to` are offsets into the text (the end
 * is exclusive), `line` and `column` those of `from`, counted from 1. `code` is stable and public.
 */
export interface RuleIssue {
  readonly code: string
  readonly message: string
  readonly from: number
  readonly to: number
  readonly line: number
  readonly column: number
  readonly expected?: string
  readonly found?: string
  readonly suggestion?: RuleSuggestion
  readonly severity: 'error' | 'warning'
}

/** An issue before its line and column are worked out. */
export type IssueDraft = Omit<RuleIssue, 'line' | 'column' | 'severity'> & {
  readonly severity?: RuleIssue['severity']
}

/** The repair of a draft: write `insert` where `span` is. Nothing when no repair is known. */
export const writing = (
  { from, to }: { readonly from: number; readonly to: number },
  insert: string | undefined,
): Pick<IssueDraft, 'suggestion'> =>
  insert === undefined
    ? {}
    : {
        suggestion: {
          label: insert === '' ? 'leave it out' : `write ${shortened(insert)}`,
          from,
          to,
          insert,
        },
      }

const shortened = (text: string): string => (text.length > 48 ? `${text.slice(0, 47)}…` : text)

/** Line and column (both from 1) of offsets into one text. */
export class TextPositions {
  private readonly lineStarts: number[] = [0]

  constructor(text: string) {
    for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) this.lineStarts.push(at + 1)
  }

  locate(offset: number): { line: number; column: number } {
    let low = 0
    let high = this.lineStarts.length - 1
    while (low < high) {
      const middle = (low + high + 1) >> 1
      if (this.lineStarts[middle] <= offset) low = middle
      else high = middle - 1
    }
    return { line: low + 1, column: offset - this.lineStarts[low] + 1 }
  }
}

/** Locates drafts, orders them by position and drops what is beyond `limit`. */
export function locateIssues(text: string, drafts: readonly IssueDraft[], limit: number): RuleIssue[] {
  const positions = new TextPositions(text)
  return drafts
    .map((draft): RuleIssue => ({ severity: 'error', ...draft, ...positions.locate(draft.from) }))
    .sort((a, b) => a.from - b.from || a.to - b.to)
    .slice(0, limit)
}
