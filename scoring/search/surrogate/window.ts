import { base64Of, bytesOf } from '../base64.ts'
import type { Merit } from '../merit.ts'

/** One evaluated candidate, as the surrogate remembers it. */
export interface Lesson {
  readonly features: Float32Array
  readonly merit: Merit
  /** What the model in force said before the candidate was evaluated; NaN when there was none. */
  readonly predicted: number
}

/** The same as plain JSON: little-endian arrays in base64. */
export interface WindowState {
  /** Lessons since the beginning, those forgotten included. */
  readonly total: number
  readonly features: string
  readonly kinds: string
  readonly values: string
  readonly predicted: string
}

export const emptyWindow: WindowState = { total: 0, features: '', kinds: '', values: '', predicted: '' }

/** The last lessons, at most `capacity`, in order. */
export class LessonWindow {
  total: number
  private readonly lessons: Lesson[]

  constructor(
    private readonly capacity: number,
    state: WindowState = emptyWindow,
  ) {
    this.total = state.total
    const features = new Float32Array(bytesOf(state.features).buffer)
    const kinds = bytesOf(state.kinds)
    const values = new Float64Array(bytesOf(state.values).buffer)
    const predicted = new Float64Array(bytesOf(state.predicted).buffer)
    const width = features.length / kinds.length
    this.lessons = Array.from(kinds, (kind, n) => ({
      features: features.slice(n * width, (n + 1) * width),
      merit: { kind, value: values[n] },
      predicted: predicted[n],
    }))
  }

  state(): WindowState {
    const { lessons } = this
    const width = lessons.length === 0 ? 0 : lessons[0].features.length
    const features = new Float32Array(lessons.length * width)
    for (const [n, lesson] of lessons.entries()) features.set(lesson.features, n * width)
    const numbers = (pick: (lesson: Lesson) => number): string =>
      base64Of(new Uint8Array(Float64Array.from(lessons, pick).buffer))
    return {
      total: this.total,
      features: base64Of(new Uint8Array(features.buffer)),
      kinds: base64Of(Uint8Array.from(lessons, ({ merit }) => merit.kind)),
      values: numbers(({ merit }) => merit.value),
      predicted: numbers(({ predicted }) => predicted),
    }
  }

  add(lesson: Lesson): void {
    this.total++
    this.lessons.push(lesson)
    if (this.lessons.length > this.capacity) this.lessons.shift()
  }

  /** Lessons number `from` to `to - 1`, counted from the beginning, as far as they are remembered. */
  between(from: number, to: number): readonly Lesson[] {
    const first = this.total - this.lessons.length
    return this.lessons.slice(Math.max(0, from - first), Math.max(0, to - first))
  }
}
