import { createHash } from 'node:crypto'
import type { EntityManager, SelectQueryBuilder } from 'typeorm'
import type { z } from 'zod'
import { maximumScope, type Scope, type scopeSummarySchema } from '../../shared/polytopes.ts'
import type { PolytopeRecord } from '../entities/polytope.ts'
import { unprocessable } from '../problems.ts'
import { visible } from './polytopes.ts'

/** How many polytopes a scope holds in a campaign, and how large they are. */
export async function summariseScope(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): Promise<z.infer<typeof scopeSummarySchema>> {
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
 * @throws Refusal when a named polytope is not visible to the campaign, and when there are none or too many
 */
export async function resolveScope(
  manager: EntityManager,
  campaignId: string,
  scope: Scope,
): Promise<PolytopeRecord[]> {
  const polytopes = await inScope(manager, campaignId, scope)
    .orderBy('polytope.key', 'ASC')
    .limit(maximumScope + 1)
    .getMany()
  if (scope.kind === 'polytopes') {
    const present = new Set(polytopes.map(({ key }) => key))
    const unknown = scope.keys.find((key) => !present.has(key))
    if (unknown !== undefined) {
      throw unprocessable(
        'no-such-polytope',
        'The scope names a polytope that this campaign does not have.',
        {
          path: 'scope.keys',
          found: unknown,
        },
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
  return polytopes
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
  return visible(manager, { campaignId }, {}).andWhere('polytope.key IN (:...keys)', {
    keys: [...new Set(scope.keys)],
  })
}
