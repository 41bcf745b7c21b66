// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { pointedAt } from '../../src/components/geometry/FacePicture.tsx'
import { drawingsOf } from '../../src/components/geometry/faceDrawing.ts'
import { distinctCurves } from '../../src/routes/candidate/CurveTable.tsx'
import { containing } from '../../src/routes/candidate/IntersectionTable.tsx'

describe('sparse intersection numbers', () => {
  const rows: [number, number, number, number][] = [
    [0, 0, 0, 9],
    [0, 0, 3, 3],
    [0, 3, 3, 1],
    [1, 2, 3, 2],
  ]
  it('are found by divisors, repeats included', () => {
    expect(containing(rows, [])).toHaveLength(4)
    expect(containing(rows, [3, 3])).toEqual([[0, 3, 3, 1]])
    expect(containing(rows, [3, 1])).toEqual([[1, 2, 3, 2]])
    expect(containing(rows, [1, 1])).toEqual([])
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
})
