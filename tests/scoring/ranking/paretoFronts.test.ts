import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { paretoFronts } from '../../../scoring/ranking/paretoFronts.ts'

type Row = (number | null)[]

/** By definition: peel off, again and again, the rows that none of those left dominates. */
function peeled(rows: readonly Row[]): (number | null)[] {
  const dominates = (a: Row, b: Row) =>
    a.every((value, axis) => value! >= b[axis]!) && a.some((value, axis) => value! > b[axis]!)
  const fronts: (number | null)[] = rows.map(() => null)
  let left = rows.flatMap((row, at) => (row.every((value) => value !== null) ? [at] : []))
  for (let front = 1; left.length > 0; front++) {
    const free = left.filter((at) => !left.some((other) => dominates(rows[other], rows[at])))
    for (const at of free) fronts[at] = front
    left = left.filter((at) => !free.includes(at))
  }
  return fronts
}

/** Few values, so that ties and equal rows are common. */
const table = fc.integer({ min: 1, max: 3 }).chain((columns) =>
  fc.array(
    fc.array(fc.option(fc.integer({ min: -3, max: 3 }), { freq: 12 }), {
      minLength: columns,
      maxLength: columns,
    }),
    { maxLength: 40 },
  ),
)

describe('Pareto fronts', () => {
  it('are what is left when dominated rows are peeled off', () => {
    fc.assert(
      fc.property(table, (rows) => {
        expect(paretoFronts(rows)).toEqual(peeled(rows))
      }),
    )
  })

  it('of numbers without ties, too', () => {
    const row = fc.tuple(fc.double({ noNaN: true }), fc.double({ noNaN: true }), fc.double({ noNaN: true }))
    fc.assert(
      fc.property(fc.array(row, { maxLength: 60 }), (rows) => {
        const finite = rows.map((one): Row => one.map((value) => (Number.isFinite(value) ? value : null)))
        expect(paretoFronts(rows)).toEqual(peeled(finite))
      }),
    )
  })

  it('do not depend on the order of rows', () => {
    fc.assert(
      fc.property(table, fc.infiniteStream(fc.double({ min: 0, max: 1, noNaN: true })), (rows, dice) => {
        const keyed = rows.map((row) => ({ row, die: dice.next().value as number }))
        const shuffled = [...keyed].sort((a, b) => a.die - b.die)
        const fronts = paretoFronts(shuffled.map(({ row }) => row))
        const back = keyed.map((one) => fronts[shuffled.indexOf(one)])
        expect(back).toEqual(paretoFronts(rows))
      }),
    )
  })

  it('leave out rows with an undefined or infinite value, and count equal rows alike', () => {
    expect(
      paretoFronts([
        [1, 2],
        [null, 9],
        [Infinity, 0],
        [1, 2],
        [0, 3],
        [0, 2],
        [Number.NaN, 1],
      ]),
    ).toEqual([1, null, null, 1, 1, 2, null])
    expect(
      paretoFronts([
        [0, 1],
        [-0, 1],
      ]),
    ).toEqual([1, 1])
    expect(paretoFronts([])).toEqual([])
  })

  it('refuse more columns than three, and none', () => {
    expect(() => paretoFronts([[1, 2, 3, 4]])).toThrow(RangeError)
    expect(() => paretoFronts([[]])).toThrow(RangeError)
  })
})
