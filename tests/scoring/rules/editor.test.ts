import { describe, expect, it } from 'vitest'
import { completions, hoverAt, referenceEntries } from '../../../scoring/rules/index.ts'

/** The labels offered where `|` stands. */
function offered(marked: string): string[] | null {
  const position = marked.indexOf('|')
  const text = marked.slice(0, position) + marked.slice(position + 1)
  return completions(text, position)?.options.map((option) => option.label) ?? null
}

describe('completions', () => {
  it('offers statements where one can start', () => {
    const statements = ['at', 'require', 'let', 'score', 'report', 'hit']
    expect(offered('|')).toEqual(statements)
    expect(offered('sc|')).toEqual(statements)
    expect(offered('score volume\n|')).toEqual(expect.arrayContaining([...statements, 'and', 'else']))
    expect(offered('at scale 2\n|')).toEqual(statements)
  })

  it('offers fields after the dot of a variable, and the parts of a group', () => {
    expect(offered('score min(d in divisors : d.|')).toEqual(
      expect.arrayContaining(['volume', 'k3', 'neighbours']),
    )
    expect(offered('score min(d in divisors : d.vo|lume)')).toContain('volume')
    expect(offered('score max(p in pairs : p.a.|')).toContain('c2')
    expect(offered('score count(t in triples : any(x in t.divisors : x.|')).toContain('rigid')
    expect(offered('score metric.|')).toEqual(['divisor', 'basis'])
    expect(offered('score metric.divisor.|')).toEqual(['top', 'bottom', 'spectrum'])
    expect(offered('score q.|')).toBeNull()
    expect(offered('score max(x in metric.divisor.spectrum : x.|')).toBeNull()
  })

  it('offers sets after `in`, those of the variables around first', () => {
    expect(offered('score count(d in |')).toEqual(
      expect.arrayContaining(['divisors', 'metric.divisor.spectrum']),
    )
    expect(offered('score count(d in divisors : any(e in |')?.[0]).toBe('d.neighbours')
  })

  it('offers variables and names that are in scope, and no others', () => {
    const inside = offered('let reach = 1\nscore min(d in divisors : |')
    expect(inside?.slice(0, 2)).toEqual(['d', 'reach'])
    expect(inside).toEqual(expect.arrayContaining(['volume', 'log10', 'count', 'kappa']))
    const after = offered('score min(d in divisors : 1) + |')
    expect(after).not.toContain('d')
    expect(offered('let reach = |')).not.toContain('reach')
  })

  it('offers places after `at`, nothing for new names and numbers, nothing in comments and labels', () => {
    expect(offered('at |')).toEqual(['scale', 'volume', 'smallest divisor'])
    expect(offered('let |')).toBeNull()
    expect(offered('score 12|')).toBeNull()
    expect(offered('score 1 # vol|')).toBeNull()
    expect(offered('require favourable label "vol|')).toBeNull()
    expect(offered('require favourable label "a" # b\nscore |')).toContain('volume')
  })

  it('replaces the whole word and puts the cursor between the brackets', () => {
    const text = 'score cou'
    const found = completions(text, text.length)
    expect(found).toMatchObject({ from: 6, to: 9 })
    const count = found?.options.find((option) => option.label === 'count')
    expect(count).toMatchObject({ insert: 'count(x in  : )', cursor: 11 })
  })

  it('chooses a variable that is free', () => {
    const found = completions('score max(x in divisors : ', 26)
    expect(found?.options.find((option) => option.label === 'sum')).toMatchObject({ insert: 'sum(y in  : )' })
  })
})

describe('hoverAt', () => {
  const over = (marked: string) => {
    const position = marked.indexOf('|')
    return hoverAt(marked.slice(0, position) + marked.slice(position + 1), position)
  }

  it('explains observables, whole dotted names at once', () => {
    expect(over('score metric.divi|sor.top')).toMatchObject({
      from: 6,
      to: 24,
      entry: { id: 'metric.divisor.top', observable: { unit: 'M_pl^2', stage: 'metric' } },
    })
  })

  it('explains fields, variables, names, functions, folds, words and signs', () => {
    expect(over('score min(d in divisors : d.vol|ume)')?.entry?.id).toBe('divisors.volume')
    expect(over('score min(d in divisors : |d.volume)')).toMatchObject({ title: 'd in divisors' })
    expect(over('score min(|d in divisors : d.volume)')).toMatchObject({ title: 'd in divisors' })
    expect(over('score count(t in triples : any(|x in t.divisors : x.k3))')).toMatchObject({
      title: 'x in divisors',
    })
    expect(over('let reach = log10(volume) # why\nscore re|ach')).toMatchObject({
      text: 'let reach = log10(volume)',
    })
    expect(over('score m|in(1, 2)')?.entry?.kind).toBe('function')
    expect(over('score m|in(d in divisors : 1)')?.entry?.kind).toBe('fold')
    expect(over('score quan|tile(0.5, d in divisors : 1)')?.entry?.kind).toBe('fold')
    expect(over('sc|ore 1')?.entry?.kind).toBe('statement')
    expect(over('score 1 el|se 2')?.entry?.kind).toBe('keyword')
    expect(over('score 2 |^ 3')?.entry?.kind).toBe('operator')
    expect(over('score count(d in divi|sors : true)')?.entry?.id).toBe('divisors')
    expect(over('score kap|pa(a, b, c)')?.entry?.kind).toBe('relation')
  })

  it('says nothing about what it does not know', () => {
    for (const text of ['score |qqq', 'score | 1', 'score 1|2', '# sc|ore', 'score q.vol|ume'])
      expect(over(text)).toBeNull()
  })
})

describe('referenceEntries', () => {
  it('have unique ids, a form and a description', () => {
    const entries = referenceEntries()
    expect(new Set(entries.map((entry) => entry.id)).size).toBe(entries.length)
    for (const entry of entries) expect(entry.form && entry.description.endsWith('.')).toBeTruthy()
  })
})
