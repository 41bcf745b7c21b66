import { randomUUID } from 'node:crypto'
import type { EntityManager } from 'typeorm'
import type { z } from 'zod'
import type { EditView, saveViewSchema, ShortlistViewRecord } from '../../shared/shortlistViews.ts'
import type { Role } from '../../shared/roles.ts'
import type { ServerContext } from '../context.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistView } from '../entities/shortlistView.ts'
import { conflict, notAllowed, notFound, unprocessable } from '../problems.ts'

/** Views of a campaign, at most. */
const viewLimit = 200

/** Views of a list and those for every list, by name. */
export async function listViews(
  manager: EntityManager,
  campaignId: string,
  shortlistId: string,
): Promise<ShortlistViewRecord[]> {
  const views = await manager
    .createQueryBuilder(ShortlistView, 'view')
    .leftJoinAndSelect('view.author', 'author')
    .where(
      'view.campaignId = :campaignId AND (view.shortlistId IS NULL OR view.shortlistId = :shortlistId)',
      {
        campaignId,
        shortlistId,
      },
    )
    .orderBy('view.name')
    .addOrderBy('view.id')
    .getMany()
  return views.map(present)
}

function present({ author, ...view }: ShortlistView): ShortlistViewRecord {
  const { id, name, address, shortlistId, authorId, createdAt } = view
  return { id, name, address, shortlistId, authorId, author: author?.name ?? '', createdAt }
}

export async function saveView(
  { writes, source, streams }: ServerContext,
  campaignId: string,
  authorId: string,
  input: z.output<typeof saveViewSchema>,
): Promise<ShortlistViewRecord> {
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    const { shortlistId } = input
    if (shortlistId !== null && !(await manager.existsBy(Shortlist, { campaignId, id: shortlistId }))) {
      throw unprocessable('no-such-shortlist', 'This campaign has no such shortlist.', {
        path: 'shortlistId',
        found: shortlistId,
      })
    }
    if ((await manager.countBy(ShortlistView, { campaignId })) >= viewLimit) {
      throw conflict('too-many-views', `A campaign keeps ${viewLimit} views at most: remove one first.`)
    }
    await manager.insert(ShortlistView, {
      id,
      campaignId,
      ...input,
      authorId,
      createdAt: new Date().toISOString(),
    })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlist-views' })
  return readView(source.manager, id)
}

async function readView(manager: EntityManager, id: string): Promise<ShortlistViewRecord> {
  return present(await manager.findOneOrFail(ShortlistView, { where: { id }, relations: { author: true } }))
}

interface Editor {
  readonly accountId: string
  readonly role: Role
}

export async function editView(
  { writes, source, streams }: ServerContext,
  place: { readonly campaignId: string; readonly id: string },
  editor: Editor,
  changes: EditView,
): Promise<ShortlistViewRecord> {
  await writes.transaction(async (manager) => {
    await requireOwn(manager, place, editor)
    const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined))
    if (Object.keys(given).length > 0) await manager.update(ShortlistView, { id: place.id }, given)
  })
  streams.toCampaign(place.campaignId, { kind: 'changed', what: 'shortlist-views' })
  return readView(source.manager, place.id)
}

export async function removeView(
  { writes, streams }: ServerContext,
  place: { readonly campaignId: string; readonly id: string },
  editor: Editor,
): Promise<void> {
  await writes.transaction(async (manager) => {
    await requireOwn(manager, place, editor)
    await manager.delete(ShortlistView, { id: place.id })
  })
  streams.toCampaign(place.campaignId, { kind: 'changed', what: 'shortlist-views' })
}

/** @throws Refusal 404 without such a view, 403 for others than its author and leads */
async function requireOwn(
  manager: EntityManager,
  { campaignId, id }: { readonly campaignId: string; readonly id: string },
  { accountId, role }: Editor,
): Promise<void> {
  const view = await manager.findOneBy(ShortlistView, { campaignId, id })
  if (view === null) throw notFound('view')
  if (view.authorId !== accountId && role !== 'lead') {
    throw notAllowed('A view is changed by the person who saved it, or by a lead.')
  }
}
