import type { EntityManager, SelectQueryBuilder } from 'typeorm'
import type { PolytopeFilter } from '../../shared/polytopes.ts'
import { CampaignPolytope } from '../entities/campaignPolytope.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import { notFound } from '../problems.ts'

/** Whose imports are visible beside the bundled polytopes: one campaign's, or those of an account's campaigns. */
export type Viewer = { readonly campaignId: string } | { readonly accountId: string }

/** A polytope with the name the viewer's campaign gave it, if it did. */
export interface NamedPolytope {
  readonly polytope: PolytopeRecord
  readonly name: string
}

export interface PolytopeOrder {
  readonly sort: 'h11' | 'h21' | 'points' | 'vertices' | 'facets' | 'symmetryOrder' | 'name'
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
  const ordered = query.clone().orderBy(`polytope.${sort}`, direction)
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
  const query = manager.createQueryBuilder(PolytopeRecord, 'polytope')
  const imports =
    'campaignId' in viewer
      ? 'SELECT i.polytopeKey FROM campaign_polytope i WHERE i.campaignId = :campaignId'
      : `SELECT i.polytopeKey FROM campaign_polytope i JOIN membership m ON m.campaignId = i.campaignId
         WHERE m.accountId = :accountId`
  query.where(`(polytope.origin = 'bundled' OR polytope.key IN (${imports}))`, viewer)
  const bounds = [
    ['h11Min', 'polytope.h11 >= :h11Min'],
    ['h11Max', 'polytope.h11 <= :h11Max'],
    ['h21Min', 'polytope.h21 >= :h21Min'],
    ['h21Max', 'polytope.h21 <= :h21Max'],
    ['pointsMax', 'polytope.points <= :pointsMax'],
    ['origin', 'polytope.origin = :origin'],
  ] as const
  for (const [name, condition] of bounds) {
    if (filter[name] !== undefined) query.andWhere(condition, { [name]: filter[name] })
  }
  if (filter.favourable !== undefined) {
    query.andWhere('polytope.favourable = :favourable', { favourable: filter.favourable === 'yes' })
  }
  if (filter.text !== undefined && filter.text.trim() !== '') {
    const ownName =
      'campaignId' in viewer
        ? ` OR EXISTS (SELECT 1 FROM campaign_polytope n WHERE n.polytopeKey = polytope.key
             AND n.campaignId = :campaignId AND n.name LIKE :text ESCAPE '\\')`
        : ''
    query.andWhere(
      `(polytope.name LIKE :text ESCAPE '\\' OR polytope.key LIKE :text ESCAPE '\\'${ownName})`,
      {
        text: `%${filter.text.trim().replace(/[\\%_]/g, '\\$&')}%`,
      },
    )
  }
  return query
}

/** Names the viewer's campaigns gave to imported polytopes. */
export async function ownNames(
  manager: EntityManager,
  viewer: Viewer,
  polytopes: readonly PolytopeRecord[],
): Promise<Map<string, string>> {
  const keys = polytopes.filter(({ origin }) => origin === 'imported').map(({ key }) => key)
  if (keys.length === 0) return new Map()
  const query = manager
    .createQueryBuilder(CampaignPolytope, 'own')
    .where('own.polytopeKey IN (:...keys)', { keys })
    .orderBy('own.createdAt', 'DESC')
  if ('campaignId' in viewer) query.andWhere('own.campaignId = :campaignId', viewer)
  else
    query.andWhere(
      'own.campaignId IN (SELECT m.campaignId FROM membership m WHERE m.accountId = :accountId)',
      viewer,
    )
  const rows = await query.getMany()
  return new Map(rows.map(({ polytopeKey, name }) => [polytopeKey, name]))
}
