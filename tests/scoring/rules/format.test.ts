import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { canonicalText, formatRule, parseRule } from '../../../scoring/rules/index.ts'
import { ruleTrees } from './ruleArbitrary.ts'

/** A tree without its positions. */
const bare = (tree: unknown): unknown =>
  JSON.parse(JSON.stringify(tree, (key, value: unknown) => (key === 'from' || key === 'to' ? 0 : value)))

function readBack(text: string) {
  const { rule, issues } = parseRule(text)
  expect(issues).toEqual([])
  if (!rule) throw new Error('a rule without issues has a tree')
  return rule
}

describe('formatRule', () => {
  it('gives a text that reads back as the same tree, comments and blank lines included', () => {
    fc.assert(
      fc.property(ruleTrees, (tree) => {
        expect(bare(readBack(formatRule(tree)))).toEqual(bare(tree))
      }),
      { numRuns: 200 },
    )
  })

  it('changes nothing the second time', () => {
    fc.assert(
      fc.property(ruleTrees, (tree) => {
        const once = formatRule(tree)
        expect(formatRule(readBack(once))).toBe(once)
      }),
      { numRuns: 200 },
    )
  })

  it('keeps comments and single blank lines, and lays the rest out by the book', () => {
    const text =
      '# head\n\n\nat   scale 2 # here\n\n# why\n#   indented\nscore  ( volume\n # inside\n +1 )\n#end'
    expect(formatRule(readBack(text))).toBe(
      '# head\nat scale 2  # here\n\n# why\n# indented\n# inside\nscore volume + 1\n# end\n',
    )
  })

  it('leaves comments and layout out of the canonical text', () => {
    expect(canonicalText(readBack('# a\nscore   volume#b\n\n\nhit true'))).toBe('score volume\nhit true\n')
  })

  it('gives an empty text for an empty rule', () => {
    expect(formatRule(readBack(' \n'))).toBe('')
  })
})
