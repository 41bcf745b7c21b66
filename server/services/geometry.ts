import type { CandidateGeometry } from '../../shared/candidates.ts'
import type { PolytopeDetail } from '../../shared/polytopes.ts'
import type { ServerContext } from '../context.ts'
import { presentPolytopeRow } from '../presenters/polytopes.ts'
import { readVisibleCandidate } from './candidates.ts'
import { readPolytope, visible, type Viewer } from './polytopes.ts'

/** A polytope's page: its row in the library, and what is computed from its vertices. */
export async function readPolytopeDetail(
  { source, jobs }: ServerContext,
  viewer: Viewer,
  key: string,
): Promise<PolytopeDetail> {
  const found = await readPolytope(source.manager, viewer, key)
  const { dualKey, ...shape } = await jobs.shapes.get(key, () =>
    jobs.interactive.run('polytope-shape', { vertices: found.polytope.coordinates }),
  )
  const mirror = await visible(source.manager, viewer, {})
    .andWhere('polytope.key = :dualKey', { dualKey })
    .getExists()
  return { ...presentPolytopeRow(found), ...shape, mirrorKey: mirror ? dualKey : null }
}

/** A candidate's dossier: geometry only, for everybody who may see the polytope. */
export async function readCandidateGeometry(
  context: ServerContext,
  accountId: string,
  key: string,
): Promise<CandidateGeometry> {
  const { source, jobs } = context
  const candidate = await readVisibleCandidate(source.manager, { accountId }, key)
  const vertices = candidate.polytope?.coordinates
  if (!vertices) throw new Error('The candidate was read without its polytope.')
  const polytope = await readPolytopeDetail(context, { accountId }, candidate.polytopeKey)
  const geometry = await jobs.geometries.get(key, () =>
    jobs.interactive.run('candidate-geometry', { key, vertices, heights: candidate.heights }),
  )
  return { key, polytope, ...geometry }
}
