import { describe, expect, it } from 'vitest'
import { polytopeNumberNames } from '../../shared/polytopeNumbers.ts'
import { polytopeRowSchema } from '../../shared/polytopes.ts'
import { describeScope, scopeFromAddress } from '../../src/components/scope/scopeAddress.ts'
import { cornersOf } from '../../src/components/geometry/ReflexivePolygon.tsx'
import { filterWords } from '../../src/lib/filterWords.ts'
import { changedFilter, columnsText, readColumns, readFilter } from '../../src/lib/libraryAddress.ts'

const address = (text: string) => new URLSearchParams(text)

describe('the address of a library view', () => {
  it('names a range of every number, and leaves out what does not fit', () => {
    for (const name of polytopeNumberNames) {
      const filter = readFilter(address(`${name}Min=2&${name}Max=7`))
      expect(filter).toEqual({ [`${name}Min`]: 2, [`${name}Max`]: 7 })
      expect(filterWords(filter)).toHaveLength(1)
      expect(polytopeRowSchema.shape).toHaveProperty(name)
    }
    expect(readFilter(address('h11Min=-1&h21Max=many&edgesMin=&eulerMin=-200&favourable=perhaps'))).toEqual({
      eulerMin: -200,
    })
  })

  it('is changed part by part', () => {
    const filter = changedFilter({ h11Max: 4, text: 'r3' }, { h11Max: '', facetsMin: '9' })
    expect(filter).toEqual({ text: 'r3', facetsMin: 9 })
    expect(filterWords(filter).map(({ words, parts }) => [words, ...parts])).toEqual([
      ['“r3”', 'text'],
      ['Facets ≥ 9', 'facetsMin', 'facetsMax'],
    ])
  })

  it('names columns only when they are not the usual ones', () => {
    const usual = readColumns(address(''))
    expect(columnsText(usual)).toBeUndefined()
    const fewer = usual.slice(1)
    expect(readColumns(address(`columns=${columnsText(fewer)}`))).toEqual(fewer)
    expect(readColumns(address(`columns=${columnsText([])}`))).toEqual([])
  })

  it('is a scope for a search', () => {
    expect(scopeFromAddress(address('edgesMax=12&collection=abc'))).toEqual({
      kind: 'filter',
      filter: { edgesMax: 12, collection: 'abc' },
    })
    expect(describeScope({ kind: 'collection', collection: 'abc', name: 'tall ones' })).toBe(
      'the collection “tall ones”',
    )
    expect(describeScope({ kind: 'filter', filter: { h11Min: 3, h11Max: 3, weighted: 'yes' } })).toBe(
      'all polytopes with h11 = 3, made from weights',
    )
  })
})

it('the corners of a lattice polygon are where it turns', () => {
  // The polygon of weights (1, 2, 3): six boundary points, three corners.
  const outline = [
    [1, 0],
    [0, 1],
    [-1, -1],
    [-2, -3],
    [-1, -2],
    [0, -1],
  ] as const
  expect(cornersOf(outline)).toEqual([
    [1, 0],
    [0, 1],
    [-2, -3],
  ])
})
