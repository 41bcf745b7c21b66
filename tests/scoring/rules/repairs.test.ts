import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { checkRule, type RuleSuggestion } from '../../../scoring/rules/index.ts'

interface LanguageCase {
  readonly rule?: string
  readonly expr?: string
}

const folder = new URL('./cases/', import.meta.url)
const texts = readdirSync(folder)
  .sort()
  .flatMap(
    (name) => (JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as { cases: LanguageCase[] }).cases,
  )
  .map(({ rule, expr }) => rule ?? `score h11 + volume\nreport value = ${expr ?? ''}`)

const repaired = (text: string, { from, to, insert }: RuleSuggestion): string =>
  text.slice(0, from) + insert + text.slice(to)

/** Texts in which something stays wrong that no repair can know: `2x` becomes `2 * x`, and there is no x. */
const beyond = new Set(['score h11 + volume\nreport value = 2x'])

/** Follows repairs, the first that is offered each time. */
function mended(text: string): string {
  for (let step = 0; step < 8; step++) {
    const offer = checkRule(text).issues.find(({ suggestion }) => suggestion)
    if (!offer?.suggestion) return text
    text = repaired(text, offer.suggestion)
  }
  throw new Error(`repairs do not end: ${text}`)
}

describe('repairs', () => {
  const offering = texts.filter((text) => checkRule(text).issues.some(({ suggestion }) => suggestion))

  it('are offered for many of the mistakes in the language cases', () => {
    expect(offering.length).toBeGreaterThan(90)
  })

  it('each mend what they are offered for, and lead to a rule that checks', () => {
    for (const text of offering) {
      for (const issue of checkRule(text).issues) {
        if (!issue.suggestion) continue
        const after = repaired(text, issue.suggestion)
        const same = checkRule(after).issues.filter(
          ({ code, from, message }) =>
            code === issue.code && from === issue.from && message === issue.message,
        )
        expect({ text, after, same }).toEqual({ text, after, same: [] })
      }
      if (!beyond.has(text)) expect({ text, ok: checkRule(mended(text)).ok }).toEqual({ text, ok: true })
    }
  })

  it('write what is meant', () => {
    const meant: [text: string, after: string][] = [
      ['score metric.divisor', 'score metric.divisor.top'],
      ['score count(d in divisors', 'score count(d in divisors'],
      ['score log10(volume', 'score log10(volume)'],
      ['score (h11 + (h21', 'score (h11 + (h21))'],
      ['score h11)', 'score h11'],
      ['require volume\nscore h11', 'require volume > 0\nscore h11'],
      ['require favourable == 1\nscore volume', 'require favourable\nscore volume'],
      ['require favourable == 0\nscore volume', 'require not favourable\nscore volume'],
      ['require favourable "fine"\nscore volume', 'require favourable label "fine"\nscore volume'],
      ['require favourable label "fine\nscore volume', 'require favourable label "fine"\nscore volume'],
      ['score reach\nlet reach = volume\n', 'let reach = volume\nscore reach\n'],
      ['let a = 1\nscore volume', 'score volume'],
      ['score volume\nscore h11', 'score volume'],
      ['score divisors', 'score count(x in divisors : true)'],
      ['score metric.basis.top', 'score metric.divisor.top'],
      ['score quantile(95, d in divisors : d.volume)', 'score quantile(0.95, d in divisors : d.volume)'],
    ]
    for (const [text, after] of meant) expect(mended(text).trimStart()).toBe(after)
  })
})
