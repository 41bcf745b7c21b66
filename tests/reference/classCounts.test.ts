import { beforeAll, describe, expect, it } from 'vitest'
import { enumerateClasses, orbitsOf } from '../../scoring/geometry/enumeration.ts'
import { normalForm } from '../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'

interface Counts {
  all: number
  favourable: number
  orbits: number
  irregular: number
}

describe('2-face classes of all polytopes with h11 = 1 to 4, by walking flips', () => {
  const counts: Counts[] = Array.from({ length: 5 }, () => ({
    all: 0,
    favourable: 0,
    orbits: 0,
    irregular: 0,
  }))

  beforeAll(() => {
    for (const { vertices, h11, favourable } of bundledPolytopes('small')) {
      const form = normalForm(polytopeFromPoints(vertices))
      const found = enumerateClasses(form.polytope)
      const count = counts[h11]
      count.all += found.classes.length
      if (favourable) count.favourable += found.classes.length
      count.orbits += orbitsOf(form, found.classes).size
      count.irregular += found.irregularNeighbours
    }
  })

  const column = (name: keyof Counts): number[] => counts.slice(1).map((count) => count[name])

  // Altman, Gray, He, Jejjala, Nelson, arXiv:1411.1418, published there as numbers of geometries (from memory),
  // and recounted.
  it('are 5, 39, 306, 2014 before symmetry', () => {
    expect(column('all')).toEqual([5, 39, 306, 2014])
  })

  // Same source, also from memory, also recounted.
  it('are 5, 39, 305, 2000 on the favourable polytopes', () => {
    expect(column('favourable')).toEqual([5, 39, 305, 2000])
  })

  // Our own count, made twice with different programs.
  it('are 5, 36, 275, 1774 modulo automorphisms', () => {
    expect(column('orbits')).toEqual([5, 36, 275, 1774])
  })

  // Our own count: distinct classes one flip away from a regular one that no heights give.
  it('have 110 neighbours that are not regular', () => {
    expect(column('irregular').reduce((a, b) => a + b)).toBe(110)
  })
})
