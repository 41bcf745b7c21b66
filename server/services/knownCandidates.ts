import type { EntityManager } from 'typeorm'
import { Membership } from '../entities/membership.ts'
import type { Viewer } from './polytopes.ts'

/** The campaigns whose knowledge a viewer shares. */
export async function campaignsOf(manager: EntityManager, viewer: Viewer): Promise<string[]> {
  if ('campaignId' in viewer) return [viewer.campaignId]
  const memberships = await manager.findBy(Membership, { accountId: viewer.accountId })
  return memberships.map(({ campaignId }) => campaignId)
}

/**
 * Head of a query that may then use `known`, the keys of all candidates that some campaigns know of: found by a
 * search, imported, listed or judged. Its one parameter, before all others, is the JSON text of the campaigns' identifiers. What
 * other campaigns found stays with them, although a candidate itself is global.
 */
export const withKnown = `
  WITH mine AS (SELECT value AS id FROM json_each(?)),
  known AS (
    SELECT f.candidateKey AS candidateKey FROM find f JOIN search s ON s.id = f.searchId
      WHERE s.campaignId IN (SELECT id FROM mine)
    UNION SELECT e.candidateKey FROM shortlist_entry e JOIN shortlist l ON l.id = e.shortlistId
      WHERE l.campaignId IN (SELECT id FROM mine)
    UNION SELECT v.candidateKey FROM verdict v WHERE v.campaignId IN (SELECT id FROM mine)
    UNION SELECT m.candidateKey FROM imported_candidate m WHERE m.campaignId IN (SELECT id FROM mine)
  )`
