import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import type { Preview, previewRequestSchema } from '../../shared/targets.ts'
import { notFound, Refusal } from '../problems.ts'
import { requireSoundRule } from '../services/rules.ts'
import { resolveScope } from '../services/scopes.ts'
import { storeCandidates } from '../services/searchCommits.ts'
import { ComputeFailure } from './computePool.ts'
import type { JobParts } from './jobParts.ts'
import type { NullChunkInput, PreviewChunkOutput, PreviewRow } from './nullChunk.ts'
import { SegmentPace } from './pace.ts'
import { previewView, type PreviewRequire } from './previewView.ts'
import { polytopesText, type NullProblem } from './searchProblem.ts'

/** Work of one piece: other previews, imports and dossiers get their turn in between. */
const pieceMilliseconds = 50

/** Pause between two reports of one preview. */
const reportMilliseconds = 150

type PreviewRequest = z.infer<typeof previewRequestSchema>

interface RunningPreview {
  readonly accountId: string
  readonly scoringHash: string
  readonly problem: NullProblem
  readonly requires: readonly PreviewRequire[]
  preview: Preview
}

/** Previews of rules on a null sample: one per account, a new one replaces the old. */
export class Previews {
  readonly #parts: JobParts
  readonly #latest = new Map<string, RunningPreview>()

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  async start(campaignId: string, accountId: string, request: PreviewRequest): Promise<Preview> {
    this.stop(accountId)
    const { scoringHash, rule } = requireSoundRule(request.text)
    const polytopes = await resolveScope(this.#parts.source.manager, campaignId, request.scope)
    // Another request of the same account may have come in between.
    this.stop(accountId)
    const { text, seed, size } = request
    const running: RunningPreview = {
      accountId,
      scoringHash,
      problem: { rule: text, polytopes: polytopesText(polytopes), seed, size },
      requires: rule.requires,
      preview: { ...emptyPreview, id: randomUUID(), size },
    }
    this.#latest.set(accountId, running)
    void this.#run(running)
    return running.preview
  }

  /** The account's latest preview. */
  read(accountId: string, id: string): Preview {
    const running = this.#latest.get(accountId)
    if (running?.preview.id !== id) throw notFound('preview')
    return running.preview
  }

  /** Ends the account's preview, if one is running; it gets no further than the piece in hand. */
  stop(accountId: string): void {
    const running = this.#latest.get(accountId)
    if (running?.preview.state !== 'running') return
    this.#report(running, { ...running.preview, state: 'replaced' })
  }

  async #run(running: RunningPreview): Promise<void> {
    try {
      await this.#evaluate(running)
    } catch (error) {
      const { closing, log } = this.#parts
      if (closing.aborted) return
      if (!(error instanceof Refusal)) log.error({ err: error }, 'a preview failed')
      const known = error instanceof Refusal || error instanceof ComputeFailure
      const message = known ? error.message : 'The server made a mistake while it computed this preview.'
      this.#report(running, { ...running.preview, state: 'failed', message })
    }
  }

  async #evaluate(running: RunningPreview): Promise<void> {
    const { interactive, writes } = this.#parts
    const pace = new SegmentPace(pieceMilliseconds)
    const rows: PreviewRow[] = []
    let state: string | null = null
    let reported = 0
    while (running.preview.state === 'running') {
      const piece: NullChunkInput = { problem: running.problem, state, ...pace.next }
      const output: PreviewChunkOutput = await interactive.run('preview-chunk', piece)
      if (running.preview.state !== 'running') return
      state = output.state
      rows.push(...output.rows)
      pace.note(output.rows.length, performance.now())
      if (!output.done && performance.now() - reported < reportMilliseconds) continue
      reported = performance.now()
      const { view, shown } = previewView(rows, output.summary, running.requires)
      if (output.done) {
        // So that the pages of the candidates shown can be opened.
        const { polytopes } = running.problem
        const finds = await interactive.run('facet-generic-finds', { polytopes, finds: shown })
        await writes.transaction((manager) => storeCandidates(manager, running.scoringHash, finds))
        if (running.preview.state !== 'running') return
      }
      this.#report(running, { ...running.preview, ...view, state: output.done ? 'done' : 'running' })
    }
  }

  #report(running: RunningPreview, preview: Preview): void {
    running.preview = preview
    this.#parts.streams.toAccount(running.accountId, { kind: 'preview', preview })
  }
}

const emptyPreview: Omit<Preview, 'id' | 'size'> = {
  state: 'running',
  message: null,
  evaluated: 0,
  law: '',
  feasible: 0,
  infeasible: 0,
  undefined: 0,
  undefinedReasons: [],
  requires: [],
  histogram: null,
  hit: null,
  cost: { median: null, stages: [] },
  best: [],
  typical: [],
  worst: [],
}
