import { readdirSync, readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { placeCandidate } from '../../../scoring/reading/placeCandidate.ts'
import { readCandidates } from '../../../scoring/reading/readCandidates.ts'

const folder = new URL('./bad/', import.meta.url)
const texts = readdirSync(folder).map((file) => readFileSync(new URL(file, folder), 'utf8'))
const scraps = [
  '',
  ' ',
  '\n',
  '-',
  ',',
  '[',
  ']',
  '{',
  '"',
  '1e400',
  '9'.repeat(20),
  '0',
  'heights\n',
  '\u2212',
  ';',
]

/** One of the files with a few slips in it. */
const damaged = fc
  .tuple(
    fc.constantFrom(...texts),
    fc.array(fc.tuple(fc.nat(), fc.nat(6), fc.constantFrom(...scraps)), { minLength: 1, maxLength: 3 }),
  )
  .map(([text, slips]) =>
    slips.reduce((before, [at, length, scrap]) => {
      const from = at % (before.length + 1)
      return before.slice(0, from) + scrap + before.slice(from + length)
    }, text),
  )

describe('a text with slips', () => {
  it('is answered with problems that have a place, a code and a message, never with a failure', () => {
    let problemsMet = 0
    fc.assert(
      fc.property(damaged, (text) => {
        const lines = text.split(/\r\n|\n|\r/).length
        const { candidates, problems } = readCandidates(text)
        const placed = candidates.map((given) => placeCandidate(given))
        for (const problem of [...problems, ...placed.flatMap((one) => one.problem ?? [])]) {
          problemsMet++
          expect(problem.line).toBeGreaterThanOrEqual(1)
          expect(problem.line).toBeLessThanOrEqual(lines)
          expect(problem.code).toMatch(/^[a-z]+\.[a-z-]+$/)
          expect(problem.message).toMatch(/^["A-Z0-9a-z].*[.)]$/s)
        }
      }),
      { numRuns: 400 },
    )
    expect(problemsMet).toBeGreaterThan(200)
  })
})
