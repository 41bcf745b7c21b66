import { HighlightStyle, LanguageSupport, LRLanguage, syntaxHighlighting } from '@codemirror/language'
import { snippet, type Completion as EditorCompletion, type CompletionSource } from '@codemirror/autocomplete'
import { type EditorView } from '@codemirror/view'
import { tags } from '@lezer/highlight'
import {
  completions,
  ruleHighlighting,
  ruleParser,
  type Completion,
  type OwnName,
} from '../../../scoring/index.ts'
import { namesIn } from './shownReport.ts'
import { worthOf } from './worth.ts'

/** The parser of the language with what each piece is coloured as. */
export const colouredParser = ruleParser.configure({ props: [ruleHighlighting] })

const language = LRLanguage.define({
  name: 'rule',
  parser: colouredParser,
  languageData: { commentTokens: { line: '#' }, closeBrackets: { brackets: ['(', '"'] } },
})

export const highlighting = HighlightStyle.define([
  { tag: tags.keyword, color: 'var(--action)', fontWeight: '600' },
  { tag: tags.operatorKeyword, color: 'var(--action)' },
  { tag: tags.function(tags.variableName), color: 'var(--rule-function)' },
  { tag: tags.definition(tags.variableName), color: 'var(--ink)', fontWeight: '600' },
  { tag: tags.local(tags.variableName), color: 'var(--ink)', fontStyle: 'italic' },
  { tag: tags.number, color: 'var(--rule-number)' },
  { tag: tags.bool, color: 'var(--rule-number)' },
  { tag: tags.string, color: 'var(--rule-string)' },
  { tag: tags.lineComment, color: 'var(--ink-soft)', fontStyle: 'italic' },
])

const icons: Record<Completion['kind'], string> = {
  observable: 'variable',
  set: 'type',
  field: 'property',
  relation: 'function',
  function: 'function',
  fold: 'function',
  statement: 'keyword',
  keyword: 'keyword',
  operator: 'keyword',
  name: 'constant',
  variable: 'constant',
  group: 'namespace',
}

/** A completion as the editor wants it; text with a place for the cursor becomes a snippet with one stop. */
export function editorCompletion(option: Completion): EditorCompletion {
  const { label, kind, info, insert, cursor } = option
  const text = insert ?? label
  const stop =
    cursor !== undefined && cursor < text.length
      ? snippet(`${text.slice(0, cursor)}#{}${text.slice(cursor)}`)
      : undefined
  return { label, type: icons[kind], detail: worthOf(option), info, apply: stop ?? text }
}

/**
 * Options one of whose dotted parts begins with what is typed. A word that is typed out in full brings up nothing,
 * so that Enter goes to the next line and never replaces what was written.
 */
export function fittingOptions(options: readonly Completion[], typed: string): readonly Completion[] {
  const start = typed.toLowerCase()
  const fitting = options.filter(({ label }) =>
    label
      .toLowerCase()
      .split(/[. ]/)
      .some((part, index, parts) => part.startsWith(start) || parts.slice(index).join('.').startsWith(start)),
  )
  return fitting.some(({ label }) => label === typed) ? [] : fitting
}

/**
 * Completion in a text that is a whole rule, or the end of one.
 * @param lead what stands before the text; with one, statements are not offered
 */
export function completionSource(
  lead = '',
  namesOf: (view: Pick<EditorView, 'state'>) => readonly OwnName[] = () => [],
): CompletionSource {
  return (context) => {
    const names = namesOf(context)
    const result = completions(lead + context.state.doc.toString(), lead.length + context.pos, names)
    if (!result) return null
    const from = result.from - lead.length
    const typed = context.state.sliceDoc(from, context.pos)
    const afterDot = from > 0 && context.state.sliceDoc(from - 1, from) === '.'
    if (!context.explicit && typed === '' && !afterDot) return null
    const offered =
      lead === ''
        ? result.options
        : result.options.filter(({ kind, label }) => kind !== 'statement' && label !== 'label')
    const options = context.explicit && typed === '' ? offered : fittingOptions(offered, typed)
    return options.length > 0 ? { from, options: options.map(editorCompletion), filter: false } : null
  }
}

/** The scoring language for the editor: parser, colours, completion. */
export function ruleLanguage(): LanguageSupport {
  return new LanguageSupport(language, [
    syntaxHighlighting(highlighting),
    language.data.of({ autocomplete: completionSource('', namesIn) }),
  ])
}
