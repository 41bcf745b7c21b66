import { createHash } from 'node:crypto'
import type { EntityManager, SelectQueryBuilder } from 'typeorm'
import type { z } from 'zod'
import { maximumScope, type Scope, type scopeSummarySchema } from '../../shared/polytopes.ts'
import { Collection } from '../entities/collection.ts'
import type { PolytopeRecord } from '../entities/polytope.ts'
import { unprocessable } from '../problems.ts'
import { visible } from './polytopes.ts'
import { mayReadCollection } from './visibility.ts'

/** How many polytopes a scope holds in a campaign, and how large they are. */
export async function summariseScope(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): Promise<z.infer<typeof scopeSummarySchema>> {
  await namedScope(manager, campaignId, scope)
  const row = await inScope(manager, campaignId, scope)
    .select('COUNT(*)', 'count')
    .addSelect('MIN(polytope.h11)', 'h11Min')
    .addSelect('MAX(polytope.h11)', 'h11Max')
    .addSelect('MAX(polytope.points)', 'pointsMax')
    .getRawOne<z.infer<typeof scopeSummarySchema>>()
  return row ?? { count: 0, h11Min: null, h11Max: null, pointsMax: null }
}

/**
 * The polytopes a scope holds now, by ascending key: the order in which the engine numbers them, so that the same
 * scope gives the same run.
 *
 * @throws Refusal when a named polytope or collection is not visible to the campaign, and when there are no
 *   polytopes or too many
 */
export async function resolveScope(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): Promise<PolytopeRecord[]> {
  await namedScope(manager, campaignId, scope)
  const polytopes = await inOrder(manager, campaignId, scope).getMany()
  requireSound(scope, polytopes)
  return polytopes
}

/** The same, keys only. */
export async function scopeKeys(manager: EntityManager, campaignId: string, scope: Scope): Promise<string[]> {
  await namedScope(manager, campaignId, scope)
  const rows = await inOrder(manager, campaignId, scope)
    .select('polytope.key', 'key')
    .getRawMany<{ key: string }>()
  requireSound(scope, rows)
  return rows.map(({ key }) => key)
}

function inOrder(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): SelectQueryBuilder<PolytopeRecord> {
  return inScope(manager, campaignId, scope)
    .orderBy('polytope.key', 'ASC')
    .limit(maximumScope + 1)
}

function requireSound(scope: Scope, polytopes: readonly { readonly key: string }[]): void {
  if (scope.kind === 'polytopes') {
    const present = new Set(polytopes.map(({ key }) => key))
    const unknown = scope.keys.find((key) => !present.has(key))
    if (unknown !== undefined) {
      throw unprocessable(
        'no-such-polytope',
        'The scope names a polytope that this campaign does not have.',
        { path: 'scope.keys', found: unknown },
      )
    }
  }
  if (polytopes.length === 0) {
    throw unprocessable('scope-empty', 'No polytope matches this scope.', { path: 'scope' })
  }
  if (polytopes.length > maximumScope) {
    throw unprocessable('scope-too-large', `A scope may hold at most ${maximumScope} polytopes.`, {
      path: 'scope',
    })
  }
}

/**
 * A scope as it is kept with a search: a collection carries its name, for the day it is renamed or deleted.
 *
 * @throws Refusal when the campaign may not read the collection
 */
export async function namedScope(manager: EntityManager, campaignId: string, scope: Scope): Promise<Scope> {
  if (scope.kind !== 'collection') return scope
  const found = await manager
    .createQueryBuilder(Collection, 'collection')
    .where('collection.id = :id', { id: scope.collection })
    .andWhere(mayReadCollection({ campaignId }), { campaignId })
    .getOne()
  if (found !== null) return { ...scope, name: found.name }
  throw unprocessable('no-such-collection', 'The scope names a collection that this campaign cannot read.', {
    path: 'scope.collection',
    found: scope.collection,
  })
}

/** Address of a resolved scope. */
export function scopeHash(keys: readonly string[]): string {
  return createHash('sha256').update(keys.join('\n')).digest('hex').slice(0, 32)
}

function inScope(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): SelectQueryBuilder<PolytopeRecord> {
  if (scope.kind === 'filter') return visible(manager, { campaignId }, scope.filter)
  if (scope.kind === 'collection') return visible(manager, { campaignId }, { collection: scope.collection })
  return visible(manager, { campaignId }, {}).andWhere('polytope.key IN (:...keys)', {
    keys: [...new Set(scope.keys)],
  })
}
