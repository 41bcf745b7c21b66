import { expect, it } from 'vitest'
import { normalForm, polytopeFromPoints, type WalkPosition } from '../../scoring/index.ts'
import { enumerateClasses, orbitsOf } from '../../scoring/geometry/enumeration.ts'
import { classCount, classNumbers } from '../../server/jobs/compute/classCount.ts'
import { rowsOfFour } from '../../server/jobs/compute/polytopeFacts.ts'
import { bundledEntries } from './support/bundledSample.ts'

it.each(['w7-47-newton', 'w7-106-fan'])('a count in slices of %s is that of an enumeration', (beginning) => {
  const [{ vertices: given }] = bundledEntries('large', (id) => id.startsWith(beginning))
  const form = normalForm(polytopeFromPoints(given))
  const vertices = rowsOfFour(form.polytope.points.subarray(0, 4 * form.polytope.vertexCount))
  const all = enumerateClasses(form.polytope).classes
  const orbits = orbitsOf(form, all)

  for (const most of [1, 7, 1000]) {
    const met = new Set<string>()
    let position: WalkPosition | null = null
    let classes = 0
    do {
      const slice = classCount({ vertices, position, most })
      expect(slice.classes).toBeLessThanOrEqual(most)
      classes += slice.classes
      for (const key of slice.keys) met.add(key)
      position = slice.position
    } while (position !== null)
    expect(classes).toBe(all.length)
    expect([...met].sort()).toEqual([...orbits.keys()].sort())
  }
  expect(classNumbers({ vertices })).toEqual({
    classes: String(all.length),
    candidates: String(orbits.size),
  })
})
