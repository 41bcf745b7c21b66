import type { DataSource } from 'typeorm'
import { In } from 'typeorm'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { Search } from '../entities/search.ts'

/** A polytope as the worker threads take it. */
export interface ProblemPolytope {
  readonly key: string
  /** Number of its points. */
  readonly points: number
  /** Vertices in normal-form coordinates. */
  readonly vertices: readonly number[][]
}

/** All that a worker needs to know of a search: plain data, the same for every segment. */
export interface SearchProblem {
  readonly rule: string
  /** By ascending key. */
  readonly polytopes: readonly ProblemPolytope[]
  readonly method: string
  readonly seed: number
  /** Evaluations of this island. */
  readonly budget: number
  readonly island: number
  readonly keep: number
}

/** The polytopes of a scope, in the order of `keys`. */
export async function readProblemPolytopes(
  source: DataSource,
  keys: readonly string[],
): Promise<ProblemPolytope[]> {
  const found = new Map<string, ProblemPolytope>()
  // SQLite takes a limited number of parameters in one statement.
  for (let from = 0; from < keys.length; from += 5_000) {
    const rows = await source.manager.find(PolytopeRecord, {
      select: { key: true, points: true, coordinates: true },
      where: { key: In(keys.slice(from, from + 5_000)) },
    })
    for (const { key, points, coordinates } of rows) found.set(key, { key, points, vertices: coordinates })
  }
  return keys.map((key) => {
    const polytope = found.get(key)
    if (!polytope) throw new Error(`Polytope ${key} of a scope is not in the library any more.`)
    return polytope
  })
}

/** The budget over all islands, shared as evenly as whole numbers allow. */
export function islandBudget(
  { budget, islands }: Pick<Search, 'budget' | 'islands'>,
  island: number,
): number {
  return Math.floor(budget / islands) + (island < budget % islands ? 1 : 0)
}
