import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { placeCandidate } from '../../../scoring/reading/placeCandidate.ts'
import { readCandidates } from '../../../scoring/reading/readCandidates.ts'
import { readWeightLines } from '../../../scoring/reading/weightLines.ts'

interface Expected {
  /** Candidates that are read all the same. */
  good: number
  problems: { line: number; entry: string; code: string; message: string }[]
  ambiguous?: { line: number; what: string }[]
}

const folder = new URL('./bad/', import.meta.url)
const files = readdirSync(folder).sort()
const expected = JSON.parse(readFileSync(new URL('./bad.json', import.meta.url), 'utf8')) as Record<
  string,
  Expected
>

/** One file for each kind of failure; what it must be answered with stands in bad.json. */
describe('an import that is wrong', () => {
  it('has an answer for every file', () => {
    expect(Object.keys(expected).sort()).toEqual(files)
  })

  it.each(files)('%s says what is wrong, and where', (file) => {
    const { candidates, problems, ambiguous } = readCandidates(readFileSync(new URL(file, folder), 'utf8'))
    const placed = candidates.map((given) => placeCandidate(given))
    const found: Expected = {
      good: placed.filter((one) => one.placed).length,
      ...(ambiguous.length > 0 && { ambiguous: [...ambiguous] }),
      problems: [...problems, ...placed.flatMap(({ problem }) => (problem ? [problem] : []))],
    }
    expect(found).toEqual(expected[file])
  })

  it('has a file for every code that the reading itself gives', () => {
    const source = new URL('../../../scoring/reading/', import.meta.url)
    const codes = new Set<string>()
    for (const name of readdirSync(source)) {
      const text = readFileSync(new URL(name, source), 'utf8')
      for (const [, code] of text.matchAll(
        /'((?:blocks|candidate|csv|heights|input|json|points|polytope)\.[a-z-]+)'/g,
      ))
        codes.add(code)
    }
    const met = new Set(Object.values(expected).flatMap(({ problems }) => problems.map(({ code }) => code)))
    expect(codes.size).toBeGreaterThan(25)
    expect([...codes].filter((code) => !met.has(code))).toEqual([])
  })

  it('is told from others by its message: no two kinds share one', () => {
    const byMessage = new Map<string, string>()
    for (const { problems } of Object.values(expected)) {
      for (const { code, message } of problems) {
        expect(byMessage.get(message) ?? code).toBe(code)
        byMessage.set(message, code)
      }
    }
  })
})

describe('a list of weight systems', () => {
  it('is read line by line; each wrong one is named', () => {
    const { systems, problems } = readWeightLines(
      '1 1 1 1 1\n# a comment\n\n[1,1,2,2,2]; # octic\n1 1 0 2 2\n1,1,1,1\n1 1 a 1 1\n1 1 1 1 1 1\n1.5 1 1 1 1',
    )
    expect(systems).toEqual([
      { line: 1, weights: [1, 1, 1, 1, 1], name: null },
      { line: 4, weights: [1, 1, 2, 2, 2], name: 'octic' },
    ])
    expect(problems.map(({ line, code, message }) => [line, code, message])).toEqual([
      [5, 'weights.not-positive-integers', 'Entry 3, "0", is no positive integer.'],
      [6, 'weights.wrong-count', 'This line has 4 weights; a weight system has five.'],
      [7, 'weights.not-positive-integers', 'Entry 3, "a", is no positive integer.'],
      [8, 'weights.wrong-count', 'This line has 6 weights; a weight system has five.'],
      [9, 'weights.not-positive-integers', 'Entry 1, "1.5", is no positive integer.'],
    ])
  })
})
