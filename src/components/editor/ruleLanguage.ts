import { HighlightStyle, LanguageSupport, LRLanguage, syntaxHighlighting } from '@codemirror/language'
import { snippet, type Completion as EditorCompletion, type CompletionSource } from '@codemirror/autocomplete'
import { tags } from '@lezer/highlight'
import { completions, ruleHighlighting, ruleParser, type Completion } from '../../../scoring/index.ts'

const language = LRLanguage.define({
  name: 'rule',
  parser: ruleParser.configure({ props: [ruleHighlighting] }),
  languageData: { commentTokens: { line: '#' }, closeBrackets: { brackets: ['(', '"'] } },
})

const highlighting = HighlightStyle.define([
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
  const { label, kind, detail, info, insert, cursor } = option
  const text = insert ?? label
  const stop =
    cursor !== undefined && cursor < text.length
      ? snippet(`${text.slice(0, cursor)}#{}${text.slice(cursor)}`)
      : undefined
  return { label, type: icons[kind], detail, info, apply: stop ?? text }
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

const complete: CompletionSource = (context) => {
  const result = completions(context.state.doc.toString(), context.pos)
  if (!result) return null
  const typed = context.state.sliceDoc(result.from, context.pos)
  const afterDot = context.state.sliceDoc(result.from - 1, result.from) === '.'
  if (!context.explicit && typed === '' && !afterDot) return null
  const options = context.explicit && typed === '' ? result.options : fittingOptions(result.options, typed)
  return options.length > 0
    ? { from: result.from, options: options.map(editorCompletion), filter: false }
    : null
}

/** The scoring language for the editor: parser, colours, completion. */
export function ruleLanguage(): LanguageSupport {
  return new LanguageSupport(language, [
    syntaxHighlighting(highlighting),
    language.data.of({ autocomplete: complete }),
  ])
}
