import { In, type EntityManager } from 'typeorm'
import { wallVersion } from '../../scoring/index.ts'
import type { WallInvariantsView } from '../../shared/relatives.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { CandidateInvariants } from '../entities/candidateInvariants.ts'
import type { CandidateGeometryInput } from '../jobs/compute/candidateGeometry.ts'
import type { ComputedInvariants } from '../jobs/compute/relatives.ts'

/**
 * Candidates somebody has taken an interest in (listed, judged or imported) and whose invariants are
 * missing or of an older version, with what is needed to compute them. Finds of searches are too many; theirs come
 * when a dossier asks for them.
 *
 * @param after keys up to this one are left out: where to go on
 */
export async function candidatesWithoutInvariants(
  manager: EntityManager,
  after: string,
  count: number,
): Promise<CandidateGeometryInput[]> {
  const rows = await manager.query<{ candidateKey: string }[]>(
    `SELECT c."key" AS candidateKey FROM candidate c
     LEFT JOIN candidate_invariants i ON i.candidateKey = c."key" AND i.version = ?
     WHERE c."key" > ? AND i.candidateKey IS NULL AND c."key" IN (
       SELECT candidateKey FROM shortlist_entry
       UNION SELECT candidateKey FROM verdict
       UNION SELECT candidateKey FROM imported_candidate)
     ORDER BY c."key" LIMIT ?`,
    [wallVersion, after, count],
  )
  return readForInvariants(
    manager,
    rows.map(({ candidateKey }) => candidateKey),
  )
}

/** What is needed to compute the invariants of some candidates, ordered by key. */
export async function readForInvariants(
  manager: EntityManager,
  keys: readonly string[],
): Promise<CandidateGeometryInput[]> {
  const candidates = await manager.find(CandidateRecord, {
    where: { key: In([...keys]) },
    relations: { polytope: true },
    order: { key: 'ASC' },
  })
  return candidates.map(({ key, heights, polytope }) => {
    if (!polytope) throw new Error('A candidate was read without its polytope.')
    return { key, heights, vertices: polytope.coordinates }
  })
}

/** Null when they are missing or of another version. */
export async function readInvariants(
  manager: EntityManager,
  candidateKey: string,
): Promise<WallInvariantsView | null> {
  const row = await manager.findOneBy(CandidateInvariants, { candidateKey, version: wallVersion })
  return row?.invariants ?? null
}

export async function storeInvariants(
  manager: EntityManager,
  computed: readonly ComputedInvariants[],
): Promise<void> {
  if (computed.length === 0) return
  await manager.upsert(
    CandidateInvariants,
    computed.map(({ key, invariants }) => ({
      candidateKey: key,
      wallKey: invariants.key,
      version: invariants.version,
      h11: invariants.h11,
      h21: invariants.h21,
      invariants,
    })),
    ['candidateKey'],
  )
}
