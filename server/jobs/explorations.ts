import { randomUUID } from 'node:crypto'
import {
  explorationMinutes,
  type Exploration,
  type ExplorationRequest,
  type ExplorationRows,
} from '../../shared/explorations.ts'
import type { Cell } from '../../shared/outcomes.ts'
import { notFound, Refusal, unprocessable } from '../problems.ts'
import { requireSoundColumns, type SoundColumn } from '../services/columns.ts'
import {
  commitCells,
  commitDrawn,
  openColumns,
  readCells,
  readColumns,
  readExploredCandidates,
  readExploredSample,
} from '../services/exploredSamples.ts'
import { nameOf, openSource, type OpenedSource } from '../services/explorationSources.ts'
import { storeHeights } from '../services/searchCommits.ts'
import type { ExploredCandidate } from '../entities/exploredCandidate.ts'
import { ComputeFailure } from './computePool.ts'
import type { JobParts } from './jobParts.ts'

/** Work of one piece on the interactive thread, which previews share. */
const pieceMilliseconds = 50

/** Candidates handed to the thread at a time; it gives back as many as its time allows. */
const candidatesAtOnce = 200

/** Pause between two reports of one exploration. */
const reportMilliseconds = 150

/** Explorations of one account that are remembered, and those of them that may run. */
const rememberedEach = 8
const runningEach = 3

interface Running {
  readonly accountId: string
  readonly campaignId: string
  readonly opened: OpenedSource
  readonly columns: readonly SoundColumn[]
  /** Identifiers of the stored columns, in the same order. */
  readonly columnIds: readonly string[]
  spent: number
  view: Exploration
}

/** A row with its candidate, as exports and the rows route read them. */
export interface ReadRows {
  readonly candidates: readonly ExploredCandidate[]
  /** Per candidate, in the order of the columns. */
  readonly cells: readonly (readonly Cell[])[]
}

/**
 * Observables over samples, computed in pieces on the interactive thread, each committed as it comes: whoever asks
 * for the same columns of the same sample finds them, and an exploration that was stopped goes on where it was.
 */
export class Explorations {
  readonly #parts: JobParts
  readonly #all = new Map<string, Running>()

  constructor(parts: JobParts) {
    this.#parts = parts
  }

  async start(campaignId: string, accountId: string, request: ExplorationRequest): Promise<Exploration> {
    const columns = requireSoundColumns(request.columns, request.at)
    const { source, writes } = this.#parts
    const inUse = new Set([...this.#all.values()].map(({ opened }) => opened.sampleId))
    const opened = await openSource({ source, writes }, campaignId, request.source, inUse)
    const columnIds = await writes.transaction(async (manager) =>
      (
        await openColumns(
          manager,
          opened.sampleId,
          columns.map(({ hash }) => hash),
        )
      ).map(({ id }) => id),
    )
    const running: Running = {
      accountId,
      campaignId,
      opened,
      columns,
      columnIds,
      spent: 0,
      view: {
        id: randomUUID(),
        state: 'running',
        message: null,
        evaluated: 0,
        ...opened.about,
        at: request.at,
        columns: columns.map(({ view }) => view),
      },
    }
    this.#makeRoom(accountId)
    this.#all.set(running.view.id, running)
    // What is cached already is in the first answer.
    if ((await this.#look(running)) === null) running.view = { ...running.view, state: 'done' }
    else void this.#run(running)
    return running.view
  }

  read(campaignId: string, accountId: string, id: string): Exploration {
    return this.#find(campaignId, accountId, id).view
  }

  /** Ends an exploration; it gets no further than the piece in hand. */
  stop(campaignId: string, accountId: string, id: string): void {
    this.#stop(this.#find(campaignId, accountId, id))
  }

  /** The complete rows from a place on. */
  async rows(campaignId: string, accountId: string, id: string, from: number): Promise<ExplorationRows> {
    const running = this.#find(campaignId, accountId, id)
    const { candidates, cells } = await this.#readRows(running, from)
    const { names } = running.opened
    const places = new Map<string, number>()
    const polytopes: ExplorationRows['polytopes'] = []
    const rows = candidates.map((candidate, at) => {
      const { candidateKey, polytopeKey, island, score } = candidate
      let polytope = places.get(polytopeKey)
      if (polytope === undefined) {
        polytope = polytopes.length
        places.set(polytopeKey, polytope)
        polytopes.push({ key: polytopeKey, ...nameOf(names, polytopeKey) })
      }
      return { candidateKey, polytope, ...(island === null ? {} : { island, score }), cells: [...cells[at]] }
    })
    return { from, polytopes, rows }
  }

  /** Everything an export writes. */
  async table(
    campaignId: string,
    accountId: string,
    id: string,
  ): Promise<ReadRows & Pick<Running, 'view' | 'opened'>> {
    const running = this.#find(campaignId, accountId, id)
    return { ...(await this.#readRows(running, 0)), view: running.view, opened: running.opened }
  }

  /** Stores candidates of an exploration, so that their pages can be opened. */
  async open(campaignId: string, accountId: string, id: string, keys: readonly string[]): Promise<void> {
    const { opened } = this.#find(campaignId, accountId, id)
    const { source, writes, interactive } = this.#parts
    const all = await readExploredCandidates(source.manager, opened.sampleId, 0, Number.MAX_SAFE_INTEGER)
    const byKey = new Map(all.map((row) => [row.candidateKey, row]))
    const candidates = [...new Set(keys)].map((key) => {
      const row = byKey.get(key)
      if (row) return row
      throw unprocessable('not-in-sample', 'The sample holds no such candidate.', {
        path: 'keys',
        found: key,
      })
    })
    const known = await source.manager.query<{ key: string }[]>(
      'SELECT "key" FROM candidate WHERE "key" IN (SELECT value FROM json_each(?))',
      [JSON.stringify(keys)],
    )
    const stored = new Set(known.map(({ key }) => key))
    const missing = candidates.filter(({ candidateKey }) => !stored.has(candidateKey))
    if (missing.length === 0) return
    const { polytopes } = opened
    // One by one: at h11 = 491 each takes 50 ms, and others wait for the same thread.
    for (const { candidateKey, polytopeKey, heights } of missing) {
      const input = { polytopes, candidates: [{ candidateKey, polytopeKey, heights }] }
      const [generic] = await interactive.run('generic-heights', input)
      await writes.transaction((manager) =>
        storeHeights(manager, [{ candidateKey, polytopeKey, heights: generic }]),
      )
    }
  }

  /** Stops everything; the server shuts down. */
  stopAll(): void {
    for (const running of this.#all.values()) this.#stop(running)
  }

  #find(campaignId: string, accountId: string, id: string): Running {
    const running = this.#all.get(id)
    if (running?.campaignId !== campaignId || running.accountId !== accountId) throw notFound('exploration')
    return running
  }

  #stop(running: Running): void {
    if (running.view.state === 'running') this.#report(running, { ...running.view, state: 'stopped' })
  }

  #makeRoom(accountId: string): void {
    const own = [...this.#all.values()].filter((one) => one.accountId === accountId)
    const active = own.filter(({ view }) => view.state === 'running')
    for (const one of active.slice(0, Math.max(0, active.length - runningEach + 1))) this.#stop(one)
    for (const { view } of own.slice(0, Math.max(0, own.length - rememberedEach + 1)))
      this.#all.delete(view.id)
  }

  async #readRows({ opened, columnIds, view }: Running, from: number): Promise<ReadRows> {
    const { manager } = this.#parts.source
    const to = view.evaluated
    if (from >= to) return { candidates: [], cells: [] }
    const candidates = await readExploredCandidates(manager, opened.sampleId, from, to)
    const columns = await Promise.all(columnIds.map((id) => readCells(manager, id, from, to)))
    return { candidates, cells: candidates.map((_, at) => columns.map((column) => column[at])) }
  }

  async #run(running: Running): Promise<void> {
    try {
      let reported = 0
      while (running.view.state === 'running') {
        const next = await this.#look(running)
        if (next === null) return this.#report(running, { ...running.view, state: 'done' })
        if (running.spent > explorationMinutes * 60_000) {
          const message = `Stopped after ${explorationMinutes} minutes of computing. What is there stays; asking again goes on from there.`
          return this.#report(running, { ...running.view, state: 'stopped', message })
        }
        if (Date.now() - reported >= reportMilliseconds) {
          reported = Date.now()
          this.#report(running, running.view)
        }
        running.spent += await next()
      }
    } catch (error) {
      const { closing, log } = this.#parts
      if (closing.aborted) return
      if (!(error instanceof Refusal)) log.error({ err: error }, 'an exploration failed')
      const known = error instanceof Refusal || error instanceof ComputeFailure
      const message = known ? error.message : 'The server made a mistake while it computed these columns.'
      this.#report(running, { ...running.view, state: 'failed', message })
    }
  }

  /** How far the sample and its columns are, and the piece that comes next: null when there is none. */
  async #look(running: Running): Promise<(() => Promise<number>) | null> {
    const { manager } = this.#parts.source
    const { opened, columnIds } = running
    const sample = await readExploredSample(manager, opened.sampleId)
    if (sample === null)
      throw new Refusal(409, 'sample-gone', 'The sample was replaced by a newer one; ask again.')
    const stored = await readColumns(manager, columnIds)
    const evaluated = columnIds.map((id) => stored.get(id)?.evaluated ?? 0)
    const size = sample.ended ? Math.min(opened.about.size, sample.drawn) : opened.about.size
    const ready = Math.min(size, sample.drawn)
    const least = Math.min(...evaluated)
    running.view = { ...running.view, size, evaluated: Math.min(size, least) }
    if (least < ready) {
      const behind = evaluated.flatMap((count, at) => (count === least ? [at] : []))
      const further = evaluated.filter((count) => count > least)
      return () =>
        this.#evaluate(running, behind, least, Math.min(ready, least + candidatesAtOnce, ...further))
    }
    return ready < size ? () => this.#draw(running, sample.state, sample.drawn, size - sample.drawn) : null
  }

  async #evaluate(running: Running, behind: readonly number[], from: number, to: number): Promise<number> {
    const { interactive, writes, source } = this.#parts
    const { opened, columns, columnIds } = running
    const candidates = await readExploredCandidates(source.manager, opened.sampleId, from, to)
    const { cells, milliseconds } = await interactive.run('column-cells', {
      polytopes: opened.polytopes,
      columns: behind.map((at) => columns[at].rule),
      candidates: candidates.map(({ candidateKey, polytopeKey, heights }) => ({
        candidateKey,
        polytopeKey,
        heights,
      })),
    })
    await writes.transaction(async (manager) => {
      for (const [n, at] of behind.entries()) {
        await commitCells(
          manager,
          columnIds[at],
          from,
          cells.map((row) => row[n]),
        )
      }
    })
    return milliseconds
  }

  async #draw(running: Running, state: string | null, drawn: number, wanted: number): Promise<number> {
    const { interactive, writes } = this.#parts
    const { opened } = running
    const { polytopes, sampleId, seed } = opened
    const piece = await interactive.run('draw-sample', {
      polytopes,
      seed,
      state,
      count: wanted,
      milliseconds: pieceMilliseconds,
    })
    await writes.transaction((manager) => commitDrawn(manager, sampleId, drawn, piece))
    return piece.milliseconds
  }

  #report(running: Running, view: Exploration): void {
    running.view = view
    this.#parts.streams.toAccount(running.accountId, { kind: 'exploration', exploration: view })
  }
}
