// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { checkRule, completions } from '../../scoring/index.ts'
import { codeParts } from '../../src/components/editor/codeParts.ts'
import { fittingOptions } from '../../src/components/editor/ruleLanguage.ts'
import { diagnosticOf, withoutWordAtCursor } from '../../src/components/editor/ruleLint.ts'
import { lineDifferences } from '../../src/routes/target/lineDifferences.ts'
import { essence } from '../../src/routes/target/usePreview.ts'

const misspelt = 'require favorable\nscore log10(metric.divisor.top)\n'

describe('messages in the editor', () => {
  it('underline the misspelt name and offer its repair', () => {
    const { issues } = checkRule(misspelt)
    const [issue] = issues
    expect(issue).toBeDefined()
    const diagnostic = diagnosticOf(issue!, misspelt.length)
    expect(misspelt.slice(diagnostic.from, diagnostic.to)).toBe('favorable')
    expect(diagnostic.severity).toBe('error')
    expect(issue!.suggestion?.insert).toBe('favourable')
    expect(diagnostic.actions).toHaveLength(1)
  })

  it('are held back at the word under the cursor, and only there', () => {
    const { issues } = checkRule(misspelt)
    const end = misspelt.indexOf('\n')
    expect(withoutWordAtCursor(issues, misspelt, end)).toEqual([])
    expect(withoutWordAtCursor(issues, misspelt, misspelt.length)).toEqual(issues)
  })

  it('set quoted pieces of rule in mono type', () => {
    expect(codeParts('did you mean `rigid`?')).toEqual([
      { text: 'did you mean ', code: false },
      { text: 'rigid', code: true },
      { text: '?', code: false },
    ])
  })
})

describe('what a preview depends on', () => {
  it('is not comments or blank lines', () => {
    expect(essence('# a\n\n score h11 # b\n')).toBe(essence('score h11'))
    expect(essence('require favourable label "a # b"')).toContain('# b')
    expect(essence('score h11')).not.toBe(essence('score h21'))
  })
})

describe('line differences', () => {
  it('lead from one text to the other', () => {
    const text = fc
      .array(fc.constantFrom('a', 'b', 'c', ''), { maxLength: 12 })
      .map((lines) => lines.join('\n'))
    fc.assert(
      fc.property(text, text, (before, after) => {
        const lines = lineDifferences(before, after)
        const without = (kind: string) => lines.filter((line) => line.kind !== kind).map((line) => line.text)
        expect(without('added').join('\n')).toBe(before)
        expect(without('removed').join('\n')).toBe(after)
      }),
    )
  })
})

describe('completion', () => {
  const offered = (text: string) => {
    const result = completions(text, text.length)
    return fittingOptions(result?.options ?? [], text.slice(result?.from ?? text.length)).map(
      ({ label }) => label,
    )
  }

  it('offers what begins with the word, or has a part that does', () => {
    expect(offered('require fav')).toEqual(['favourable'])
    expect(offered('score log10(metric.divisor.t')).toEqual(['top'])
  })

  it('offers nothing for a misspelt word or a finished one, so that Enter only breaks the line', () => {
    expect(offered('require favorable')).toEqual([])
    expect(offered('require favourable')).toEqual([])
  })
})
