import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { checkRule, evaluateRule, referenceEntries } from '../../../scoring/rules/index.ts'
import { inventedCandidate } from './inventedCandidate.ts'

/**
 * Language cases as data: one file per operator or construct in cases/. A case gives a whole `rule`, or an
 * expression `expr` that is put into a report column; positions of issues count from the start of what is given.
 */
interface LanguageCase {
  readonly rule?: string
  readonly expr?: string
  readonly type?: string
  readonly value?: number | boolean
  readonly undefined?: string
  readonly outcome?: object
  readonly canonical?: string
  readonly errors?: readonly ExpectedIssue[]
  readonly warnings?: readonly ExpectedIssue[]
}

interface ExpectedIssue {
  readonly code: string
  readonly from: number
  readonly to: number
  readonly message: string
  readonly insert?: string
}

interface CaseFile {
  readonly about: string
  /** Entries of the reference that the file is about. */
  readonly covers: readonly string[]
  readonly cases: readonly LanguageCase[]
}

const folder = new URL('./cases/', import.meta.url)
const files = readdirSync(folder)
  .sort()
  .map((name) => ({ name, file: JSON.parse(readFileSync(new URL(name, folder), 'utf8')) as CaseFile }))

const PREFIX = 'score h11 + volume\nreport value = '

function expectIssues(given: readonly ExpectedIssue[], found: readonly object[], shift: number): void {
  expect(found).toMatchObject(
    given.map(({ code, from, to, message, insert }) => ({
      code,
      from: from + shift,
      to: to + shift,
      message: expect.stringContaining(message),
      ...(insert === undefined ? {} : { suggestion: { insert } }),
    })),
  )
  expect(found).toHaveLength(given.length)
}

/** The same outcome with its numbers compared to ten digits after the point. */
const nearly = (outcome: object): object =>
  Object.fromEntries(
    Object.entries(outcome).map(([key, value]) => [
      key,
      typeof value === 'number' ? expect.closeTo(value, 10) : value,
    ]),
  )

for (const { name, file } of files) {
  describe(`${name}: ${file.about}`, () => {
    for (const each of file.cases) {
      it(each.rule ?? each.expr ?? '', () => {
        const text = each.rule ?? PREFIX + (each.expr ?? '')
        const shift = each.rule === undefined ? PREFIX.length : 0
        const checked = checkRule(text)
        const errors = checked.issues.filter((issue) => issue.severity === 'error')
        expectIssues(each.errors ?? [], errors, shift)
        expect(checked.ok).toBe(each.errors === undefined)
        if (each.warnings)
          expectIssues(
            each.warnings,
            checked.issues.filter((issue) => issue.severity === 'warning'),
            shift,
          )
        if (!checked.ok) return
        if (each.canonical !== undefined) expect(checked.rule.canonical).toBe(each.canonical)
        const outcome = evaluateRule(checked.rule, inventedCandidate())
        if (each.type !== undefined) expect(checked.rule.report[0].type).toBe(each.type)
        if (each.outcome !== undefined) expect(outcome).toMatchObject(nearly(each.outcome))
        if (outcome.kind !== 'feasible') {
          expect(each.outcome).toBeDefined()
          return
        }
        const cell = outcome.report.value
        if (typeof each.value === 'number') expect(cell.value).toBeCloseTo(each.value, 10)
        else if (each.value !== undefined) expect(cell.value).toBe(each.value)
        if (each.undefined !== undefined)
          expect(cell).toMatchObject({ value: null, reason: expect.stringContaining(each.undefined) })
      })
    }
  })
}

describe('the language cases as a whole', () => {
  it('cover every word, operator, function, fold, observable and field of the reference', () => {
    const covered = new Set(files.flatMap(({ file }) => file.covers))
    const missing = referenceEntries().filter((entry) => !covered.has(entry.id))
    expect(missing.map((entry) => entry.id)).toEqual([])
  })

  it('claim nothing that is not in the reference', () => {
    const known = new Set(referenceEntries().map((entry) => entry.id))
    expect(files.flatMap(({ file }) => file.covers).filter((id) => !known.has(id))).toEqual([])
  })

  it('use what they claim to cover', () => {
    for (const { name, file } of files)
      for (const id of file.covers) {
        const word = id
          .replace(/\((in)?\)$/, '')
          .split('.')
          .pop() as string
        const used = file.cases.some((each) => (each.rule ?? each.expr ?? '').includes(word))
        expect({ name, id, used }).toEqual({ name, id, used: true })
      }
  })
})
