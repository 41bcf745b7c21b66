import { In, type DataSource } from 'typeorm'
import type { MethodSettings } from '../../shared/searchRunning.ts'
import { PolytopeRecord } from '../entities/polytope.ts'

/** What candidates are drawn from, and by what they are judged: plain data for the worker threads. */
export interface ScoredScope {
  readonly rule: string
  /**
   * The polytopes by ascending key, as JSON text of `{ key, vertices }`. Text crosses between threads at the cost of
   * a copy, while ten thousand small lists would hold up the web side at every segment.
   */
  readonly polytopes: string
}

/** All that a worker needs to know of a search, the same for every segment of an island. */
export interface SearchProblem extends ScoredScope {
  readonly method: string
  readonly seed: number
  readonly island: number
  /** Over all islands; the engine gives each its share. */
  readonly settings: MethodSettings & {
    /** Before any extension. */
    readonly budget: number
    readonly islands: number
    readonly keep: number
    readonly surrogate: boolean
  }
  /** Candidates to begin from, as JSON text of `GivenStart[]`, for the same reason as `polytopes`. */
  readonly starts: string
  /** Budgets added since. */
  readonly extensions: readonly number[]
}

/** A null sample or preview: the candidates are drawn by the engine's null law. */
export interface NullProblem extends ScoredScope {
  readonly seed: number
  readonly size: number
}

/** The polytopes as `ScoredScope` takes them. */
export function polytopesText(polytopes: readonly Pick<PolytopeRecord, 'key' | 'coordinates'>[]): string {
  return JSON.stringify(polytopes.map(({ key, coordinates }) => ({ key, vertices: coordinates })))
}

/** The polytopes of a scope, in the order of `keys`. */
export async function readPolytopes(source: DataSource, keys: readonly string[]): Promise<PolytopeRecord[]> {
  const found = new Map<string, PolytopeRecord>()
  // SQLite takes a limited number of parameters in one statement.
  for (let from = 0; from < keys.length; from += 5_000) {
    const rows = await source.manager.findBy(PolytopeRecord, { key: In(keys.slice(from, from + 5_000)) })
    for (const row of rows) found.set(row.key, row)
  }
  return keys.map((key) => {
    const polytope = found.get(key)
    if (!polytope) throw new Error(`Polytope ${key} of a scope is not in the library any more.`)
    return polytope
  })
}
