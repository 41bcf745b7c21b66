import { randomUUID } from 'node:crypto'
import type { EntityManager, SelectQueryBuilder } from 'typeorm'
import { collectionLimit, type CollectionView } from '../../shared/collections.ts'
import type { Scope } from '../../shared/polytopes.ts'
import { may, type Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Collection } from '../entities/collection.ts'
import { CollectionPolytope } from '../entities/collectionPolytope.ts'
import { Membership } from '../entities/membership.ts'
import { presentCollection } from '../presenters/collections.ts'
import { notAllowed, notFound, unprocessable } from '../problems.ts'
import { scopeKeys } from './scopes.ts'
import { mayReadCollection, type Viewer } from './visibility.ts'

interface CampaignRole {
  readonly id: string
  readonly role: Role
}

/** The viewer's own collections by name, then those that others published. */
export async function listCollections(manager: EntityManager, viewer: Viewer): Promise<CollectionView[]> {
  const list = await readable(manager, viewer)
    .orderBy('collection.name')
    .addOrderBy('collection.id')
    .getMany()
  const views = await present(manager, viewer, list)
  return [...views.filter(({ own }) => own), ...views.filter(({ own }) => !own)]
}

/** @throws Refusal 404 when it does not exist, or only in a campaign the viewer does not belong to */
export async function readCollection(
  manager: EntityManager,
  viewer: Viewer,
  id: string,
): Promise<CollectionView> {
  const found = await readable(manager, viewer).andWhere('collection.id = :id', { id }).getOne()
  if (found === null) throw notFound('collection')
  return (await present(manager, viewer, [found]))[0]
}

export async function createCollection(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  { name, description, scope }: { name: string; description: string; scope?: Scope },
): Promise<CollectionView> {
  const { source, writes, streams } = context
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    const keys = scope ? await scopeKeys(manager, campaignId, scope) : []
    const createdAt = new Date().toISOString()
    await manager.insert(Collection, {
      id,
      campaignId,
      name,
      description,
      authorId,
      createdAt,
      publishedAt: null,
    })
    await putIn(manager, id, keys)
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'collections' })
  return readCollection(source.manager, { campaignId }, id)
}

export async function editCollection(
  context: ServerContext,
  campaign: CampaignRole,
  id: string,
  changes: { name?: string; description?: string },
): Promise<CollectionView> {
  await change(context, campaign, id, async (manager) => {
    const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined))
    if (Object.keys(given).length > 0) await manager.update(Collection, { id }, given)
  })
  return readCollection(context.source.manager, { campaignId: campaign.id }, id)
}

export async function deleteCollection(
  context: ServerContext,
  campaign: CampaignRole,
  id: string,
): Promise<void> {
  await change(context, campaign, id, (manager) => manager.delete(Collection, { id }))
}

/** Makes a collection, and the imports it holds, readable for every account; or takes that back. */
export async function publishCollection(
  context: ServerContext,
  campaign: CampaignRole,
  id: string,
  published: boolean,
): Promise<CollectionView> {
  await change(context, campaign, id, (manager, { publishedAt }) =>
    manager.update(
      Collection,
      { id },
      { publishedAt: published ? (publishedAt ?? new Date().toISOString()) : null },
    ),
  )
  // Other campaigns' lists change too.
  context.streams.toAll({ kind: 'changed', what: 'collections' })
  return readCollection(context.source.manager, { campaignId: campaign.id }, id)
}

/**
 * Puts the polytopes of a scope into a collection, or takes them out.
 *
 * @throws Refusal when the scope is empty or too large, and when the collection would hold more than it may
 */
export async function changeMembers(
  context: ServerContext,
  campaign: CampaignRole,
  id: string,
  { scope, into }: { scope: Scope; into: boolean },
): Promise<{ collection: CollectionView; changed: number }> {
  let changed = 0
  await change(context, campaign, id, async (manager) => {
    const before = await manager.countBy(CollectionPolytope, { collectionId: id })
    const keys = await scopeKeys(manager, campaign.id, scope)
    if (into) await putIn(manager, id, keys)
    else await takeOut(manager, id, keys)
    const after = await manager.countBy(CollectionPolytope, { collectionId: id })
    if (after > collectionLimit) {
      throw unprocessable(
        'collection-too-large',
        `A collection may hold at most ${collectionLimit} polytopes; this one would hold ${after}.`,
        { path: 'scope', found: after },
      )
    }
    changed = Math.abs(after - before)
  })
  const collection = await readCollection(context.source.manager, { campaignId: campaign.id }, id)
  return { collection, changed }
}

/** Runs a change of one of the campaign's own collections. While it is published, only a lead may change it. */
async function change(
  { writes, streams }: ServerContext,
  campaign: CampaignRole,
  id: string,
  apply: (manager: EntityManager, collection: Collection) => Promise<unknown>,
): Promise<void> {
  let published = false
  await writes.transaction(async (manager) => {
    const collection = await manager.findOneBy(Collection, { id, campaignId: campaign.id })
    if (collection === null) throw notFound('collection')
    published = collection.publishedAt !== null
    if (published && !may(campaign.role, 'collections.publish')) {
      throw notAllowed('This collection is published: only a lead of its campaign may change it.')
    }
    await apply(manager, collection)
  })
  const event = { kind: 'changed', what: 'collections' } as const
  if (published) streams.toAll(event)
  else streams.toCampaign(campaign.id, event)
}

function readable(manager: EntityManager, viewer: Viewer): SelectQueryBuilder<Collection> {
  return manager
    .createQueryBuilder(Collection, 'collection')
    .leftJoinAndSelect('collection.campaign', 'campaign')
    .leftJoinAndSelect('collection.author', 'author')
    .where(mayReadCollection(viewer), viewer)
}

async function present(
  manager: EntityManager,
  viewer: Viewer,
  list: readonly Collection[],
): Promise<CollectionView[]> {
  if (list.length === 0) return []
  const counts = await manager
    .createQueryBuilder(CollectionPolytope, 'held')
    .select('held.collectionId', 'id')
    .addSelect('COUNT(*)', 'count')
    .where('held.collectionId IN (:...ids)', { ids: list.map(({ id }) => id) })
    .groupBy('held.collectionId')
    .getRawMany<{ id: string; count: number }>()
  const countOf = new Map(counts.map(({ id, count }) => [id, count]))
  const campaigns =
    'campaignId' in viewer
      ? new Set([viewer.campaignId])
      : new Set((await manager.findBy(Membership, viewer)).map(({ campaignId }) => campaignId))
  return list.map((collection) =>
    presentCollection(collection, {
      own: campaigns.has(collection.campaignId),
      polytopes: countOf.get(collection.id) ?? 0,
    }),
  )
}

/** SQLite takes a limited number of parameters in one statement. */
const stretch = 5_000

async function putIn(manager: EntityManager, collectionId: string, keys: readonly string[]): Promise<void> {
  for (let from = 0; from < keys.length; from += stretch) {
    await manager
      .createQueryBuilder()
      .insert()
      .into(CollectionPolytope)
      .values(keys.slice(from, from + stretch).map((polytopeKey) => ({ collectionId, polytopeKey })))
      .orIgnore()
      .execute()
  }
}

async function takeOut(manager: EntityManager, collectionId: string, keys: readonly string[]): Promise<void> {
  for (let from = 0; from < keys.length; from += stretch) {
    await manager
      .createQueryBuilder()
      .delete()
      .from(CollectionPolytope)
      .where('collectionId = :collectionId AND polytopeKey IN (:...keys)', {
        collectionId,
        keys: keys.slice(from, from + stretch),
      })
      .execute()
  }
}
