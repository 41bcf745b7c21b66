import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { checkRule, nameAt, nameProblem } from '../../../scoring/rules/index.ts'

/** The text with the name at `|` called otherwise; null where no own name stands. */
function renamed(marked: string, next: string): string | null {
  const position = marked.indexOf('|')
  const text = marked.replace('|', '')
  const found = nameAt(text, position)
  if (!found) return null
  return [...found.spans]
    .reverse()
    .reduce((all, { from, to }) => all.slice(0, from) + next + all.slice(to), text)
}

describe('renaming', () => {
  it('changes a name where it is given and used, and neither fields, columns, labels nor comments', () => {
    const text = `let volum|e2 = volume # volume2
require volume2 > 1 label "volume2"
score min(d in divisors : d.volume * volume2)
report volume2 = h11, volume2`
    expect(renamed(text, 'size')).toBe(`let size = volume # volume2
require size > 1 label "volume2"
score min(d in divisors : d.volume * size)
report volume2 = h11, size`)
    expect(renamed('let a = 1\nscore a|', 'b')).toBe('let b = 1\nscore b')
  })

  it('changes the variable of one fold, and leaves others alone', () => {
    expect(renamed('score min(|d in divisors where d.k3 : d.volume) + max(d in divisors : d.c2)', 'x')).toBe(
      'score min(x in divisors where x.k3 : x.volume) + max(d in divisors : d.c2)',
    )
    expect(renamed('score sum(d in divisors : max(e in d.neighbours : kappa(d, |e, e)))', 'n')).toBe(
      'score sum(d in divisors : max(n in d.neighbours : kappa(d, n, n)))',
    )
    expect(renamed('score sum(d in divisors : max(e in d|.neighbours : kappa(d, e, e)))', 'n')).toBe(
      'score sum(n in divisors : max(e in n.neighbours : kappa(n, e, e)))',
    )
  })

  it('finds nothing at observables, fields and words, and works on halves', () => {
    for (const text of ['score vol|ume', 'score min(d in divisors : d.vol|ume)', 'sco|re 1', 'score 1 | '])
      expect(renamed(text, 'x')).toBeNull()
    expect(renamed('let a| = 1\nscore min(d in divisors : a +', 'b')).toBe(
      'let b = 1\nscore min(d in divisors : b +',
    )
  })

  it('refuses names that are none, or taken', () => {
    const text = 'let a = 1\nlet b = 2\nscore min(d in divisors : a + b)'
    expect(nameProblem(text, 'a', 'reach_1')).toBeNull()
    expect(nameProblem(text, 'a', 'a')).toBeNull()
    for (const next of ['1a', 'a b', '', 'score', 'volume', 'log10', 'metric', 'b', 'd', 'divisors'])
      expect({ next, problem: nameProblem(text, 'a', next) }).toEqual({ next, problem: expect.any(String) })
  })

  it('leaves every rule of the language cases as sound as it was, and can be taken back', () => {
    const swap = (from: string, to: string, all: string) =>
      [...(nameAt(all, all.indexOf(`let ${from}`) + 4)?.spans ?? [])]
        .reverse()
        .reduce((rest, span) => rest.slice(0, span.from) + to + rest.slice(span.to), all)
    let seen = 0
    for (const text of soundTexts()) {
      for (const [, name] of text.matchAll(/\blet (\w+)/g)) {
        seen += 1
        const other = swap(name, 'zz_other', text)
        expect({ other, ok: checkRule(other).ok }).toEqual({ other, ok: true })
        expect(swap('zz_other', name, other)).toBe(text)
      }
    }
    expect(seen).toBeGreaterThan(5)
  })
})

function soundTexts(): string[] {
  const folder = new URL('./cases/', import.meta.url)
  return readdirSync(folder)
    .flatMap(
      (name) =>
        (JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as { cases: { rule?: string }[] }).cases,
    )
    .flatMap(({ rule }) => (rule !== undefined && checkRule(rule).ok ? [rule] : []))
}
