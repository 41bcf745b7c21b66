import type { EntityManager, SelectQueryBuilder } from 'typeorm'
import type { PolytopeNumberName } from '../../shared/polytopeNumbers.ts'
import type { PolytopeFilter } from '../../shared/polytopes.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import { notFound } from '../problems.ts'
import { applyFilter, numberColumn } from './polytopeFilter.ts'
import { mayBeSeen, visibleNames, type Viewer } from './visibility.ts'

export type { Viewer } from './visibility.ts'

/** A polytope with the name the viewer's campaign gave it, if it did. */
export interface NamedPolytope {
  readonly polytope: PolytopeRecord
  readonly name: string
}

export interface PolytopeOrder {
  readonly sort: PolytopeNumberName | 'name'
  readonly order: 'asc' | 'desc'
  readonly offset: number
  readonly limit: number
}

/** A page of the library as the viewer may see it, and how many polytopes the filter matches. */
export async function listPolytopes(
  manager: EntityManager,
  viewer: Viewer,
  filter: PolytopeFilter,
  { sort, order, offset, limit }: PolytopeOrder,
): Promise<{ total: number; rows: NamedPolytope[] }> {
  const direction = order === 'asc' ? 'ASC' : 'DESC'
  const query = visible(manager, viewer, filter)
  const total = await query.getCount()
  const column = sort === 'name' ? 'polytope.name' : numberColumn(sort)
  // What is not known yet stands at the end either way.
  const ordered = query.clone().orderBy(column, direction, 'NULLS LAST')
  for (const next of ['h11', 'h21', 'key'].filter((column) => column !== sort)) {
    ordered.addOrderBy(`polytope.${next}`, 'ASC')
  }
  const polytopes = await ordered.offset(offset).limit(limit).getMany()
  const names = await ownNames(manager, viewer, polytopes)
  return {
    total,
    rows: polytopes.map((polytope) => ({ polytope, name: names.get(polytope.key) ?? polytope.name })),
  }
}

/** How many of the matching polytopes stand at each pair of Hodge numbers. */
export function countByHodge(
  manager: EntityManager,
  viewer: Viewer,
  filter: PolytopeFilter,
): Promise<{ h11: number; h21: number; count: number }[]> {
  return visible(manager, viewer, filter)
    .select('polytope.h11', 'h11')
    .addSelect('polytope.h21', 'h21')
    .addSelect('COUNT(*)', 'count')
    .groupBy('polytope.h11')
    .addGroupBy('polytope.h21')
    .orderBy('polytope.h11')
    .addOrderBy('polytope.h21')
    .getRawMany()
}

/** @throws Refusal 404 when it does not exist, or only in campaigns the viewer does not belong to */
export async function readPolytope(
  manager: EntityManager,
  viewer: Viewer,
  key: string,
): Promise<NamedPolytope> {
  const polytope = await visible(manager, viewer, {}).andWhere('polytope.key = :key', { key }).getOne()
  if (polytope === null) throw notFound('polytope')
  const names = await ownNames(manager, viewer, [polytope])
  return { polytope, name: names.get(key) ?? polytope.name }
}

/** The query of everything a viewer may see that matches a filter. */
export function visible(
  manager: EntityManager,
  viewer: Viewer,
  filter: PolytopeFilter,
): SelectQueryBuilder<PolytopeRecord> {
  const query = manager.createQueryBuilder(PolytopeRecord, 'polytope').where(mayBeSeen(viewer), viewer)
  applyFilter(query, viewer, filter)
  return query
}

/** Names under which the viewer sees imported polytopes: those of the viewer's campaigns, else a published one. */
export async function ownNames(
  manager: EntityManager,
  viewer: Viewer,
  polytopes: readonly Pick<PolytopeRecord, 'key' | 'origin'>[],
): Promise<Map<string, string>> {
  const keys = polytopes.filter(({ origin }) => origin === 'imported').map(({ key }) => key)
  if (keys.length === 0) return new Map()
  const rows = await manager
    .createQueryBuilder()
    .select(['names.polytopeKey AS polytopeKey', 'names.name AS name'])
    .from(`(${visibleNames(viewer)})`, 'names')
    .where('names.polytopeKey IN (:...keys)', { ...viewer, keys })
    .orderBy('names.own', 'ASC')
    .getRawMany<{ polytopeKey: string; name: string }>()
  // The viewer's own come last, and stay.
  return new Map(rows.map(({ polytopeKey, name }) => [polytopeKey, name]))
}
