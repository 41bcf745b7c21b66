import { randomUUID } from 'node:crypto'
import { In, LessThan, type EntityManager } from 'typeorm'
import { engineVersion, feasibleKind, nullLaw } from '../../scoring/index.ts'
import type { Cell } from '../../shared/outcomes.ts'
import { ExploredCandidate } from '../entities/exploredCandidate.ts'
import { ExploredCells } from '../entities/exploredCells.ts'
import { ExploredColumn } from '../entities/exploredColumn.ts'
import { ExploredSample } from '../entities/exploredSample.ts'
import type { Search } from '../entities/search.ts'
import type { DrawnPiece } from '../jobs/compute/exploreSample.ts'
import { unprocessable } from '../problems.ts'

/** Samples that are kept; one at h11 = 491 may take 6 MB. */
const keptSamples = 40

/** The sample drawn from a scope with a seed, begun when there is none. */
export async function openNullSampleToExplore(
  manager: EntityManager,
  { scopeHash, seed }: { readonly scopeHash: string; readonly seed: number },
  inUse: ReadonlySet<string>,
): Promise<ExploredSample> {
  const address = `null:${nullLaw.name}:${engineVersion}:${scopeHash}:${seed}`
  return (await touched(manager, address)) ?? begin(manager, { address, searchId: null, ended: false }, inUse)
}

/**
 * The uniform sample of a search's evaluations as it stands now, written down: a search that goes on replaces rows.
 * Older ones of the same search go, but for those that somebody is looking at.
 *
 * @throws Refusal for a search of a time when samples were kept without heights, and one without evaluations
 */
export async function snapshotSearchSample(
  manager: EntityManager,
  search: Pick<Search, 'id' | 'evaluations'>,
  inUse: ReadonlySet<string>,
): Promise<ExploredSample> {
  const address = `search:${search.id}:${search.evaluations}`
  const known = await touched(manager, address)
  if (known !== null) return known
  const older = await manager.findBy(ExploredSample, { searchId: search.id })
  await remove(
    manager,
    older.filter(({ id }) => !inUse.has(id)),
  )
  const sample = await begin(manager, { address, searchId: search.id, ended: true }, inUse)
  await manager.query(
    `INSERT INTO explored_candidate (sampleId, place, candidateKey, polytopeKey, heights, island, score)
     SELECT ?, ROW_NUMBER() OVER (ORDER BY island, place) - 1, candidateKey, polytopeKey, heights, island,
       CASE WHEN kind = ? THEN value END
     FROM search_sample WHERE searchId = ?`,
    [sample.id, feasibleKind, search.id],
  )
  const drawn = await manager.countBy(ExploredCandidate, { sampleId: sample.id })
  if (drawn === 0) {
    throw unprocessable(
      'no-sample',
      search.evaluations === 0
        ? 'This search has not evaluated any candidate yet.'
        : 'This search ran before samples were kept with heights; start it again to get one.',
      { path: 'source.search' },
    )
  }
  await manager.update(ExploredSample, { id: sample.id }, { drawn })
  return { ...sample, drawn }
}

async function touched(manager: EntityManager, address: string): Promise<ExploredSample | null> {
  const known = await manager.findOneBy(ExploredSample, { address })
  if (known !== null) await manager.update(ExploredSample, { id: known.id }, { usedAt: Date.now() })
  return known
}

async function begin(
  manager: EntityManager,
  about: Pick<ExploredSample, 'address' | 'searchId' | 'ended'>,
  inUse: ReadonlySet<string>,
): Promise<ExploredSample> {
  const old = await manager.find(ExploredSample, {
    select: { id: true },
    order: { usedAt: 'DESC' },
    skip: keptSamples - 1,
    take: 1_000,
  })
  await remove(
    manager,
    old.filter(({ id }) => !inUse.has(id)),
  )
  const sample = { ...about, id: randomUUID(), state: null, drawn: 0, usedAt: Date.now() }
  await manager.insert(ExploredSample, sample)
  return sample
}

async function remove(manager: EntityManager, samples: readonly { readonly id: string }[]): Promise<void> {
  if (samples.length > 0) await manager.delete(ExploredSample, { id: In(samples.map(({ id }) => id)) })
}

export const readExploredSample = (manager: EntityManager, id: string): Promise<ExploredSample | null> =>
  manager.findOneBy(ExploredSample, { id })

/** Adds candidates to a sample that still held `before`; false when another exploration was faster. */
export async function commitDrawn(
  manager: EntityManager,
  sampleId: string,
  before: number,
  { state, rows, ended }: DrawnPiece,
): Promise<boolean> {
  const { affected } = await manager.update(
    ExploredSample,
    { id: sampleId, drawn: before },
    { state: ended ? null : state, drawn: before + rows.length, ended },
  )
  if (affected === 0) return false
  await manager.query(
    `INSERT INTO explored_candidate (sampleId, place, candidateKey, polytopeKey, heights)
     SELECT ?, ? + key, value ->> 0, value ->> 1, value ->> 2 FROM json_each(?)`,
    [sampleId, before, JSON.stringify(rows.map((row) => [row.candidateKey, row.polytopeKey, row.heights]))],
  )
  return true
}

/** The candidates at the places from `from` to before `to`. */
export function readExploredCandidates(
  manager: EntityManager,
  sampleId: string,
  from: number,
  to: number,
): Promise<ExploredCandidate[]> {
  return manager
    .createQueryBuilder(ExploredCandidate, 'row')
    .where('row.sampleId = :sampleId AND row.place >= :from AND row.place < :to', { sampleId, from, to })
    .orderBy('row.place', 'ASC')
    .getMany()
}

/** The columns of a sample with these expressions, in order, begun where there are none. */
export async function openColumns(
  manager: EntityManager,
  sampleId: string,
  expressionHashes: readonly string[],
): Promise<ExploredColumn[]> {
  const known = await manager.findBy(ExploredColumn, { sampleId, expressionHash: In([...expressionHashes]) })
  const columns: ExploredColumn[] = []
  for (const expressionHash of expressionHashes) {
    let column = known.find((one) => one.expressionHash === expressionHash)
    if (column === undefined) {
      column = manager.create(ExploredColumn, { id: randomUUID(), sampleId, expressionHash, evaluated: 0 })
      await manager.insert(ExploredColumn, column)
    }
    columns.push(column)
  }
  return columns
}

/** The same columns as they are now. */
export async function readColumns(
  manager: EntityManager,
  ids: readonly string[],
): Promise<Map<string, ExploredColumn>> {
  const columns = await manager.findBy(ExploredColumn, { id: In([...ids]) })
  return new Map(columns.map((column) => [column.id, column]))
}

/** Adds cells to a column that still had `before`; what another exploration has computed meanwhile is the same. */
export async function commitCells(
  manager: EntityManager,
  columnId: string,
  before: number,
  cells: readonly Cell[],
): Promise<void> {
  const evaluated = before + cells.length
  const { affected } = await manager.update(
    ExploredColumn,
    { id: columnId, evaluated: before },
    { evaluated },
  )
  if (affected === 0) return
  await manager.insert(ExploredCells, { columnId, first: before, cells: [...cells] })
}

/** The cells of a column at the places from `from` to before `to`. */
export async function readCells(
  manager: EntityManager,
  columnId: string,
  from: number,
  to: number,
): Promise<Cell[]> {
  const pieces = await manager.find(ExploredCells, {
    where: { columnId, first: LessThan(to) },
    order: { first: 'ASC' },
  })
  return pieces.flatMap(({ first, cells }) => cells.slice(Math.max(0, from - first), Math.max(0, to - first)))
}
