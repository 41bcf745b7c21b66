import { uniformInt } from 'pure-rand/distribution/uniformInt'
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus'
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator'

/** The whole state of a generator: four 32-bit integers, not all zero. */
export type GeneratorState = readonly [number, number, number, number]

/**
 * A stream of random numbers (xoroshiro128+) whose state is plain data. All draws depend on the state alone, so
 * a stream that is stored and restored continues to the bit.
 */
export class RandomStream {
  private readonly generator: RandomGenerator

  constructor(state: GeneratorState) {
    this.generator = xoroshiro128plusFromState(state)
  }

  state(): GeneratorState {
    const [a, b, c, d] = this.generator.getState()
    return [a, b, c, d]
  }

  /** Uniform integer in [0, size), without bias; size at most 2^53. */
  below(size: number): number {
    return uniformInt(this.generator, 0, size - 1)
  }

  /** Uniform integer in [from, to], both included. */
  between(from: number, to: number): number {
    return uniformInt(this.generator, from, to)
  }

  /** Uniform in [0, 1), a multiple of 2^-53. */
  uniform(): number {
    const high = this.generator.next() >>> 5
    const low = this.generator.next() >>> 6
    return (high * 2 ** 26 + low) / 2 ** 53
  }

  /**
   * Standard normal, by Marsaglia's polar method. The second value of each pair is thrown away, so that the
   * generator's state is the stream's whole state.
   */
  gaussian(): number {
    for (;;) {
      const x = 2 * this.uniform() - 1
      const y = 2 * this.uniform() - 1
      const square = x * x + y * y
      if (square > 0 && square < 1) return x * Math.sqrt((-2 * Math.log(square)) / square)
    }
  }
}

/**
 * Generator state for a seed and a path of integers (island, purpose): different paths give unrelated streams.
 * Each word passes through the finaliser of the SplitMix family, so that neighbouring seeds share nothing.
 */
export function seededState(seed: number, ...path: number[]): GeneratorState {
  let word: number = 0x9e3779b9 | 0
  for (const part of [seed, ...path]) {
    word = mix(word ^ mix(part | 0))
    word = mix(word ^ mix(Math.floor(part / 2 ** 32) | 0))
  }
  const state: number[] = []
  for (let n = 0; n < 4; n++) {
    word = (word + 0x9e3779b9) | 0
    state.push(mix(word))
  }
  // The all-zero state is a fixed point of the generator.
  if (!state.some(Boolean)) state[0] = 1
  return [state[0], state[1], state[2], state[3]]
}

function mix(value: number): number {
  let z = value | 0
  z = Math.imul(z ^ (z >>> 16), 0x21f0aaad)
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
  return z ^ (z >>> 15)
}
