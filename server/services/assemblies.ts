import type { EntityManager } from 'typeorm'
import { assemble, wallVersion, type Assembly, type Contender } from '../../scoring/index.ts'
import {
  reportColumn,
  scoreColumn,
  type AssemblyCounts,
  type AssemblySettings,
} from '../../shared/assemblies.ts'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { Search } from '../entities/search.ts'
import type { AssembleInput } from '../jobs/compute/assembleShortlist.ts'
import type { ComputePool } from '../jobs/computePool.ts'
import { unprocessable } from '../problems.ts'
import { comparable } from './finds.ts'

/** A candidate that may come into a list. */
export interface Entrant {
  readonly candidateKey: string
  readonly polytopeKey: string
  /** The search that found it first in the order of the searches; null: imported. */
  readonly searchId: string | null
}

export interface ScoredEntrant extends Entrant {
  readonly outcome: OutcomeView
}

/** The finds of searches, once each; `finds` counts them with repetitions. */
export async function findsOf(
  manager: EntityManager,
  searches: readonly Pick<Search, 'id'>[],
): Promise<{ finds: number; entrants: Entrant[] }> {
  const order = new Map(searches.map(({ id }, place) => [id, place]))
  const rows = await manager.query<(Entrant & { searchId: string })[]>(
    `SELECT f.candidateKey AS candidateKey, c.polytopeKey AS polytopeKey, f.searchId AS searchId
     FROM find f JOIN candidate c ON c."key" = f.candidateKey
     WHERE f.searchId IN (SELECT value FROM json_each(?))
     ORDER BY f.candidateKey`,
    [JSON.stringify([...order.keys()])],
  )
  rows.sort((a, b) => (order.get(a.searchId) ?? 0) - (order.get(b.searchId) ?? 0))
  const distinct = new Map<string, Entrant>()
  for (const row of rows) if (!distinct.has(row.candidateKey)) distinct.set(row.candidateKey, row)
  return { finds: rows.length, entrants: [...distinct.values()] }
}

/** Those of the entrants that have a value under a scoring hash, with it. */
export async function scoredEntrants(
  manager: EntityManager,
  scoringHash: string,
  entrants: readonly Entrant[],
): Promise<ScoredEntrant[]> {
  const rows = await manager.query<{ candidateKey: string; outcome: string }[]>(
    `SELECT candidateKey, outcome FROM candidate_value
     WHERE scoringHash = ? AND candidateKey IN (SELECT value FROM json_each(?))`,
    [scoringHash, keyList(entrants)],
  )
  const outcomes = new Map(rows.map(({ candidateKey, outcome }) => [candidateKey, outcome]))
  return entrants.flatMap((entrant) => {
    const text = outcomes.get(entrant.candidateKey)
    return text === undefined ? [] : [{ ...entrant, outcome: JSON.parse(text) as OutcomeView }]
  })
}

const keyList = (entrants: readonly Entrant[]) =>
  JSON.stringify(entrants.map(({ candidateKey }) => candidateKey))

/** A list as it was drawn. */
export interface DrawnList {
  readonly chosen: readonly (ScoredEntrant & { readonly front: number | null })[]
  readonly counts: AssemblyCounts
}

/**
 * Draws a list. Only the difference of classes needs geometry: then the work is done on a thread of the pool.
 *
 * @param columns report columns of the rule that gave the outcomes
 * @throws Refusal 422 when the fronts name a column that the rule does not have
 */
export async function drawList(
  { manager, pool }: { readonly manager: EntityManager; readonly pool: ComputePool },
  drawn: { readonly finds: number; readonly broken: number; readonly entrants: readonly ScoredEntrant[] },
  settings: AssemblySettings,
  columns: readonly string[],
  signal?: AbortSignal,
): Promise<DrawnList> {
  requireColumns(settings, columns)
  const byKey = new Map(drawn.entrants.map((entrant) => [entrant.candidateKey, entrant]))
  const entrants = [...byKey.values()]
  const invariants = await knownInvariants(manager, entrants)
  const contenders = entrants.map((entrant): Contender => ({
    key: entrant.candidateKey,
    polytopeKey: entrant.polytopeKey,
    outcome: comparable(entrant.outcome),
    invariantKey: invariants.get(entrant.candidateKey),
    columns: settings.pareto?.map(({ column }) => valueIn(entrant.outcome, column)),
  }))
  const rule = {
    size: settings.size,
    feasibleOnly: settings.feasibleOnly,
    pareto: settings.pareto?.map(({ direction }) => direction),
    perPolytope: settings.perPolytope ?? undefined,
    perInvariants: settings.perInvariants ?? undefined,
  }
  const result =
    settings.apart === null
      ? outcomeOf(assemble(contenders, rule))
      : await pool.run(
          'assemble-shortlist',
          { contenders, rule, apart: settings.apart, ...(await geometryOf(manager, entrants)) },
          { signal },
        )
  return {
    chosen: result.chosen.flatMap(({ key, front }) => {
      const entrant = byKey.get(key)
      return entrant ? [{ ...entrant, front }] : []
    }),
    counts: {
      finds: drawn.finds,
      distinct: result.distinct + drawn.broken,
      leftOut: { ...result.leftOut, broken: drawn.broken },
      withoutInvariants: result.withoutInvariants,
      firstFront: result.firstFront,
    },
  }
}

/** The same without the contenders' contents, as it comes back from a thread. */
export function outcomeOf({ chosen, ...rest }: Assembly<Contender>) {
  return { ...rest, chosen: chosen.map(({ contender, front }) => ({ key: contender.key, front })) }
}

function requireColumns({ pareto }: AssemblySettings, columns: readonly string[]): void {
  const known = [scoreColumn, ...columns.map(reportColumn)]
  for (const [at, { column }] of (pareto ?? []).entries()) {
    if (known.includes(column)) continue
    throw unprocessable('no-such-column', `The rule reports no “${column}”; it has ${known.join(', ')}.`, {
      path: `pareto.${at}.column`,
      found: column,
    })
  }
}

/** Truth values count as 0 and 1; whatever has no value is null. */
function valueIn(outcome: OutcomeView, column: string): number | null {
  if (outcome.kind !== 'feasible') return null
  if (column === scoreColumn) return outcome.score
  const cell = outcome.report[column.slice(reportColumn('').length)]
  return typeof cell === 'number' || typeof cell === 'boolean' ? Number(cell) : null
}

export async function knownInvariants(
  manager: EntityManager,
  entrants: readonly Entrant[],
): Promise<Map<string, string>> {
  const rows = await manager.query<{ candidateKey: string; wallKey: string }[]>(
    `SELECT candidateKey, wallKey FROM candidate_invariants
     WHERE version = ? AND candidateKey IN (SELECT value FROM json_each(?))`,
    [wallVersion, keyList(entrants)],
  )
  return new Map(rows.map(({ candidateKey, wallKey }) => [candidateKey, wallKey]))
}

async function geometryOf(
  manager: EntityManager,
  entrants: readonly Entrant[],
): Promise<Pick<AssembleInput, 'heights' | 'polytopes'>> {
  const heights = await manager.query<{ key: string; heights: string }[]>(
    `SELECT "key", heights FROM candidate WHERE "key" IN (SELECT value FROM json_each(?))`,
    [keyList(entrants)],
  )
  const polytopes = await manager.query<{ key: string; coordinates: string }[]>(
    `SELECT "key", coordinates FROM polytope WHERE "key" IN (SELECT value FROM json_each(?))`,
    [JSON.stringify([...new Set(entrants.map(({ polytopeKey }) => polytopeKey))])],
  )
  return {
    heights: Object.fromEntries(heights.map(({ key, heights }) => [key, heights])),
    polytopes: Object.fromEntries(polytopes.map(({ key, coordinates }) => [key, coordinates])),
  }
}
