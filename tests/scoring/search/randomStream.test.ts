import { describe, expect, it } from 'vitest'
import { RandomStream, seededState } from '../../../scoring/search/randomStream.ts'

describe('random stream', () => {
  it('continues to the bit from its stored state', () => {
    const stream = new RandomStream(seededState(7, 0))
    for (let n = 0; n < 100; n++) stream.gaussian()
    const copy = new RandomStream(JSON.parse(JSON.stringify(stream.state())))
    const draws = (s: RandomStream): number[] => [s.uniform(), s.below(1000), s.gaussian(), s.between(-3, 3)]
    expect(draws(copy)).toEqual(draws(stream))
  })

  it('gives unrelated streams for neighbouring seeds and paths', () => {
    const firsts = new Set<number>()
    for (let seed = 0; seed < 50; seed++) {
      for (let island = 0; island < 4; island++)
        firsts.add(new RandomStream(seededState(seed, island)).uniform())
    }
    expect(firsts.size).toBe(200)
    const mean = [...firsts].reduce((a, b) => a + b, 0) / 200
    expect(Math.abs(mean - 0.5)).toBeLessThan(0.1)
  })

  it('draws normal values with the right moments', () => {
    const stream = new RandomStream(seededState(1))
    let [sum, squares, fourth] = [0, 0, 0]
    const n = 40_000
    for (let i = 0; i < n; i++) {
      const x = stream.gaussian()
      sum += x
      squares += x * x
      fourth += x ** 4
    }
    expect(Math.abs(sum / n)).toBeLessThan(0.02)
    expect(Math.abs(squares / n - 1)).toBeLessThan(0.03)
    expect(Math.abs(fourth / n - 3)).toBeLessThan(0.3)
  })
})
