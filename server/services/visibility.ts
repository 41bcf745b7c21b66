/** Whose imports are visible beside the bundled polytopes: one campaign's, or those of an account's campaigns. */
export type Viewer = { readonly campaignId: string } | { readonly accountId: string }

/** SQL for the identifiers of the viewer's campaigns; its parameter is the viewer itself. */
export function campaignsOf(viewer: Viewer): string {
  return 'campaignId' in viewer
    ? ':campaignId'
    : 'SELECT viewer.campaignId FROM membership viewer WHERE viewer.accountId = :accountId'
}

/** Imports that a published collection shows to everybody: those its own campaign imported, under its names. */
const publishedImports = `FROM collection_polytope shown
  JOIN collection published ON published.id = shown.collectionId AND published.publishedAt IS NOT NULL
  JOIN campaign_polytope named ON named.campaignId = published.campaignId AND named.polytopeKey = shown.polytopeKey`

/** SQL condition on the alias `polytope`: bundled, imported by the viewer, or published. */
export function mayBeSeen(viewer: Viewer): string {
  return `(polytope.origin = 'bundled' OR polytope.key IN (
    SELECT own.polytopeKey FROM campaign_polytope own WHERE own.campaignId IN (${campaignsOf(viewer)})
    UNION ALL SELECT named.polytopeKey ${publishedImports}))`
}

/**
 * SQL for the names under which a viewer may see imports, the viewer's own first: `polytopeKey`, `name`, `own`. What
 * another campaign calls a polytope stays with it until it publishes a collection.
 */
export function visibleNames(viewer: Viewer): string {
  return `SELECT own.polytopeKey AS polytopeKey, own.name AS name, 1 AS own FROM campaign_polytope own
      WHERE own.campaignId IN (${campaignsOf(viewer)})
    UNION ALL SELECT named.polytopeKey AS polytopeKey, named.name AS name, 0 AS own ${publishedImports}`
}

/** SQL condition on the alias `collection`: the viewer's own, or published. */
export function mayReadCollection(viewer: Viewer): string {
  return `(collection.publishedAt IS NOT NULL OR collection.campaignId IN (${campaignsOf(viewer)}))`
}
