// @vitest-environment happy-dom
import { cleanup, screen, within } from '@testing-library/react'
import { afterEach, beforeAll, describe, expect, it } from 'vitest'
import { alignCandidates } from '../../server/jobs/compute/relatives.ts'
import { candidateSpectra } from '../../server/jobs/compute/candidateGeometry.ts'
import { type CandidateGeometry } from '../../shared/candidates.ts'
import {
  divisorDifferences,
  faceDifferences,
  intersectionDifferences,
  relabelled,
} from '../../src/routes/candidates/compare/candidateDifferences.ts'
import { compareCandidatesAddress, readCompared } from '../../src/routes/candidates/compare/compareAddress.ts'
import { CompareCandidatesPage } from '../../src/routes/candidates/compare/CompareCandidatesPage.tsx'
import { keyIn } from '../../src/components/candidate/CandidateChoice.tsx'
import { dossierOf, storedCandidate, type StoredCandidate } from './candidateFixture.ts'
import { renderPage } from './renderPage.tsx'
import { stubApi } from './stubApi.ts'

const weights = [6, 7, 7, 9, 13]
const stored: StoredCandidate[] = []
let a: CandidateGeometry
let b: CandidateGeometry
let points: { image: number[]; triangles: number }

beforeAll(() => {
  const first = storedCandidate(weights, 1)
  let second = first
  for (let seed = 2; second.key === first.key; seed += 1) second = storedCandidate(weights, seed)
  stored.push(first, second)
  a = dossierOf(first, weights)
  b = dossierOf(second, weights)
  points = alignCandidates({ ...first, other: second })
})
afterEach(cleanup)

describe('differences of two classes on a polytope', () => {
  it('are in as many triangles as the symmetry leaves, on the faces that contain them', () => {
    const faces = faceDifferences(a, relabelled(b, points.image))
    expect(points.triangles).toBeGreaterThan(0)
    const count = (which: 'trianglesA' | 'trianglesB') =>
      faces.reduce((sum, face) => sum + face[which].length, 0)
    expect([count('trianglesA'), count('trianglesB')]).toEqual([points.triangles, points.triangles])
    for (const face of faces) {
      expect(face.onlyA).toHaveLength(face.onlyB.length)
      expect(face.common.length + face.onlyA.length).toBe(face.a.edges.length)
      const inside = new Set(face.a.points)
      expect(face.trianglesB.flat().every((point) => inside.has(point))).toBe(true)
    }
  })

  it('vanish between a class and itself under a symmetry', () => {
    const self = alignCandidates({ ...stored[0]!, other: stored[0]! })
    expect(self.triangles).toBe(0)
    const same = relabelled(a, self.image)
    expect(faceDifferences(a, same)).toEqual([])
    expect(intersectionDifferences(a.intersections, same.intersections)).toEqual([])
    expect(divisorDifferences(a, same).every(({ change, cube }) => change === 0 && cube[0] === cube[1])).toBe(
      true,
    )
  })

  it('in intersection numbers obey the linear relations, as both sides do', () => {
    const rows = intersectionDifferences(a.intersections, relabelled(b, points.image).intersections)
    expect(rows.length).toBeGreaterThan(0)
    // sum_k v_k (κ_ijk(B) - κ_ijk(A)) = 0 for all i, j.
    const sums = new Map<string, number[]>()
    for (const { points: entry, a: inA, b: inB } of rows) {
      for (const [i, j, k] of new Map(
        [
          [entry[0], entry[1], entry[2]],
          [entry[0], entry[2], entry[1]],
          [entry[1], entry[2], entry[0]],
        ].map((order) => [order.join(' '), order] as const),
      ).values()) {
        const key = `${i} ${j}`
        const sum = sums.get(key) ?? [0, 0, 0, 0]
        a.polytope.pointCoordinates[k!]!.forEach((x, axis) => (sum[axis]! += x * (inB - inA)))
        sums.set(key, sum)
      }
    }
    expect([...sums.values()].every((sum) => sum.every((entry) => entry === 0))).toBe(true)
  })
})

describe('the address of a comparison', () => {
  it('holds two different keys and the campaign', () => {
    const [one, two] = ['a'.repeat(32), 'b'.repeat(32)]
    const address = compareCandidatesAddress([one, two], 'c1')
    expect(address).toBe(`/candidates/compare?with=${one},${two}&campaign=c1`)
    expect(readCompared(new URLSearchParams(address.split('?')[1]))).toEqual([one, two])
    expect(readCompared(new URLSearchParams(`with=${one},${one},nonsense`))).toEqual([one])
    expect(keyIn(`https://somewhere.example/candidates/${two}?campaign=c`)).toBe(two)
  })
})

describe('two candidates side by side', () => {
  it('show what differs, and say so in words', async () => {
    stubApi({
      [`GET /candidates/${a.key}`]: a,
      [`GET /candidates/${b.key}`]: b,
      [`GET /candidates/${a.key}/alignment/${b.key}`]: { key: a.key, other: b.key, points },
      ...Object.fromEntries(
        stored.map((one) => [
          `GET /candidates/${one.key}/spectra`,
          { key: one.key, ...candidateSpectra(one) },
        ]),
      ),
    })
    renderPage(
      <CompareCandidatesPage />,
      '/candidates/compare',
      compareCandidatesAddress([a.key, b.key], 'c1'),
    )
    const note = await screen.findByText(/^Two classes of/)
    expect(note.textContent).toContain(`${points.triangles} triangle`)
    const faces = faceDifferences(a, relabelled(b, points.image))
    expect(screen.getAllByRole('img', { name: /only in A/ })).toHaveLength(Math.min(12, faces.length))
    const table = screen.getByRole('table', { name: 'Intersection numbers that differ' })
    const rows = intersectionDifferences(a.intersections, relabelled(b, points.image).intersections)
    expect(table.getAttribute('aria-rowcount')).toBe(String(rows.length + 1))
    expect(within(table).getAllByRole('row')[1]?.textContent).toContain(String(rows[0]!.points[2]))
  })

  it('on different polytopes show facts only, and say why', async () => {
    stubApi({
      [`GET /candidates/${a.key}`]: a,
      [`GET /candidates/${b.key}`]: b,
      [`GET /candidates/${a.key}/alignment/${b.key}`]: { key: a.key, other: b.key, points: null },
    })
    renderPage(<CompareCandidatesPage />, '/candidates/compare', compareCandidatesAddress([a.key, b.key]))
    await screen.findByText(/on different polytopes/)
    expect(screen.getByRole('table', { name: 'Facts of both candidates' })).toBeTruthy()
    expect(screen.queryByText('2-faces that differ')).toBeNull()
  })
})
