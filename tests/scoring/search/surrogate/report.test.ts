import { expect, it } from 'vitest'
import { mergedSurrogate } from '../../../../scoring/search/surrogate/report.ts'

it('reports of islands are added up, and their skills averaged by the predictions they are over', () => {
  const one = { skill: 0.6, predictions: 200, aside: false, offered: 100, chosen: 10 }
  const other = { skill: 0.3, predictions: 100, aside: true, offered: 20, chosen: 2 }
  const young = { skill: null, predictions: 5, aside: true, offered: 0, chosen: 0 }
  expect(mergedSurrogate([one, null, other, young])).toEqual({
    skill: 0.5,
    predictions: 305,
    aside: false,
    offered: 120,
    chosen: 12,
  })
  expect(mergedSurrogate([young])).toEqual(young)
  expect(mergedSurrogate([null])).toBeNull()
})
