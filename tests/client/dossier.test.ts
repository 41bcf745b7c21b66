// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { pointedAt, stepTo } from '../../src/components/geometry/pointing.ts'
import { classesOfValues } from '../../src/components/geometry/faceColouring.ts'
import { drawingsOf } from '../../src/components/geometry/faceDrawing.ts'
import { distinctCurves } from '../../src/routes/candidate/CurveTable.tsx'
import { lineInside } from '../../src/routes/candidate/ConeSlice.tsx'
import { answering, matrixOf, readQuery } from '../../src/routes/candidate/intersectionQuery.ts'

describe('sparse intersection numbers', () => {
  const rows: [number, number, number, number][] = [
    [0, 0, 0, 9],
    [0, 0, 3, 3],
    [0, 3, 3, 1],
    [1, 2, 3, 2],
  ]
  const found = (text: string) => answering(rows, readQuery(text))
  it('are found by divisors, repeats included', () => {
    expect(found('')).toHaveLength(4)
    expect(found('3 3')).toEqual([[0, 3, 3, 1]])
    expect(found('contains 3 and D1')).toEqual([[1, 2, 3, 2]])
    expect(found('1, 1')).toEqual([])
  })
  it('are found by value, alone or with divisors', () => {
    expect(found('= 3')).toEqual([[0, 0, 3, 3]])
    expect(found('contains 0 and < 3')).toEqual([[0, 3, 3, 1]])
    expect(found('= −2')).toEqual([])
    expect(found('!= 9')).toHaveLength(3)
    expect(readQuery('between 3').unread).toBe('between')
  })
  it('are a symmetric matrix per divisor', () => {
    expect(matrixOf(rows, 3)).toEqual([
      { j: 0, k: 0, value: 3 },
      { j: 0, k: 3, value: 1 },
      { j: 1, k: 2, value: 2 },
    ])
  })
})

describe('curve classes', () => {
  it('are listed once, with the number of their edges, least volume first', () => {
    const a: [number, number][] = [
      [0, 1],
      [2, -2],
    ]
    expect(
      distinctCurves([
        { row: [[1, 1]], volume: 3 },
        { row: a, volume: 1 },
        { row: a.map((entry) => [...entry]), volume: 1 },
      ]),
    ).toEqual([
      { row: a, volume: 1, times: 2 },
      { row: [[1, 1]], volume: 3, times: 1 },
    ])
  })
})

describe('drawings of 2-faces', () => {
  const square = {
    dualLength: 2,
    points: [4, 5, 6, 7],
    plane: [
      [0, 0],
      [1, 0],
      [1, 1],
      [0, 1],
    ] as [number, number][],
    corners: [4, 5, 6, 7],
    area: 2,
  }
  const triangle = {
    dualLength: 1,
    points: [0, 1, 2],
    plane: [
      [0, 0],
      [1, 0],
      [0, 1],
    ] as [number, number][],
    corners: [0, 1, 2],
    area: 1,
  }

  it('come largest first, each with its own triangles', () => {
    const drawings = drawingsOf(
      [triangle, square],
      [
        [0, 1, 2],
        [4, 5, 6],
        [4, 6, 7],
      ],
      [0, 1, 1],
    )
    expect(drawings.map(({ index }) => index)).toEqual([1, 0])
    expect(drawings[0]?.edges).toHaveLength(5)
    expect(drawings[1]?.triangles).toEqual([[0, 1, 2]])
  })

  it('know the point or the edge under the pointer', () => {
    const [drawing] = drawingsOf(
      [square],
      [
        [4, 5, 6],
        [4, 6, 7],
      ],
      [0, 0],
    )
    const place = (point: number) => drawing!.at.get(point)!
    expect(pointedAt(drawing!, place(5), 30)).toEqual([5])
    const middle = [(place(4)[0] + place(6)[0]) / 2, (place(4)[1] + place(6)[1]) / 2] as const
    expect(pointedAt(drawing!, middle, 30)).toEqual([4, 6])
    expect(pointedAt(drawing!, [20, 20], 30)).toBeNull()
  })

  it('are walked through by keys: arrows to the nearest point that way, e around a point', () => {
    const [drawing] = drawingsOf(
      [square],
      [
        [4, 5, 6],
        [4, 6, 7],
      ],
      [0, 0],
    )
    const at = (point: number) => drawing!.at.get(point)!
    const first = stepTo(drawing!, null, 'ArrowRight')
    expect(first).toEqual([4])
    for (const [key, axis, sign] of [
      ['ArrowRight', 0, 1],
      ['ArrowLeft', 0, -1],
      ['ArrowUp', 1, 1],
      ['ArrowDown', 1, -1],
    ] as const) {
      for (const point of square.points) {
        const next = stepTo(drawing!, [point], key)![0]
        if (next !== point) expect(at(next)[axis] - at(point)[axis]).toBe(sign)
      }
    }
    let here = stepTo(drawing!, [6], 'e')
    const seen: unknown[] = []
    while (here?.length === 2) {
      seen.push([...here].sort())
      here = stepTo(drawing!, here, 'e')
    }
    expect(here).toEqual([6])
    expect(seen).toHaveLength(3)
    expect(stepTo(drawing!, [6], 'x')).toBeUndefined()
  })
})

describe('colours of points by a number', () => {
  it('are one per distinct value while there are few', () => {
    expect(classesOfValues([3, 1, 3, 2])).toEqual([[1], [2], [3]])
  })
  it('else hold about equally many points each, and never part equal values', () => {
    const values = Array.from({ length: 100 }, (_, at) => (at < 40 ? 0 : at))
    const groups = classesOfValues(values)
    expect(groups.length).toBeLessThanOrEqual(7)
    expect(groups.flat()).toEqual([...new Set(values)].sort((a, b) => a - b))
    expect(groups[0]).toEqual([0])
  })
})

describe('a wall of a slice', () => {
  it('is drawn from side to side of the picture, on its line', () => {
    const slope = [3, -4] as const
    const [ax, ay, bx, by] = lineInside(2, slope, 10)!
    for (const [x, y] of [
      [ax, ay],
      [bx, by],
    ] as const) {
      expect(2 + slope[0] * x + slope[1] * y).toBeCloseTo(0, 10)
      expect(Math.max(Math.abs(x), Math.abs(y))).toBeCloseTo(10, 10)
    }
    expect(lineInside(100, [1, 0], 10)).toBeNull()
    const straight = lineInside(5, [1, 0], 10)!
    expect(straight.map((n) => Math.round(n)).sort((a, b) => a - b)).toEqual([-10, -5, -5, 10])
  })
})
