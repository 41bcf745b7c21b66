import type { CollectionView } from '../../shared/collections.ts'
import type { Collection } from '../entities/collection.ts'

/** @param own whether the reader sees it as a member of its campaign */
export function presentCollection(
  collection: Collection,
  { own, polytopes }: { readonly own: boolean; readonly polytopes: number },
): CollectionView {
  const { id, name, description, campaignId, campaign, publishedAt, createdAt, author } = collection
  return {
    id,
    name,
    description,
    own,
    campaignId,
    campaignName: campaign?.name ?? '',
    publishedAt,
    polytopes,
    createdAt,
    authorName: author?.name ?? '',
  }
}
