import type { EntityManager } from 'typeorm'
import type { GivenCandidate } from '../../scoring/index.ts'
import type { CandidateImportReport } from '../../shared/importedCandidates.ts'
import type { ServerContext } from '../context.ts'
import { CandidateRecord } from '../entities/candidate.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import type { StorableOrProblem } from '../jobs/compute/importCandidates.ts'
import { Refusal, unprocessable } from '../problems.ts'
import { readCampaignCandidate } from './candidates.ts'
import { earlierVerdicts, foundInCampaign } from './importedCandidates.ts'
import { refuseTooMany, storePolytope, type Importer } from './imports.ts'
import { readPolytope } from './polytopes.ts'

/** Candidates sent to the interactive thread at a time; it answers for as many as a piece of its time allows. */
const stretchLength = 100

/** Names of a text may be of any length. */
const nameLimit = 200

export interface CandidateText {
  readonly text: string
  /** Name of the file, or what the person calls the text. */
  readonly source: string
  readonly name?: string
  readonly orientation?: 'rows' | 'columns'
}

type Imported = CandidateImportReport['imported'][number]

/**
 * Imports every candidate of a text and reports everything that is none, with its place. Where a matrix can be read
 * by rows and by columns nothing is imported: the report asks.
 */
export async function importCandidates(
  context: ServerContext,
  importer: Importer,
  { text, source, name, orientation }: CandidateText,
): Promise<CandidateImportReport> {
  const { config, jobs, writes, streams } = context
  const reading = await jobs.interactive.run('candidates-of-text', { text, orientation })
  const { format, candidates, ambiguous } = reading
  const problems = [...reading.problems]
  const skipped = [...reading.skipped]
  if (ambiguous.length > 0) {
    const question = { kind: 'orientation' as const, matrices: [...ambiguous] }
    return { format, question, imported: [], problems, skipped }
  }
  refuseTooMany('candidates', candidates.length, config.importLimit)
  if (candidates.length === 0 && problems.length === 0) {
    throw unprocessable(
      'no-candidates',
      'The text holds no candidate: a polytope with heights, simplices or triangles.',
      { path: 'text' },
    )
  }
  const imported: Imported[] = []
  for (let from = 0; from < candidates.length;) {
    const stretch = await Promise.all(
      candidates.slice(from, from + stretchLength).map((given) => resolved(context, importer, given)),
    )
    const answers = await jobs.interactive.run('place-candidates', { given: stretch })
    await writes.transaction(async (manager) => {
      for (const [i, answer] of answers.entries()) {
        const given = stretch[i]
        if (answer.problem) {
          problems.push(answer.problem)
          continue
        }
        const number = candidates.length === 1 ? '' : ` ${from + i + 1}`
        const wanted = (given.name?.trim() || (name ? `${name}${number}` : '')).slice(0, nameLimit)
        imported.push(await store(manager, importer, given, answer.candidate, { wanted, source }))
      }
    })
    from += answers.length
    // A long import can be left: the list fills while it runs.
    streams.toCampaign(importer.campaignId, { kind: 'changed', what: 'imports' })
  }
  problems.sort((a, b) => a.line - b.line)
  jobs.invariants.wake()
  return { format, question: null, imported, problems, skipped }
}

/** A candidate with what is known here of the keys it names: vertices of its polytope, heights of an address. */
async function resolved(
  { source: { manager } }: ServerContext,
  { campaignId }: Importer,
  given: GivenCandidate,
): Promise<GivenCandidate> {
  const { polytope, triangulation, claims } = given
  if (triangulation.kind === 'address' && claims.candidateKey !== undefined) {
    const known = await unlessUnknown(readCampaignCandidate(manager, campaignId, claims.candidateKey))
    if (known?.polytope) {
      return {
        ...given,
        polytope: { kind: 'key', key: known.polytopeKey, vertices: known.polytope.coordinates },
        triangulation: { kind: 'heights', values: known.heights },
      }
    }
    return given
  }
  if (polytope.kind !== 'key' || polytope.vertices !== undefined) return given
  const known = await unlessUnknown(readPolytope(manager, { campaignId }, polytope.key))
  return known ? { ...given, polytope: { ...polytope, vertices: known.polytope.coordinates } } : given
}

/** Null for what does not exist, or not for this campaign: the report names it. */
async function unlessUnknown<T>(reading: Promise<T>): Promise<T | null> {
  try {
    return await reading
  } catch (error) {
    if (error instanceof Refusal && error.status === 404) return null
    throw error
  }
}

async function store(
  manager: EntityManager,
  importer: Importer,
  given: GivenCandidate,
  { key, heights, polytope }: NonNullable<StorableOrProblem['candidate']>,
  { wanted, source }: { readonly wanted: string; readonly source: string },
): Promise<Imported> {
  const { campaignId, authorId } = importer
  const stored = await storePolytope(manager, importer, polytope, undefined, null)
  const own = await manager.findOneBy(ImportedCandidate, { campaignId, candidateKey: key })
  const found = own === null && (await foundInCampaign(manager, campaignId, key))
  const name = (own?.name ?? wanted) || `${stored.name}, ${key.slice(0, 6)}`
  if (own === null) {
    const record = { key, polytopeKey: polytope.key, heights }
    await manager.createQueryBuilder().insert().into(CandidateRecord).values(record).orIgnore().execute()
    await manager.insert(ImportedCandidate, {
      campaignId,
      candidateKey: key,
      name,
      source,
      line: given.line,
      authorId,
      createdAt: new Date().toISOString(),
    })
  }
  return {
    line: given.line,
    entry: given.entry,
    key,
    name,
    polytopeKey: polytope.key,
    polytopeName: stored.name,
    h11: stored.h11,
    h21: stored.h21,
    polytopeKnown: stored.known,
    known: own !== null ? 'imported' : found ? 'found' : null,
    verdicts: (await earlierVerdicts(manager, campaignId, [key])).get(key) ?? [],
  }
}
