import type { EntityManager } from 'typeorm'
import type { SearchEventKind, SearchEventView } from '../../shared/searchEvents.ts'
import { Search } from '../entities/search.ts'
import { SearchEvent } from '../entities/searchEvent.ts'

/** Events of one search that its page lists: the latest. */
const shown = 200

/**
 * Writes down what happened to a search. To be called inside the transaction that makes it happen, so that neither
 * is there without the other.
 */
export async function recordSearchEvent(
  manager: EntityManager,
  searchId: string,
  kind: SearchEventKind,
  {
    accountId = null,
    note = null,
  }: { readonly accountId?: string | null; readonly note?: string | null } = {},
): Promise<void> {
  const { evaluations } = await manager.findOneOrFail(Search, {
    select: { id: true, evaluations: true },
    where: { id: searchId },
  })
  const at = new Date().toISOString()
  await manager.insert(SearchEvent, { searchId, kind, at, accountId, evaluations, note })
}

/** Oldest first. */
export async function readSearchEvents(manager: EntityManager, searchId: string): Promise<SearchEventView[]> {
  const events = await manager.find(SearchEvent, {
    where: { searchId },
    relations: { account: true },
    order: { id: 'DESC' },
    take: shown,
  })
  return events.reverse().map(({ kind, at, account, evaluations, note }) => ({
    kind,
    at,
    by: account?.name ?? null,
    evaluations,
    note,
  }))
}
