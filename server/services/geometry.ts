import type { CandidateAlignment } from '../../shared/candidateAlignment.ts'
import type { CandidateGeometry, CandidateSpectra, ClassPicture } from '../../shared/candidates.ts'
import type { ConeSliceQuery, ConeSliceView } from '../../shared/coneSlices.ts'
import type { PolytopeDetail } from '../../shared/polytopes.ts'
import type { PolytopeStructure } from '../../shared/polytopeStructure.ts'
import type { ServerContext } from '../context.ts'
import { presentPolytopeRow } from '../presenters/polytopes.ts'
import type { CandidateRecord } from '../entities/candidate.ts'
import type { CandidateGeometryInput } from '../jobs/compute/candidateGeometry.ts'
import { listVisibleCandidates, readVisibleCandidate } from './candidates.ts'
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

/** Divisors and reflexive sections of a polytope, for its page. */
export async function readPolytopeStructure(
  { source, jobs }: ServerContext,
  viewer: Viewer,
  key: string,
): Promise<PolytopeStructure> {
  const { polytope } = await readPolytope(source.manager, viewer, key)
  return jobs.structures.get(key, () =>
    jobs.interactive.run('polytope-structure', { vertices: polytope.coordinates }),
  )
}

/** A candidate's dossier: geometry only, for everybody who may see the polytope. */
export async function readCandidateGeometry(
  context: ServerContext,
  accountId: string,
  key: string,
): Promise<CandidateGeometry> {
  const { source, jobs } = context
  const candidate = await readVisibleCandidate(source.manager, { accountId }, key)
  const polytope = await readPolytopeDetail(context, { accountId }, candidate.polytopeKey)
  const geometry = await jobs.geometries.get(key, () =>
    jobs.interactive.run('candidate-geometry', inputOf(candidate)),
  )
  return { key, polytope, ...geometry }
}

/** The whole spectra of the field-space metric, for everybody who may see the polytope. */
export async function readCandidateSpectra(
  { source, jobs }: ServerContext,
  accountId: string,
  key: string,
): Promise<CandidateSpectra> {
  const candidate = await readVisibleCandidate(source.manager, { accountId }, key)
  const spectra = await jobs.spectra.get(key, () =>
    jobs.unhurried.run('candidate-spectra', inputOf(candidate)),
  )
  return { key, ...spectra }
}

/** A plane cut through the cone, for everybody who may see the polytope. */
export async function readConeSlice(
  { source, jobs }: ServerContext,
  accountId: string,
  key: string,
  directions: ConeSliceQuery,
): Promise<ConeSliceView> {
  const candidate = await readVisibleCandidate(source.manager, { accountId }, key)
  return jobs.slices.get(`${key} ${directions.first} ${directions.second}`, () =>
    jobs.unhurried.run('cone-slice', { ...inputOf(candidate), directions }),
  )
}

/** How another candidate lies on one, for an account that may see the polytopes of both. */
export async function readAlignment(
  { source, jobs }: ServerContext,
  accountId: string,
  key: string,
  other: string,
): Promise<CandidateAlignment> {
  const one = await readVisibleCandidate(source.manager, { accountId }, key)
  const two = await readVisibleCandidate(source.manager, { accountId }, other)
  if (one.polytopeKey !== two.polytopeKey) return { key, other, points: null }
  const points = await jobs.interactive.run('align-candidates', { ...inputOf(one), other: inputOf(two) })
  return { key, other, points }
}

/** Pictures of those of the candidates that the account may see; one computation per polytope. */
export async function readClassPictures(
  { source, jobs }: ServerContext,
  accountId: string,
  keys: readonly string[],
): Promise<ClassPicture[]> {
  const candidates = await listVisibleCandidates(source.manager, { accountId }, keys)
  const polytopes = new Map<string, CandidateGeometryInput[]>()
  for (const candidate of candidates) {
    const { polytopeKey } = candidate
    polytopes.set(polytopeKey, [...(polytopes.get(polytopeKey) ?? []), inputOf(candidate)])
  }
  const pictures = [...polytopes.values()].map(async (inputs) => {
    const missing = inputs.filter(({ key }) => !jobs.pictures.has(key))
    const drawn =
      missing.length === 0
        ? null
        : jobs.interactive.run('class-pictures', { vertices: missing[0].vertices, candidates: missing })
    return Promise.all(
      inputs.map((input) =>
        jobs.pictures.get(input.key, async () => {
          const picture = (await drawn)?.find(({ key }) => key === input.key)
          if (!picture) throw new Error(`Candidate ${input.key} was not drawn.`)
          return picture
        }),
      ),
    )
  })
  return (await Promise.all(pictures)).flat()
}

/** @param candidate with its polytope loaded */
function inputOf({ key, heights, polytope }: CandidateRecord): CandidateGeometryInput {
  if (!polytope) throw new Error('The candidate was read without its polytope.')
  return { key, vertices: polytope.coordinates, heights }
}
