import type { ReadingProblem } from './given.ts'

export interface WeightLine {
  readonly line: number
  readonly weights: readonly number[]
  /** Text behind the weights and a `#`, if any. */
  readonly name: string | null
}

/**
 * Weight systems, five positive integers a line, parted by blanks or commas; brackets are fine. Text behind `#` names
 * the system. Whether there is a reflexive polytope to it is not looked at here.
 */
export function readWeightLines(text: string): {
  readonly systems: readonly WeightLine[]
  readonly problems: readonly ReadingProblem[]
} {
  const systems: WeightLine[] = []
  const problems: ReadingProblem[] = []
  text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\n|\r/)
    .forEach((whole, index) => {
      const line = index + 1
      const [content, ...rest] = whole.split('#')
      const entries = content.split(/[\s,;[\](){}]+/).filter((entry) => entry !== '')
      if (entries.length === 0) return
      const fail = (code: string, message: string) => problems.push({ line, entry: '', code, message })
      const wrong = entries.findIndex((entry) => !/^\+?\d+$/.test(entry) || Number(entry) === 0)
      if (wrong >= 0) {
        const text = entries[wrong].slice(0, 24)
        fail('weights.not-positive-integers', `Entry ${wrong + 1}, "${text}", is no positive integer.`)
      } else if (entries.length !== 5) {
        const found = `${entries.length} ${entries.length === 1 ? 'weight' : 'weights'}`
        fail('weights.wrong-count', `This line has ${found}; a weight system has five.`)
      } else {
        const name = rest.join('#').trim()
        systems.push({ line, weights: entries.map(Number), name: name === '' ? null : name.slice(0, 80) })
      }
    })
  return { systems, problems }
}
