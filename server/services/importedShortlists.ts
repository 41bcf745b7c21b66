import { In } from 'typeorm'
import type { z } from 'zod'
import { assemblySchema } from '../../shared/assemblies.ts'
import type { shortlistImportedSchema } from '../../shared/importedCandidates.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { unprocessable } from '../problems.ts'
import { drawList, type ScoredEntrant } from './assemblies.ts'
import { scoresOf } from './candidateScores.ts'
import { reportColumns, requireSoundRule } from './rules.ts'
import { insertShortlist } from './shortlistCommits.ts'
import { readShortlist } from './shortlists.ts'
import { readVersion } from './targets.ts'

/** Scores imported candidates by a target version and freezes the best of them into a shortlist. */
export async function shortlistImported(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  input: z.infer<typeof shortlistImportedSchema>,
): Promise<ShortlistDetail> {
  const { source, writes, streams, jobs } = context
  const version = await readVersion(source.manager, campaignId, input.targetVersionId)
  const { scoringHash, engineVersion } = requireSoundRule(version.text, 'targetVersionId')
  const wanted = input.candidateKeys && [...new Set(input.candidateKeys)]
  const rows = await source.manager.find(ImportedCandidate, {
    where: { campaignId, ...(wanted && { candidateKey: In(wanted) }) },
    relations: { candidate: { polytope: true } },
  })
  const missing = wanted?.find((key) => rows.every(({ candidateKey }) => candidateKey !== key))
  if (missing !== undefined) {
    throw unprocessable('no-such-import', 'This campaign has not imported this candidate.', {
      path: 'candidateKeys',
      found: missing,
    })
  }
  if (rows.length === 0) {
    throw unprocessable('nothing-imported', 'This campaign has not imported any candidate yet.')
  }
  const candidates = rows.flatMap(({ candidate }) => (candidate ? [candidate] : []))
  const outcomes = await scoresOf(context, version.text, scoringHash, candidates)
  const entrants = candidates.flatMap(({ key, polytopeKey }): ScoredEntrant[] => {
    const outcome = outcomes.get(key)
    return outcome ? [{ candidateKey: key, polytopeKey, searchId: null, outcome }] : []
  })
  const assembly = assemblySchema.parse({ size: input.size })
  const { chosen, counts } = await drawList(
    { manager: source.manager, pool: jobs.unhurried },
    { finds: entrants.length, broken: 0, entrants },
    assembly,
    reportColumns(version.text),
  )
  const id = await writes.transaction((manager) =>
    insertShortlist(manager, {
      campaignId,
      authorId,
      name: input.name,
      version,
      scoringHash,
      engineVersion,
      searches: [],
      chosen,
      provenance: { assembly, counts, searches: [], from: null },
    }),
  )
  streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlists' })
  return readShortlist(source.manager, campaignId, id)
}
