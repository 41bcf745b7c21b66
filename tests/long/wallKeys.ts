/**
 * Counts distinct keys of Wall-type invariants over all 2-face classes with h11 = 1, 2, 3, beside the classes and the
 * classes modulo automorphisms. `npx tsx tests/long/wallKeys.ts`, a few seconds. Our own count: 5, 29 and 177 keys for
 * 5, 39 and 306 classes (5, 36, 275 modulo automorphisms); at h11 = 3 the true number of threefolds is not smaller.
 */
import { enumerateClasses, orbitsOf } from '../../scoring/geometry/enumeration.ts'
import { intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { normalForm } from '../../scoring/geometry/normalForm.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { wallInvariants } from '../../scoring/geometry/wallInvariants.ts'
import { bundledPolytopes } from '../reference/bundledPolytopes.ts'

for (const h11 of [1, 2, 3]) {
  const keys = new Set<string>()
  let classes = 0
  let orbits = 0
  for (const { vertices } of bundledPolytopes('small').filter((entry) => entry.h11 === h11)) {
    const form = normalForm(polytopeFromPoints(vertices))
    const found = enumerateClasses(form.polytope).classes
    classes += found.length
    orbits += orbitsOf(form, found).size
    for (const cls of found) keys.add(wallInvariants(cls, intersectionNumbers(cls)).key)
  }
  process.stdout.write(
    `h11 = ${h11}: ${classes} classes, ${orbits} modulo automorphisms, ${keys.size} keys\n`,
  )
}
