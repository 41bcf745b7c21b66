import { In, type EntityManager } from 'typeorm'
import { Verdict } from '../entities/verdict.ts'
import type { Tally } from '../presenters/shortlists.ts'
import type { Standing } from './secondReading.ts'

export const verdictWords = {
  author: true,
  restores: { author: true },
  targetVersion: { target: true },
} as const

/** Entries in the order in which they were given, with all that is shown of them. */
export function verdictsById(manager: EntityManager, ids: readonly number[]): Promise<Verdict[]> {
  return manager.find(Verdict, { where: { id: In([...ids]) }, relations: verdictWords, order: { id: 'ASC' } })
}

/** Rows per statement: SQLite takes a limited number of values in one. */
const rowsPerInsert = 500

/** Adds entries in their order; returns their numbers. Inside a transaction. */
export async function insertVerdicts(
  manager: EntityManager,
  entries: readonly Partial<Verdict>[],
): Promise<number[]> {
  const [{ last }] = await manager.query<{ last: number }[]>(
    'SELECT COALESCE(MAX(id), 0) AS last FROM verdict',
  )
  for (let from = 0; from < entries.length; from += rowsPerInsert) {
    await manager.insert(Verdict, entries.slice(from, from + rowsPerInsert))
  }
  const rows = await manager.query<{ id: number }[]>('SELECT id FROM verdict WHERE id > ? ORDER BY id', [
    last,
  ])
  return rows.map(({ id }) => id)
}

/** @param entry the latest of its candidate, with its words loaded */
export function standingEntry(entry: Verdict): Standing {
  const { author, authorId } = entry.restores ?? entry
  return {
    value: entry.value,
    readers: entry.readers,
    author: { id: authorId, name: author?.name ?? '' },
    targetVersionId: entry.targetVersionId,
  }
}

/** All verdicts of the campaign on a candidate, newest first. */
export function listVerdicts(
  manager: EntityManager,
  campaignId: string,
  candidateKey: string,
): Promise<Verdict[]> {
  return manager.find(Verdict, {
    where: { campaignId, candidateKey },
    relations: verdictWords,
    order: { id: 'DESC' },
  })
}

/** The verdict that counts, per candidate, for one target in one campaign. */
export async function latestVerdicts(
  manager: EntityManager,
  campaignId: string,
  targetId: string,
  candidateKeys: readonly string[],
): Promise<Map<string, Verdict>> {
  const verdicts = await manager.find(Verdict, {
    where: { campaignId, targetVersion: { targetId }, candidateKey: In([...candidateKeys]) },
    relations: verdictWords,
    order: { id: 'ASC' },
  })
  return new Map(verdicts.map((verdict) => [verdict.candidateKey, verdict]))
}

/** Size and decisions of every shortlist of some campaigns. */
export async function tallyShortlists(
  manager: EntityManager,
  campaignIds: readonly string[],
): Promise<Map<string, Tally>> {
  const places = campaignIds.map(() => '?').join(', ')
  const rows = await manager.query<(Omit<Tally, 'waiting'> & { id: string })[]>(
    `WITH latest AS (
       SELECT MAX(v.id) AS id
       FROM verdict v JOIN target_version t ON t.id = v.targetVersionId
       WHERE v.campaignId IN (${places})
       GROUP BY v.campaignId, v.candidateKey, t.targetId
     ),
     word AS (
       SELECT v.campaignId, v.candidateKey, t.targetId,
         CASE WHEN v.value = 'verified' AND json_array_length(v.readers) = 1 THEN 'one-reader' ELSE v.value END
           AS value
       FROM latest JOIN verdict v ON v.id = latest.id JOIN target_version t ON t.id = v.targetVersionId
     )
     SELECT s.id AS id, COUNT(*) AS size,
       COALESCE(SUM(w.value = 'verified'), 0) AS verified,
       COALESCE(SUM(w.value = 'rejected'), 0) AS rejected,
       COALESCE(SUM(w.value = 'one-reader'), 0) AS oneReader
     FROM shortlist s
     JOIN target_version st ON st.id = s.targetVersionId
     JOIN shortlist_entry e ON e.shortlistId = s.id
     LEFT JOIN word w
       ON w.campaignId = s.campaignId AND w.candidateKey = e.candidateKey AND w.targetId = st.targetId
     WHERE s.campaignId IN (${places})
     GROUP BY s.id`,
    [...campaignIds, ...campaignIds],
  )
  const waiting = await waitingFor(manager, campaignIds)
  return new Map(rows.map(({ id, ...tally }) => [id, { ...tally, waiting: waiting.get(id) ?? [] }]))
}

/** Per shortlist to whom undecided candidates are assigned, most first. */
async function waitingFor(
  manager: EntityManager,
  campaignIds: readonly string[],
): Promise<Map<string, Tally['waiting']>> {
  const rows = await manager.query<{ shortlistId: string; id: string; name: string; open: number }[]>(
    `SELECT s.id AS shortlistId, p.id AS id, p.name AS name, COUNT(*) AS open
     FROM assignment a
     JOIN account p ON p.id = a.reviewerId
     JOIN target_version t ON t.targetId = a.targetId
     JOIN shortlist s ON s.targetVersionId = t.id
     JOIN shortlist_entry e ON e.shortlistId = s.id AND e.candidateKey = a.candidateKey
     LEFT JOIN verdict v ON v.id = (
       SELECT MAX(w.id) FROM verdict w JOIN target_version u ON u.id = w.targetVersionId
       WHERE w.campaignId = a.campaignId AND w.candidateKey = a.candidateKey AND u.targetId = a.targetId)
     WHERE a.campaignId IN (${campaignIds.map(() => '?').join(', ')})
       AND (v.id IS NULL OR v.value = 'undecided'
         OR (v.value = 'verified' AND json_array_length(v.readers) = 1))
     GROUP BY s.id, p.id ORDER BY open DESC, p.name`,
    [...campaignIds],
  )
  const waiting = new Map<string, Tally['waiting']>()
  for (const { shortlistId, ...one } of rows) {
    waiting.set(shortlistId, [...(waiting.get(shortlistId) ?? []), one])
  }
  return waiting
}
