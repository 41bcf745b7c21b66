import { describe, expect, it } from 'vitest'
import { canonicalClass } from '../../../scoring/geometry/classKey.ts'
import { fineClass } from '../../../scoring/geometry/twoFaceClass.ts'
import { drawCandidates, type DrawnCandidate } from '../../../scoring/search/drawnCandidates.ts'
import { heightsOfCode } from '../../../scoring/search/heightsCode.ts'
import { nullSample } from '../../../scoring/search/nullSample.ts'
import type { SearchState } from '../../../scoring/search/state.ts'
import { problemOf } from './problems.ts'

const { polytopes, rule } = problemOf(['r4-0100', 'r5-0200', 'w10-64-fan-1-2-4-5-5'], 'score h11', 'random', {
  budget: 1,
})

/** Draws pieces of these sizes, the state through JSON in between. */
function inPieces(sizes: readonly number[]) {
  const rows: DrawnCandidate[] = []
  let state: SearchState | null = null
  let ended = false
  for (const size of sizes) {
    const piece = drawCandidates(polytopes, 7, state, size)
    state = JSON.parse(JSON.stringify(piece.state)) as SearchState
    rows.push(...piece.rows)
    ended = piece.ended
  }
  return { rows, ended }
}

describe('candidates drawn before there is a rule', () => {
  it('are those of the null sample of the same scope and seed, in its order, however they are drawn', () => {
    const { rows } = inPieces([1, 5, 20, 20, 20])
    const { state } = nullSample({ polytopes, rule }, 7, 20)
    expect(rows.slice(0, 20).map(({ candidateKey }) => candidateKey)).toEqual(
      state.sample.rows.map(({ classKey }) => classKey),
    )
    expect(inPieces([66, 66]).rows.slice(0, rows.length)).toEqual(rows)
  })

  it('have heights that give them', () => {
    for (const { candidateKey, polytopeKey, heights } of inPieces([20]).rows) {
      const form = polytopes.at(polytopes.keys.indexOf(polytopeKey))
      const cls = fineClass(form.polytope, heightsOfCode(heights))
      expect(cls && canonicalClass(form, cls)).toMatchObject({ key: candidateKey, class: cls })
    }
  })

  it('end when nothing new turns up', () => {
    const { rows, ended } = inPieces(new Array<number>(40).fill(400))
    expect(ended).toBe(true)
    expect(new Set(rows.map(({ candidateKey }) => candidateKey)).size).toBe(rows.length)
    expect(rows.length).toBeLessThan(2_000)
  })
})
