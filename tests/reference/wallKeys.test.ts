import { describe, expect, it } from 'vitest'
import { enumerateClasses } from '../../scoring/geometry/enumeration.ts'
import { intersectionNumbers } from '../../scoring/geometry/intersectionNumbers.ts'
import { latticeForm } from '../../scoring/geometry/latticeForm.ts'
import { polytopeFromPoints } from '../../scoring/geometry/polytope.ts'
import { wallInvariants } from '../../scoring/geometry/wallInvariants.ts'
import { dense, onVectors, type DenseForm } from '../scoring/components/denseForm.ts'
import { bundledPolytopes } from './bundledPolytopes.ts'

interface Entry {
  readonly id: string
  readonly key: string
  readonly h21: number
  readonly fundamentalGroup: number
  readonly form: DenseForm
}

/** Every 2-face class on every polytope with a given h11. */
function entriesWith(h11: number): Entry[] {
  return bundledPolytopes('small')
    .filter((entry) => entry.h11 === h11)
    .flatMap(({ id, vertices }) =>
      enumerateClasses(polytopeFromPoints(vertices)).classes.map((cls) => {
        const numbers = intersectionNumbers(cls)
        const { key, h21, fundamentalGroup } = wallInvariants(cls, numbers)
        return { id, key, h21, fundamentalGroup, form: dense(latticeForm(cls, numbers)) }
      }),
    )
}

/** Matrices of GL(2,Z) with entries up to 8 in size. */
const matrices: number[][][] = []
for (let a = -8; a <= 8; a++)
  for (let b = -8; b <= 8; b++)
    for (let c = -8; c <= 8; c++)
      for (let d = -8; d <= 8; d++)
        if (Math.abs(a * d - b * c) === 1)
          matrices.push([
            [a, b],
            [c, d],
          ])

/** By trying: does a change of basis take the one pair of forms to the other? */
function equivalent(one: DenseForm, other: DenseForm): boolean {
  const cubic = ({ kappa }: DenseForm, [x, y]: number[]): number =>
    kappa[0][0][0] * x ** 3 +
    3 * kappa[0][0][1] * x * x * y +
    3 * kappa[0][1][1] * x * y * y +
    kappa[1][1][1] * y ** 3
  return matrices.some(
    (rows) =>
      rows.every(
        (row, i) =>
          cubic(one, row) === other.kappa[i][i][i] &&
          one.chern[0] * row[0] + one.chern[1] * row[1] === other.chern[i],
      ) && JSON.stringify(onVectors(one, rows)) === JSON.stringify(other),
  )
}

describe('keys of Wall-type invariants against equivalence of the forms, found by trying changes of basis', () => {
  it('h11 = 1: five threefolds, five keys', () => {
    expect(new Set(entriesWith(1).map(({ key }) => key)).size).toBe(5)
  })

  // 29 by trying here. (arXiv:2310.05909 counts diffeomorphism classes of these threefolds; from memory, also 29.)
  it('h11 = 2: 39 classes on 36 polytopes are 29 threefolds, and the key tells them apart', () => {
    const entries = entriesWith(2)
    expect(entries).toHaveLength(39)
    const kinds: Entry[][] = []
    for (const entry of entries) {
      const kind = kinds.find(
        ([first]) =>
          first.h21 === entry.h21 &&
          first.fundamentalGroup === entry.fundamentalGroup &&
          equivalent(first.form, entry.form),
      )
      if (kind) kind.push(entry)
      else kinds.push([entry])
    }
    expect(kinds).toHaveLength(29)
    expect(kinds.map((kind) => new Set(kind.map(({ key }) => key)).size)).toEqual(kinds.map(() => 1))
    expect(new Set(entries.map(({ key }) => key)).size).toBe(29)
    // Some kinds are met on several polytopes: what the flag is for.
    expect(kinds.filter((kind) => new Set(kind.map(({ id }) => id)).size > 1).length).toBeGreaterThan(3)
  })
})
