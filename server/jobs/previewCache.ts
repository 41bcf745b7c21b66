import { createHash } from 'node:crypto'
import type { NullSummary } from '../../shared/nullSamples.ts'
import type { Preview } from '../../shared/targets.ts'
import type { PreviewRow } from './nullChunk.ts'

/** What a preview's answer depends on. */
export interface PreviewProblem {
  readonly scoringHash: string
  readonly scopeHash: string
  readonly size: number
  readonly seed: number
}

export const previewAddress = (problem: PreviewProblem): string =>
  createHash('sha256')
    .update(JSON.stringify([problem.scoringHash, problem.scopeHash, problem.size, problem.seed]))
    .digest('hex')

/** A preview that was stopped, as far as it came. */
export interface PreviewPart {
  readonly rows: PreviewRow[]
  readonly state: string
  readonly summary: NullSummary
}

export type PreviewAnswer = Omit<Preview, 'id' | 'message'>

const partsKept = 6
const answersKept = 200

/**
 * Answers of the latest previews by what they depend on, whoever asks: the scoring hash knows neither comments nor
 * layout. Stopped previews are kept, too, and go on from where they were.
 */
export class PreviewCache {
  readonly #answers = new Map<string, PreviewAnswer>()
  readonly #parts = new Map<string, PreviewPart>()

  answer(address: string): PreviewAnswer | undefined {
    const known = this.#answers.get(address)
    if (known) putLast(this.#answers, address, known, answersKept)
    return known
  }

  keepAnswer(address: string, answer: PreviewAnswer): void {
    putLast(this.#answers, address, answer, answersKept)
  }

  /** Hands a part over to whoever goes on with it. */
  takePart(address: string): PreviewPart | undefined {
    const part = this.#parts.get(address)
    this.#parts.delete(address)
    return part
  }

  keepPart(address: string, part: PreviewPart): void {
    putLast(this.#parts, address, part, partsKept)
  }
}

function putLast<Value>(map: Map<string, Value>, key: string, value: Value, limit: number): void {
  map.delete(key)
  map.set(key, value)
  for (const oldest of map.keys()) {
    if (map.size <= limit) break
    map.delete(oldest)
  }
}
