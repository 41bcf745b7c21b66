/**
 * Pairs of a 2-face class and a reflexive section of its polytope, over all fine regular classes before symmetry of all
 * polytopes with h11 <= 4, and how many of the sections fibre the class. Two programs of ours gave the same numbers:
 * 1,850 of 2,316 planar sections and 1,482 of 2,436 solid ones. Takes a few seconds; exits 1 when they differ.
 *
 *     node --import tsx tests/long/fibrationCounts.ts
 */
import { enumerateClasses } from '../../scoring/geometry/enumeration.ts'
import { fibrations } from '../../scoring/geometry/fibrations.ts'
import { intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { reflexiveSections } from '../../scoring/geometry/sections.ts'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'

const counts = { classes: 0, genusOne: 0, planar: 0, k3: 0, solid: 0, nested: 0 }
for (const { vertices } of bundledPolytopes('small')) {
  const polytope = polytopeFromPoints(vertices)
  const { planar, solid } = reflexiveSections(polytope)
  for (const cls of enumerateClasses(polytope).classes) {
    const found = fibrations(cls, intersectionNumbers(cls))
    counts.classes++
    counts.planar += planar.length
    counts.genusOne += found.genusOne.length
    counts.solid += solid.length
    counts.k3 += found.k3.length
    counts.nested += found.nested.length
  }
}
const { classes, genusOne, planar, k3, solid, nested } = counts
process.stdout.write(
  `${classes} classes: ${genusOne} of ${planar} planar sections and ${k3} of ${solid} solid ones fibre them; ${nested} nested pairs\n`,
)
if ([classes, genusOne, planar, k3, solid].join() !== '2364,1850,2316,1482,2436') process.exitCode = 1
