import type { ShortlistDetail } from '../../../shared/shortlists.ts'
import type { OpenServer } from '../../../server/start.ts'
import { createSearch } from '../../../server/services/searches.ts'
import { createShortlist } from '../../../server/services/shortlists.ts'
import { createTarget } from '../../../server/services/targets.ts'

/** A target, a short random search with it over all polytopes at hand, and the shortlist of what it found. */
export async function smallShortlist(
  { context }: Pick<OpenServer, 'context'>,
  campaignId: string,
  authorId: string,
  input: { readonly rule: string; readonly size: number },
): Promise<ShortlistDetail> {
  const target = await createTarget(context, campaignId, authorId, { name: 'Target', text: input.rule })
  const search = await createSearch(context, campaignId, authorId, {
    targetVersionId: target.versions[0].version.id,
    scope: { kind: 'filter', filter: {} },
    method: 'random',
    budget: Math.max(10, input.size),
    seed: 5,
    islands: 1,
    surrogate: false,
    keep: input.size,
  })
  await context.jobs.searches.ended(search.id)
  return createShortlist(context, campaignId, authorId, {
    name: 'Shortlist',
    searchIds: [search.id],
    size: input.size,
  })
}
