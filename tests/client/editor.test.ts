// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { checkRule, completions } from '../../scoring/index.ts'
import { codeParts } from '../../src/components/editor/codeParts.ts'
import { fittingOptions } from '../../src/components/editor/ruleLanguage.ts'
import { diagnosticOf, withoutWordAtCursor } from '../../src/components/editor/ruleLint.ts'
import { findEntries, type ReferenceFilter } from '../../src/components/editor/ReferenceList.tsx'
import { RuleReports } from '../../src/components/editor/ruleReports.ts'
import { textDifference } from '../../src/routes/target/textDifference.ts'
import { lineDifferences } from '../../src/routes/target/lineDifferences.ts'

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

describe('text differences', () => {
  it('mark the words that changed, and lay lines beside those they became', () => {
    const [added, changed, removed] = textDifference(
      'score log10(volume) + 1\nhit h11 > 3',
      'let a = 1\nscore log10(volume) + 2',
    )
    expect(added).toEqual({ before: null, after: [{ text: 'let a = 1', changed: true }], same: false })
    expect(changed?.before).toEqual([
      { text: 'score log10(volume) + ', changed: false },
      { text: '1', changed: true },
    ])
    expect(changed?.after?.at(-1)).toEqual({ text: '2', changed: true })
    expect(removed).toEqual({ before: [{ text: 'hit h11 > 3', changed: true }], after: null, same: false })
  })

  it('keep both texts', () => {
    const line = fc.constantFrom('score a + b', 'score a - b', 'let a = 1', '', 'hit x')
    const text = fc.array(line, { maxLength: 6 }).map((lines) => lines.join('\n'))
    fc.assert(
      fc.property(text, text, (before, after) => {
        const rows = textDifference(before, after)
        const side = (of: 'before' | 'after') =>
          rows.flatMap((row) => row[of]?.map((piece) => piece.text).join('') ?? []).join('\n')
        expect([side('before'), side('after')]).toEqual([before, after])
      }),
      { numRuns: 60 },
    )
  })
})

describe('reports on rules', () => {
  it('skip what is outdated before its turn', async () => {
    const reports = new RuleReports(null)
    const told: string[] = []
    await new Promise<void>((resolve) => {
      for (const text of ['score 1', 'score 2', 'score 3'])
        reports.ask(text, (report) => {
          told.push(report.text)
          resolve()
        })
    })
    expect(told).toEqual(['score 3'])
  })
})

describe('the reference', () => {
  const ids = (filter: Partial<ReferenceFilter>) =>
    findEntries({ text: '', type: '', cost: '', ...filter }).map(({ id }) => id)

  it('is filtered by words, type and cost', () => {
    expect(ids({ text: 'rigid', type: 'truth value' })).toContain('divisors.rigid')
    expect(ids({ text: 'rigid', type: 'truth value' })).not.toContain('polytope.rigidDivisors')
    expect(ids({ cost: 'free' })).toContain('h11')
    expect(ids({ cost: 'free' })).not.toContain('metric.divisor.top')
    expect(ids({ type: 'set' })).toEqual(expect.arrayContaining(['divisors', 'divisors.neighbours']))
    expect(ids({}).length).toBeGreaterThan(ids({ cost: 'dear' }).length)
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
