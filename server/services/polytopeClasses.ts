import type { EntityManager } from 'typeorm'
import { knownLimit, type PolytopeClasses } from '../../shared/polytopeStructure.ts'
import type { ServerContext } from '../context.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { readPolytope } from './polytopes.ts'
import { campaignsOf, type Viewer } from './visibility.ts'

/** What is known of a polytope's classes: candidates that the viewer's campaigns have met, and exact numbers. */
export async function readPolytopeClasses(
  { source, jobs }: ServerContext,
  viewer: Viewer,
  key: string,
): Promise<PolytopeClasses> {
  const { polytope } = await readPolytope(source.manager, viewer, key)
  const { classes, classOrbits, classDigits, classesSeen, classBound } = polytope
  const seen = jobs.classCounts.seen(key)
  return {
    ...(await knownCandidates(source.manager, viewer, key)),
    classes,
    classOrbits,
    classDigits,
    classesSeen,
    classBound,
    counting: seen === null ? null : { seen },
  }
}

/** Begins an exact count of a polytope's classes, unless it has been made. */
export async function countClasses(
  context: ServerContext,
  campaignId: string,
  key: string,
): Promise<PolytopeClasses> {
  const { polytope } = await readPolytope(context.source.manager, { campaignId }, key)
  const known = polytope.classes !== null && polytope.classOrbits !== null
  if (!known) context.jobs.classCounts.start(campaignId, polytope)
  return readPolytopeClasses(context, { campaignId }, key)
}

/**
 * Candidates on a polytope by how often the viewer's campaigns have met them. What other campaigns have found there is
 * not told, nor that they looked.
 */
async function knownCandidates(
  manager: EntityManager,
  viewer: Viewer,
  polytopeKey: string,
): Promise<Pick<PolytopeClasses, 'total' | 'known'>> {
  const campaigns = campaignsOf(viewer)
  const met = `
    SELECT f.candidateKey AS key, 1 AS searches, 0 AS shortlists, 0 AS imports, 0 AS verdicts
      FROM find f JOIN search s ON s.id = f.searchId WHERE s.campaignId IN (${campaigns})
    UNION ALL SELECT e.candidateKey, 0, 1, 0, 0
      FROM shortlist_entry e JOIN shortlist l ON l.id = e.shortlistId WHERE l.campaignId IN (${campaigns})
    UNION ALL SELECT i.candidateKey, 0, 0, 1, 0 FROM imported_candidate i WHERE i.campaignId IN (${campaigns})
    UNION ALL SELECT v.candidateKey, 0, 0, 0, 1 FROM verdict v WHERE v.campaignId IN (${campaigns})`
  const query = manager
    .createQueryBuilder(CandidateRecord, 'candidate')
    .innerJoin(`(${met})`, 'met', 'met.key = candidate.key')
    .where('candidate.polytopeKey = :polytopeKey', { ...viewer, polytopeKey })
  const count = await query
    .clone()
    .select('COUNT(DISTINCT candidate.key)', 'total')
    .getRawOne<{ total: number }>()
  const known = await query
    .select('candidate.key', 'key')
    .addSelect('SUM(met.searches)', 'searches')
    .addSelect('SUM(met.shortlists)', 'shortlists')
    .addSelect('SUM(met.imports)', 'imports')
    .addSelect('SUM(met.verdicts)', 'verdicts')
    .groupBy('candidate.key')
    .orderBy('verdicts', 'DESC')
    .addOrderBy('shortlists', 'DESC')
    .addOrderBy('searches', 'DESC')
    .addOrderBy('candidate.key', 'ASC')
    .limit(knownLimit)
    .getRawMany<PolytopeClasses['known'][number]>()
  return { total: count?.total ?? 0, known }
}
