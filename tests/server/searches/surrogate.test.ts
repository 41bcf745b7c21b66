import { afterAll, beforeAll, expect, it } from 'vitest'
import { openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
beforeAll(async () => {
  hunt = await openSmallHunt()
})
afterAll(() => hunt.close())

it('a search reports on its surrogate when it has one, and has none when none is wanted', async () => {
  const asked = await hunt.start({ budget: 64, islands: 1, surrogate: true })
  const unasked = await hunt.start({ budget: 10, surrogate: false })
  const sampling = await hunt.start({ budget: 10, method: 'random', surrogate: true })
  const done = await hunt.finished(asked.id)
  expect(done).toMatchObject({ surrogate: true, evaluations: 64 })
  const { surrogate } = done.progress
  if (!surrogate) throw new Error('no report')
  // Predictions begin after 32 evaluations.
  expect(surrogate.predictions).toBe(32)
  expect(Math.abs(surrogate.skill ?? 2)).toBeLessThanOrEqual(1)
  expect(surrogate.offered).toBeGreaterThanOrEqual(surrogate.chosen)
  expect(await hunt.finished(unasked.id)).toMatchObject({ surrogate: false, progress: { surrogate: null } })
  expect(await hunt.finished(sampling.id)).toMatchObject({ surrogate: true, progress: { surrogate: null } })
}, 300_000)
