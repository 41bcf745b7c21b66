import { describe, expect, it } from 'vitest'
import { checkRule, completions, evaluateRule, hoverAt, reportOnRule } from '../../../scoring/rules/index.ts'
import { inventedCandidate } from './inventedCandidate.ts'

const text = `# own names
at volume 1000
let reach = log10(metric.divisor.top)   # of the spectrum
let twice = 2 * volume
let rigid = count(d in divisors : d.rigid)
let odd   = volume * min(d in divisors : d.volume)
let calm  = favourable and twice > 1
score reach + rigid
report twice, odd, calm`

describe('the report on a rule', () => {
  it('says type, unit, stage and cost of own names', () => {
    const known = Object.fromEntries(reportOnRule(text).names.map((name) => [name.name, name]))
    const volume = completions('score vol', 9)?.options.find(({ label }) => label === 'volume')
    expect(known.reach).toMatchObject({ type: 'a number', unit: '1', stage: 'metric', cost: 'moderate' })
    expect(known.twice).toMatchObject({ type: 'a number', unit: volume?.unit, definition: '2 * volume' })
    expect(known.rigid).toMatchObject({ type: 'an integer', unit: '1' })
    expect(known.odd.unit).toBeNull()
    expect(known.calm).toMatchObject({ type: 'a truth value', unit: null })
    expect(text.slice(known.calm.from, known.calm.to)).toBe('calm')
  })

  it('knows what it can of a text with errors', () => {
    const report = reportOnRule('let a = h11\nlet b = nonsense\nscore a +')
    expect(report.sound).toBeNull()
    expect(report.names.map(({ name, type }) => [name, type])).toEqual([
      ['a', 'an integer'],
      ['b', null],
    ])
  })

  it('feeds completion and hover', () => {
    const { names } = reportOnRule(text)
    const half = `${text}\nhit rea`
    const offer = completions(half, half.length, names)?.options.find(({ label }) => label === 'reach')
    expect(offer).toMatchObject({ detail: 'a number', unit: '1', cost: 'moderate' })
    expect(hoverAt(text, text.indexOf('reach + rigid'), names)?.own).toMatchObject({ name: 'reach' })
    expect(hoverAt(text, text.indexOf('reach ='), names)?.own).toMatchObject({ name: 'reach' })
  })

  it('is the same rule for other comments and another layout, and nothing that depends on them', () => {
    const other = text.replace(/ *#.*/g, '').replace(/ +/g, ' ').replaceAll('\n', '\n\n')
    expect(reportOnRule(other).sound?.canonical).toBe(reportOnRule(text).sound?.canonical)
    expect(reportOnRule(text.replace('reach + rigid', 'reach - rigid')).sound?.canonical).not.toBe(
      reportOnRule(text).sound?.canonical,
    )
  })

  it('finds the places that reasons name in the canonical text again in the text as written', () => {
    const written = '# a comment\n\nscore   h11  /\n   ( h11 - h11 )'
    const { sound } = reportOnRule(written)
    const canonical = checkRule(sound?.canonical ?? '')
    const direct = checkRule(written)
    if (!canonical.ok || !direct.ok || !sound) throw new Error('the rule does not check')
    const reasonOf = (rule: typeof direct.rule) => {
      const outcome = evaluateRule(rule, inventedCandidate())
      return /line (\d+), column (\d+)/.exec(outcome.kind === 'undefined' ? outcome.reason : '')
    }
    const [there, here] = [reasonOf(canonical.rule), reasonOf(direct.rule)]
    expect(there?.[0]).not.toBe(here?.[0])
    expect(sound.places[`${there?.[1]}:${there?.[2]}`]).toBe(`${here?.[1]}:${here?.[2]}`)
  })
})
