import { styleTags, tags } from '@lezer/highlight'

/**
 * Highlighting tags for the rule parser, kept apart from it so that server and workers need not load them:
 * `parser.configure({ props: [ruleHighlighting] })`.
 */
export const ruleHighlighting = styleTags({
  'at require let score report hit label': tags.keyword,
  'in where and or not else': tags.operatorKeyword,
  'true false': tags.bool,
  Number: tags.number,
  String: tags.string,
  Comment: tags.lineComment,
  'FunctionName/Name': tags.function(tags.variableName),
  'Definition/Name ColumnName/Name': tags.definition(tags.variableName),
  'Variable/Name': tags.local(tags.variableName),
  'Path/Name': tags.variableName,
  'At/Name': tags.keyword,
  CompareOperator: tags.compareOperator,
  'PlusOperator/... TimesOperator/... "^" "-"': tags.arithmeticOperator,
  '"="': tags.definitionOperator,
  '( )': tags.paren,
  ', ":" "."': tags.punctuation,
})
