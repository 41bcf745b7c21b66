import { describe, expect, it } from 'vitest'
import {
  canonicalClass,
  classFromHeights,
  normalForm,
  polytopeFromWeights,
  quadraticHeights,
} from '../../scoring/index.ts'
import { candidateGeometry } from '../../server/jobs/compute/candidateGeometry.ts'
import { candidateGeometrySchema } from '../../shared/candidates.ts'
import { fibreInWords, raysInWords } from '../../src/routes/candidate/FibrationSection.tsx'

/** The dossier's fibrations of a polytope that has one class. */
function fibrationsOf(weights: number[]) {
  const form = normalForm(polytopeFromWeights(weights, 'fan'))
  const { polytope } = form
  const heights = [...quadraticHeights(polytope, { seed: 0, noise: 0.4 })]
  const outcome = classFromHeights(polytope, heights)
  if (!outcome.fine) throw new Error('quadratic heights with noise below 1/2 are fine')
  const vertices = Array.from({ length: polytope.vertexCount }, (_, v) => [
    ...polytope.points.subarray(4 * v, 4 * v + 4),
  ])
  const { key } = canonicalClass(form, outcome.class)
  const { fibrations } = candidateGeometry({ key, vertices, heights })
  return candidateGeometrySchema.shape.fibrations.parse(fibrations)
}

describe('fibrations on the dossier', () => {
  it('weights (1,1,2,8,12): elliptic inside K3 fibres', () => {
    const { k3, genusOne, nested, planarSections, solidSections } = fibrationsOf([1, 1, 2, 8, 12])
    expect([planarSections, solidSections, nested]).toEqual([1, 1, [[0, 0]]])
    expect(genusOne).toMatchObject([{ section: 0, type: 10, degree: 1 }])
    expect(genusOne[0].outline).toHaveLength(6)
    // Candelas, Font, Katz, Morrison 1994 (from memory): over the Hirzebruch surface F_2.
    expect(genusOne[0].baseRays).toHaveLength(4)
    // A single prime divisor is the fibre: the two vertices of weight 1 are on either side.
    expect(fibreInWords(k3[0].fibre)).toMatch(/^D\d$/)
  })

  it('weights (1,1,1,1,1): none', () => {
    expect(fibrationsOf([1, 1, 1, 1, 1])).toEqual({
      planarSections: 0,
      solidSections: 0,
      k3: [],
      genusOne: [],
      nested: [],
    })
  })

  it('are written short', () => {
    expect(
      fibreInWords([
        [3, 1],
        [5, 2],
      ]),
    ).toBe('D3 + 2 D5')
    expect(fibreInWords([0, 1, 2, 3, 4, 5].map((p) => [p, 1]))).toBe('D0 + D1 + D2 + D3 + D4 + … (6 terms)')
    expect(
      raysInWords([
        [1, 0],
        [0, 1],
        [-1, -1],
      ]),
    ).toBe('3: (1, 0) (0, 1) (−1, −1)')
  })
})
