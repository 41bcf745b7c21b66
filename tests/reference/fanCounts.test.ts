import { describe, expect, it } from 'vitest'
import { bundledPolytopes } from './bundledPolytopes.ts'
import { countFans } from './fanCounting.ts'

// Altman, Gray, He, Jejjala, Nelson, arXiv:1411.1418 (from memory, and recounted): the numbers of fine regular star
// triangulations over all polytopes and over the favourable ones, and likewise of the geometries they give, our
// 2-face classes. h11 = 5 (57,050 and 56,714; 13,635 and 13,494) is tests/long/fanCounts.ts.
describe('fine regular star triangulations, before symmetry', () => {
  const polytopes = bundledPolytopes('small')

  it.each([
    { h11: 1, fans: 5, classes: 5, favourableFans: 5, favourableClasses: 5 },
    { h11: 2, fans: 48, classes: 39, favourableFans: 48, favourableClasses: 39 },
    { h11: 3, fans: 526, classes: 306, favourableFans: 525, favourableClasses: 305 },
    { h11: 4, fans: 5348, classes: 2014, favourableFans: 5330, favourableClasses: 2000 },
  ])(
    'h11 = $h11: $fans in $classes classes; $favourableFans on favourable polytopes',
    ({ h11, ...counts }) => {
      expect(countFans(polytopes.filter((polytope) => polytope.h11 === h11))).toEqual(counts)
    },
  )
})
