import type { Tree } from '@lezer/common'
import type { Span, StatementKind } from './ast.ts'
import { parser } from './generated/parser.ts'
import { type IssueDraft, writing } from './issues.ts'
import { nearestName } from './nearest.ts'
import type { Segment, Token } from './segments.ts'
import { isReserved, opensStatement, STATEMENT_KEYWORDS } from './words.ts'

/** The first place where the parser could not go on, or undefined when the text parses. */
function firstError(tree: Tree): Span | undefined {
  let found: Span | undefined
  tree.iterate({
    enter(node) {
      if (node.type.isError && (found === undefined || node.from < found.from))
        found = { from: node.from, to: node.to }
    },
  })
  return found
}

/** Could `sample` stand right after `prefix`? Asked of the parser itself, so that the grammar stays in one place. */
function accepts(prefix: string, sample: string): boolean {
  const text = `${prefix} ${sample}`
  const error = firstError(parser.parse(text))
  return error === undefined || error.from >= text.length
}

const SIGNS = [':', 'where', ')', ',', '=', 'in', 'label', '"text"']

/** What the grammar allows after `prefix`, in words. */
function expectedAfter(prefix: string, keyword: StatementKind, previous: Token | undefined): string[] {
  if (accepts(prefix, '1')) return [keyword === 'at' ? 'a number' : 'an expression']
  if (accepts(prefix, 'x'))
    return [previous?.text === 'in' ? 'a set' : previous?.text === '.' ? 'a field' : 'a name']
  const allowed = SIGNS.filter((sign) => accepts(prefix, sign)).map((sign) => `\`${sign}\``)
  if (accepts(prefix, '+')) allowed.push('an operator')
  if (firstError(parser.parse(prefix)) === undefined) allowed.push('the end of the statement')
  return allowed
}

const list = (words: readonly string[]): string =>
  words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words[words.length - 1]}`

/** Signs people bring from elsewhere, with what stands for them here. */
const FOREIGN: Record<string, { readonly insert: string; readonly why: string }> = {
  '&': { insert: 'and', why: '`and` joins conditions' },
  '|': { insert: 'or', why: '`or` joins conditions' },
  '!': { insert: 'not ', why: '`not` negates a condition' },
  '≤': { insert: '<=', why: '"at most" is written `<=`' },
  '≥': { insert: '>=', why: '"at least" is written `>=`' },
  '≠': { insert: '!=', why: '"not equal" is written `!=`' },
  '×': { insert: '*', why: 'a product is written `*`' },
  '·': { insert: '*', why: 'a product is written `*`' },
  '−': { insert: '-', why: 'a minus is written `-`' },
  '–': { insert: '-', why: 'a minus is written `-`' },
  '[': { insert: '(', why: 'only round brackets group' },
  ']': { insert: ')', why: 'only round brackets group' },
  '{': { insert: '(', why: 'only round brackets group' },
  '}': { insert: ')', why: 'only round brackets group' },
  ';': { insert: '', why: 'statements need no sign at their end' },
}

/** Brackets that are open after `tokens`. */
const openBrackets = (tokens: readonly Token[]): number =>
  tokens.reduce(
    (open, { text }) => (text === '(' ? open + 1 : text === ')' ? Math.max(0, open - 1) : open),
    0,
  )

/** What is missing when it is closing brackets and nothing else. */
function closingBrackets(statement: string, tokens: readonly Token[]): string | undefined {
  const missing = ')'.repeat(openBrackets(tokens))
  return missing !== '' && firstError(parser.parse(statement + missing)) === undefined ? missing : undefined
}

interface Remedy {
  readonly why: string
  readonly from: number
  readonly to: number
  readonly insert: string
}

/** The likely repair for a token that cannot stand where it does. */
function remedyFor(
  bad: Token,
  before: Token | undefined,
  after: Token | undefined,
  text: string,
  {
    operatorFits,
    labelFits,
    bracketOpen,
  }: Readonly<Record<'operatorFits' | 'labelFits' | 'bracketOpen', boolean>>,
): Remedy | undefined {
  const whole = (why: string, insert: string, from = bad.from, to = bad.to): Remedy => ({
    why,
    from,
    to,
    insert,
  })
  const touches = (a: Token | undefined, b: Token | undefined) =>
    a !== undefined && b !== undefined && a.to === b.from
  if (bad.text === '=' && (after?.text === '>' || after?.text === '<') && touches(bad, after))
    return whole('the equals sign comes second', `${after.text}=`, bad.from, after.to)
  if (bad.text === '=' && operatorFits)
    return whole('`=` stands only in `let` and `report`; equality is written `==`', '==')
  if (bad.text === '>' && before?.text === '<' && touches(before, bad))
    return whole('"not equal" is written `!=`', '!=', before.from, bad.to)
  if (bad.text === '*' && before?.text === '*' && touches(before, bad))
    return whole('a power is written `^`', '^', before.from, bad.to)
  if (bad.text === '.' && after?.kind === 'number' && touches(bad, after))
    return whole('a number starts with a digit', '0.')
  if (bad.text === '.' && before?.kind === 'number') return whole('a number does not end in a point', '')
  if ((bad.text === '&' || bad.text === '|') && after?.text === bad.text && touches(bad, after))
    return whole(FOREIGN[bad.text].why, FOREIGN[bad.text].insert, bad.from, after.to)
  if (bad.kind === 'string' && labelFits)
    return whole('a label stands after the word `label`', `label ${bad.text}`)
  if (bad.text === ')' && !bracketOpen) return whole('no bracket is open here', '')
  if (bad.text === '"') {
    const lineEnd = text.indexOf('\n', bad.from)
    const line = text.slice(bad.from, lineEnd < 0 ? text.length : lineEnd).trimEnd()
    return whole('a text ends with `"`', `${line}"`, bad.from, bad.from + line.length)
  }
  const foreign = Object.hasOwn(FOREIGN, bad.text) ? FOREIGN[bad.text] : undefined
  if (foreign) return whole(foreign.why, foreign.insert)
  const firstOnLine = text.slice(text.lastIndexOf('\n', bad.from - 1) + 1, bad.from).trim() === ''
  if (bad.kind === 'word' && firstOnLine) {
    const keyword = nearestName(
      bad.text,
      STATEMENT_KEYWORDS.map((entry) => entry.word),
    )
    if (keyword) return whole(`did you mean \`${keyword}\`?`, keyword)
  }
  if (before?.kind === 'number' && (bad.kind === 'word' || bad.text === '('))
    return whole('a product needs its sign', ' * ', before.to, bad.from)
  return undefined
}

const shown = (text: string): string => `\`${text.length > 30 ? `${text.slice(0, 30)}…` : text}\``

function messageFor(
  bad: Token,
  before: Token | undefined,
  expected: readonly string[],
  remedy: Remedy | undefined,
): string {
  if (bad.text === '"') return 'this text has no closing `"` on its line'
  if (isReserved(bad.text) && expected.length === 1 && expected[0] === 'a name')
    return `${shown(bad.text)} is a word of the language and cannot be a name`
  if (bad.text === '?' || before?.text === 'if')
    return `expected ${list(expected)}, found ${shown(bad.text)}; there is no "if": weigh a term with \`indicator(condition)\``
  if (remedy) return `${shown(bad.text)} cannot stand here: ${remedy.why}`
  return `expected ${list(expected)}, found ${shown(bad.text)}`
}

/** What is wrong with a segment; without an issue when enough have been reported. */
export interface SyntaxFinding {
  readonly issue?: IssueDraft
  /** The error is that the next statement's word stands in the middle of this one. */
  readonly spoilsNext: boolean
}

/**
 * Explains why a segment, with its syntax tree, does not parse: the first token that cannot stand where it does, what could have
 * stood there, and the likely repair (no words when `worded` is false). Undefined when the segment parses.
 */
export function explainSyntaxError(
  text: string,
  segment: Segment,
  tree: Tree,
  next: Segment | undefined,
  worded: boolean,
): SyntaxFinding | undefined {
  const { keyword, tokens } = segment
  if (keyword === undefined) return undefined
  const error = firstError(tree)
  if (error === undefined) return undefined
  if (!worded) return { spoilsNext: false }

  const index = tokens.findIndex((token) => token.to > segment.from + error.from)
  const bad = index < 0 ? undefined : tokens[index]
  const before = index < 0 ? tokens[tokens.length - 1] : tokens[index - 1]
  const prefix = text.slice(segment.from, bad ? bad.from : segment.to)
  const expected = expectedAfter(prefix, keyword, before)

  if (bad) {
    const remedy = remedyFor(bad, before, tokens[index + 1], text, {
      operatorFits: expected.includes('an operator'),
      labelFits: expected.includes('`label`'),
      bracketOpen: openBrackets(tokens.slice(0, index)) > 0,
    })
    const issue: IssueDraft = {
      code: bad.text === '"' ? 'open-text' : 'syntax',
      message: messageFor(bad, before, expected, remedy),
      from: bad.from,
      to: bad.to,
      expected: list(expected),
      found: bad.text,
      suggestion: remedy && {
        label: remedy.insert.trim() === '' ? 'leave it out' : `write ${remedy.insert.trim()}`,
        from: remedy.from,
        to: remedy.to,
        insert: remedy.insert,
      },
    }
    return { issue, spoilsNext: false }
  }

  const nextWord = next?.tokens[0]
  const sameLine = nextWord !== undefined && !text.slice(segment.to, nextWord.from).includes('\n')
  if (nextWord && sameLine && opensStatement(nextWord.text)) {
    const message = `${shown(nextWord.text)} is a word of the language and cannot stand here; expected ${list(expected)}`
    return {
      issue: {
        code: 'reserved',
        message,
        from: nextWord.from,
        to: nextWord.to,
        expected: list(expected),
        found: nextWord.text,
      },
      spoilsNext: true,
    }
  }
  const last = before ?? { from: segment.from, to: segment.to, text: keyword }
  const message = `expected ${list(expected)} after ${shown(last.text)}, found the end of the \`${keyword}\` statement`
  return {
    issue: {
      code: 'unfinished',
      message,
      from: last.from,
      to: last.to,
      expected: list(expected),
      found: 'end of statement',
      ...writing({ from: last.to, to: last.to }, closingBrackets(prefix, tokens)),
    },
    spoilsNext: false,
  }
}
