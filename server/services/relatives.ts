import { In, type EntityManager } from 'typeorm'
import { wallVersion } from '../../scoring/index.ts'
import type { CampaignVerdict, CandidateRelatives, WallInvariantsView } from '../../shared/relatives.ts'
import type { ServerContext } from '../context.ts'
import { Campaign } from '../entities/campaign.ts'
import type { CandidateRecord } from '../entities/candidate.ts'
import { Verdict } from '../entities/verdict.ts'
import { presentVerdict } from '../presenters/verdicts.ts'
import { readInvariants, storeInvariants } from './candidateInvariants.ts'
import { listVisibleCandidates, readVisibleCandidate } from './candidates.ts'
import { campaignsOf, withKnown } from './knownCandidates.ts'
import { ownNames, type Viewer } from './polytopes.ts'
import { verdictWords } from './verdicts.ts'

/** Lists longer than this are cut. */
const listLimit = 50
/** Candidates on the same polytope that are compared triangle by triangle, those in shortlists first. */
const nearLimit = 400
/** Near duplicates differ by at most four flips' worth of triangles. */
const nearTriangles = 8

/** Candidates whose invariants are asked for at a time, to be compared with next time. */
const wantLimit = 200

type Relative = CandidateRelatives['equivalents'][number]
type NearDuplicate = CandidateRelatives['nearDuplicates'][number]

/**
 * Candidates that may be the same geometry as one (equal Wall-type invariants) or nearly the same class on its
 * polytope, among those that the viewer's campaigns know of, with these campaigns' verdicts on them.
 */
export async function readRelatives(
  context: ServerContext,
  viewer: Viewer,
  key: string,
): Promise<CandidateRelatives> {
  const { manager } = context.source
  const candidate = await readVisibleCandidate(manager, viewer, key)
  const invariants = await ensureInvariants(context, candidate)
  const campaigns = await campaignsOf(manager, viewer)
  const known = JSON.stringify(campaigns)
  const equivalents = await equivalentKeys(manager, known, candidate, invariants)
  const { compared, missing } = await counts(manager, known, invariants, candidate)
  context.jobs.invariants.want(missing.slice(0, wantLimit))
  const near = await nearKeys(context, known, candidate)
  const keys = [...equivalents.keys, ...near.keys.map((entry) => entry.key)]
  const relatives = await describe(manager, viewer, campaigns, keys)
  return {
    key,
    invariants,
    equivalents: equivalents.keys.flatMap((other): Relative[] => {
      const found = relatives.get(other)
      return found ? [{ ...found, samePolytope: found.polytopeKey === candidate.polytopeKey }] : []
    }),
    equivalentsTotal: equivalents.total,
    compared,
    waiting: missing.length,
    nearDuplicates: near.keys.flatMap(({ key: other, triangles }): NearDuplicate[] => {
      const found = relatives.get(other)
      return found ? [{ ...found, triangles, flips: Math.ceil(triangles / 2) }] : []
    }),
    nearCompared: near.compared,
    nearTotal: near.total,
  }
}

async function ensureInvariants(
  { source, writes, jobs }: ServerContext,
  { key, heights, polytope }: CandidateRecord,
): Promise<WallInvariantsView> {
  const stored = await readInvariants(source.manager, key)
  if (stored) return stored
  if (!polytope) throw new Error('The candidate was read without its polytope.')
  const computed = await jobs.unhurried.run('invariants-of-each', {
    candidates: [{ key, heights, vertices: polytope.coordinates }],
  })
  await writes.transaction((manager) => storeInvariants(manager, computed))
  return computed[0].invariants
}

/** On other polytopes first. */
async function equivalentKeys(
  manager: EntityManager,
  known: string,
  { key, polytopeKey }: CandidateRecord,
  invariants: WallInvariantsView,
): Promise<{ keys: string[]; total: number }> {
  const rows = await manager.query<{ candidateKey: string }[]>(
    `${withKnown}
     SELECT i.candidateKey AS candidateKey FROM candidate_invariants i JOIN candidate c ON c."key" = i.candidateKey
     WHERE i.wallKey = ? AND i.version = ? AND i.candidateKey <> ? AND i.candidateKey IN known
     ORDER BY c.polytopeKey = ?, i.candidateKey`,
    [known, invariants.key, wallVersion, key, polytopeKey],
  )
  return { keys: rows.slice(0, listLimit).map(({ candidateKey }) => candidateKey), total: rows.length }
}

/**
 * How many known candidates with the same Hodge numbers have been compared, and those whose invariants are missing:
 * on other polytopes first.
 */
async function counts(
  manager: EntityManager,
  known: string,
  { h11, h21 }: WallInvariantsView,
  { key, polytopeKey }: CandidateRecord,
): Promise<{ compared: number; missing: string[] }> {
  const rows = await manager.query<{ candidateKey: string; there: number }[]>(
    `${withKnown}
     SELECT c."key" AS candidateKey, i.candidateKey IS NOT NULL AS there
     FROM candidate c JOIN polytope p ON p."key" = c.polytopeKey
     LEFT JOIN candidate_invariants i ON i.candidateKey = c."key" AND i.version = ?
     WHERE p.h11 = ? AND p.h21 = ? AND c."key" <> ? AND c."key" IN known
     ORDER BY c.polytopeKey = ?, c."key"`,
    [known, wallVersion, h11, h21, key, polytopeKey],
  )
  const missing = rows.filter(({ there }) => there === 0).map(({ candidateKey }) => candidateKey)
  return { compared: rows.length - missing.length, missing }
}

async function nearKeys(
  { source, jobs }: ServerContext,
  known: string,
  { key, heights, polytope, polytopeKey }: CandidateRecord,
): Promise<{ keys: { key: string; triangles: number }[]; compared: number; total: number }> {
  if (!polytope) throw new Error('The candidate was read without its polytope.')
  const rows = await source.manager.query<{ candidateKey: string; heights: string }[]>(
    `${withKnown}
     SELECT c."key" AS candidateKey, c.heights AS heights FROM candidate c
     WHERE c.polytopeKey = ? AND c."key" <> ? AND c."key" IN known
     ORDER BY EXISTS (SELECT 1 FROM shortlist_entry e WHERE e.candidateKey = c."key") DESC, c."key"`,
    [known, polytopeKey, key],
  )
  const others = rows
    .slice(0, nearLimit)
    .map((row) => ({ key: row.candidateKey, heights: JSON.parse(row.heights) as number[] }))
  if (others.length === 0) return { keys: [], compared: 0, total: 0 }
  const found = await jobs.unhurried.run('near-duplicates', {
    key,
    vertices: polytope.coordinates,
    heights,
    others,
    most: nearTriangles,
  })
  return { keys: found.slice(0, listLimit), compared: others.length, total: rows.length }
}

/** Names of polytopes and verdicts; only of candidates on polytopes that the viewer may see. */
async function describe(
  manager: EntityManager,
  viewer: Viewer,
  campaigns: readonly string[],
  keys: readonly string[],
): Promise<Map<string, Omit<Relative, 'samePolytope'>>> {
  if (keys.length === 0) return new Map()
  const candidates = await listVisibleCandidates(manager, viewer, [...new Set(keys)])
  const polytopes = candidates.flatMap(({ polytope }) => (polytope ? [polytope] : []))
  const names = await ownNames(manager, viewer, polytopes)
  const verdicts = await latestVerdictsOn(manager, campaigns, keys)
  return new Map(
    candidates.map(({ key, polytopeKey, polytope }) => [
      key,
      {
        key,
        polytopeKey,
        polytopeName: names.get(polytopeKey) ?? polytope?.name ?? '',
        verdicts: verdicts.get(key) ?? [],
      },
    ]),
  )
}

/** Per candidate the verdicts that count, one per campaign and target, newest first. */
async function latestVerdictsOn(
  manager: EntityManager,
  campaigns: readonly string[],
  keys: readonly string[],
): Promise<Map<string, CampaignVerdict[]>> {
  const verdicts = await manager.find(Verdict, {
    where: { campaignId: In([...campaigns]), candidateKey: In([...keys]) },
    relations: verdictWords,
    order: { id: 'DESC' },
  })
  const titles = new Map(
    (await manager.findBy(Campaign, { id: In([...campaigns]) })).map(({ id, name }) => [id, name]),
  )
  const latest = new Map<string, CampaignVerdict[]>()
  for (const verdict of verdicts) {
    const { campaignId, candidateKey } = verdict
    const view = presentVerdict(verdict)
    const list = latest.get(candidateKey) ?? []
    if (list.some((other) => other.campaignId === campaignId && other.targetId === view.targetId)) continue
    latest.set(candidateKey, [...list, { ...view, campaignId, campaignName: titles.get(campaignId) ?? '' }])
  }
  return latest
}
