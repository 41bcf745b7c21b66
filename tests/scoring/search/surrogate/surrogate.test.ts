import { beforeAll, describe, expect, it } from 'vitest'
import type { NormalForm } from '../../../../scoring/geometry/normalForm.ts'
import type { TwoFaceClass } from '../../../../scoring/geometry/twoFaceClass.ts'
import { feasibleKind } from '../../../../scoring/search/merit.ts'
import { RandomStream, seededState } from '../../../../scoring/search/randomStream.ts'
import { drawNull } from '../../../../scoring/search/sampling.ts'
import { Surrogate, surrogateStateBytes } from '../../../../scoring/search/surrogate/surrogate.ts'
import { classFeatures } from '../../../../scoring/search/surrogate/classFeatures.ts'
import { problemOf } from '../problems.ts'

let form: NormalForm
let classes: TwoFaceClass[]

/** What is to be learnt: a number that is linear in the features, though the model is not told so. */
const worth = (cls: TwoFaceClass): number => classFeatures(form, cls)[18] - classFeatures(form, cls)[20]

/** Something that has nothing to do with the class. */
const noise = new RandomStream(seededState(9))

function taught(count: number, value: (cls: TwoFaceClass) => number): Surrogate {
  const surrogate = new Surrogate(null)
  for (const cls of classes.slice(0, count))
    surrogate.learn(form, cls, { kind: feasibleKind, value: value(cls) })
  return surrogate
}

beforeAll(() => {
  form = problemOf(['w20-17-newton-4-4-5-5-7'], 'score volume', 'random', { budget: 1 }).polytopes.at(0)
  const stream = new RandomStream(seededState(8))
  classes = Array.from({ length: 320 }, () => drawNull(form.polytope, stream).class)
})

/** Mean worth of what is chosen out of draws in a fixed order, and the number of draws. */
function chooses(surrogate: Surrogate): { mean: number; draws: number } {
  const stream = new RandomStream(seededState(10))
  let [draws, sum] = [0, 0]
  for (let n = 0; n < 40; n++) {
    const cls = surrogate.choose(
      stream,
      () => classes[(7 * draws++) % classes.length],
      (drawn) => ({ form, class: drawn, isKnown: () => false }),
    )
    sum += worth(cls)
  }
  return { mean: sum / 40, draws }
}

describe('the surrogate', () => {
  it('learns what can be learnt, says so, and chooses the better draws', () => {
    const surrogate = taught(300, worth)
    expect(surrogate.skill).toBeGreaterThan(0.9)
    expect(surrogate.isTrusted).toBe(true)
    const mean = classes.reduce((sum, cls) => sum + worth(cls), 0) / classes.length
    expect(chooses(surrogate).mean).toBeGreaterThan(mean + 0.5)
  })

  it('steps aside where there is nothing to learn: every choice is then the first draw', () => {
    const surrogate = taught(300, () => noise.gaussian())
    expect(Math.abs(surrogate.skill ?? 1)).toBeLessThan(0.2)
    expect(surrogate.isTrusted).toBe(false)
    expect(chooses(surrogate).draws).toBe(40)
    expect(surrogate.state().chosen).toBe(0)
  })

  it('has no skill to show before it has seen enough', () => {
    const surrogate = taught(31, worth)
    expect(surrogate.skill).toBeNull()
    expect(chooses(surrogate).draws).toBe(40)
  })

  it('never chooses what is known or leads nowhere, and then takes the first draw', () => {
    const surrogate = taught(300, worth)
    const stream = new RandomStream(seededState(10))
    const best = [...classes].sort((a, b) => worth(b) - worth(a))[0]
    for (let n = 0; n < 20; n++) {
      let drawn = 0
      const cls = surrogate.choose(
        stream,
        () => (drawn++ === 0 ? classes[0] : best),
        (candidate) => (n % 2 ? null : { form, class: candidate, isKnown: () => true }),
      )
      expect(cls).toBe(classes[0])
    }
  })

  it('goes on from its state as if nothing had happened, at any moment', () => {
    const straight = new Surrogate(null)
    let cut = new Surrogate(null)
    for (const [n, cls] of classes.entries()) {
      const merit = { kind: feasibleKind, value: worth(cls) }
      straight.learn(form, cls, merit)
      cut.learn(form, cls, merit)
      if (n % 37 === 5)
        cut = new Surrogate(JSON.parse(JSON.stringify(cut.state())) as ReturnType<Surrogate['state']>)
    }
    expect(cut.state()).toEqual(straight.state())
    expect(chooses(cut)).toEqual(chooses(straight))
    expect(JSON.stringify(straight.state()).length).toBeLessThan(surrogateStateBytes)
  })
})
