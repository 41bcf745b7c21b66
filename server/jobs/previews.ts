import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import type { Preview, previewRequestSchema } from '../../shared/targets.ts'
import { notFound, Refusal } from '../problems.ts'
import { requireSoundRule } from '../services/rules.ts'
import { RecentResults } from '../services/recentResults.ts'
import { scopeHash, scopeKeys } from '../services/scopes.ts'
import { storeCandidates } from '../services/searchCommits.ts'
import { ComputeFailure } from './computePool.ts'
import type { JobParts } from './jobParts.ts'
import type { NullChunkInput, PreviewChunkOutput, PreviewRow } from './nullChunk.ts'
import { SegmentPace } from './pace.ts'
import { previewView, type PreviewRequire } from './previewView.ts'
import { polytopesText, readPolytopes, type NullProblem } from './searchProblem.ts'
import { previewAddress, PreviewCache } from './previewCache.ts'

/** Work of one piece: other previews, imports and dossiers get their turn in between. */
const pieceMilliseconds = 50

/** Pause between two reports of one preview. */
const reportMilliseconds = 150

type PreviewRequest = z.infer<typeof previewRequestSchema>

interface RunningPreview {
  readonly accountId: string
  readonly scoringHash: string
  readonly address: string
  readonly problem: NullProblem
  readonly requires: readonly PreviewRequire[]
  preview: Preview
}

/** Previews of rules on a null sample: one per account, a new one replaces the old. */
export class Previews {
  readonly #parts: JobParts
  readonly #latest = new Map<string, RunningPreview>()
  readonly #cache = new PreviewCache()
  readonly #scopes = new RecentResults<string>(6)

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  async start(campaignId: string, accountId: string, request: PreviewRequest): Promise<Preview> {
    this.stop(accountId)
    const { scoringHash, rule } = requireSoundRule(request.text)
    const { source } = this.#parts
    const keys = await scopeKeys(source.manager, campaignId, request.scope)
    const { seed, size } = request
    const scope = scopeHash(keys)
    const address = previewAddress({ scoringHash, scopeHash: scope, size, seed })
    const polytopes = this.#cache.answer(address)
      ? ''
      : await this.#scopes.get(scope, async () => polytopesText(await readPolytopes(source, keys)))
    // Another request of the same account may have come in between.
    this.stop(accountId)
    const running: RunningPreview = {
      accountId,
      scoringHash,
      address,
      // Comments and layout stay behind, so that places in reasons do not depend on who asked first.
      problem: { rule: rule.canonical, polytopes, seed, size },
      requires: rule.requires,
      preview: { ...emptyPreview, size, ...this.#cache.answer(address), id: randomUUID(), message: null },
    }
    this.#latest.set(accountId, running)
    if (running.preview.state === 'running') void this.#run(running)
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
    const { address, problem, requires, scoringHash } = running
    const pace = new SegmentPace(pieceMilliseconds)
    const before = this.#cache.takePart(address)
    const rows: PreviewRow[] = before?.rows ?? []
    let state: string | null = before?.state ?? null
    let reported = 0
    if (before)
      this.#report(running, { ...running.preview, ...previewView(rows, before.summary, requires).view })
    while (running.preview.state === 'running') {
      const piece: NullChunkInput = { problem, state, ...pace.next }
      const { summary, done, ...output }: PreviewChunkOutput = await interactive.run('preview-chunk', piece)
      state = output.state
      rows.push(...output.rows)
      if (running.preview.state !== 'running') return this.#cache.keepPart(address, { rows, state, summary })
      pace.note(output.rows.length, performance.now())
      if (!done && performance.now() - reported < reportMilliseconds) continue
      reported = performance.now()
      const { view, shown } = previewView(rows, summary, requires)
      if (done) {
        // So that the pages of the candidates shown can be opened.
        const { polytopes } = problem
        const finds = await interactive.run('facet-generic-finds', { polytopes, finds: shown })
        await writes.transaction((manager) => storeCandidates(manager, scoringHash, finds))
        this.#cache.keepAnswer(address, { ...view, state: 'done' })
        if (running.preview.state !== 'running') return
      }
      this.#report(running, { ...running.preview, ...view, state: done ? 'done' : 'running' })
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
