import { reportOnRule, type RuleReport } from '../../../scoring/index.ts'

type Tell = (report: RuleReport) => void

interface Asked {
  readonly text: string
  readonly tell: Tell
}

/** Checks texts on a thread of its own, one at a time; of those that wait only the newest is checked. */
export class RuleReports {
  readonly #worker: Worker | null
  #running: Asked | null = null
  #waiting: Asked | null = null

  constructor(worker: Worker | null) {
    this.#worker = worker
    worker?.addEventListener('message', ({ data }: MessageEvent<RuleReport>) => this.#answer(data))
  }

  /** Tells the report on a text, unless a newer one was asked for before its turn came. */
  ask(text: string, tell: Tell): void {
    this.#waiting = { text, tell }
    if (this.#running === null) this.#next()
  }

  /** Nothing is told any more. */
  close(): void {
    this.#waiting = null
    this.#running = null
    this.#worker?.terminate()
  }

  #next(): void {
    this.#running = this.#waiting
    this.#waiting = null
    const asked = this.#running
    if (asked === null) return
    if (this.#worker) this.#worker.postMessage(asked.text)
    else queueMicrotask(() => this.#answer(reportOnRule(asked.text)))
  }

  #answer(report: RuleReport): void {
    const asked = this.#running
    this.#running = null
    if (asked !== null && this.#waiting === null) asked.tell(report)
    if (this.#waiting !== null) this.#next()
  }
}

/** With a thread of its own where there are such. */
export function openRuleReports(): RuleReports {
  if (typeof Worker === 'undefined') return new RuleReports(null)
  return new RuleReports(new Worker(new URL('./checkWorker.ts', import.meta.url), { type: 'module' }))
}
