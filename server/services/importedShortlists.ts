import { randomUUID } from 'node:crypto'
import { In } from 'typeorm'
import type { z } from 'zod'
import type { shortlistImportedSchema } from '../../shared/importedCandidates.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { unprocessable } from '../problems.ts'
import { scoresOf } from './candidateScores.ts'
import { compareCandidates } from './finds.ts'
import { reportColumns, requireSoundRule } from './rules.ts'
import { readShortlist } from './shortlists.ts'
import { readVersion } from './targets.ts'

/** Scores imported candidates by a target version and freezes the best of them into a shortlist. */
export async function shortlistImported(
  context: ServerContext,
  campaignId: string,
  authorId: string,
  input: z.infer<typeof shortlistImportedSchema>,
): Promise<ShortlistDetail> {
  const { source, writes, streams } = context
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
  const ranked = [...outcomes]
    .map(([candidateKey, outcome]) => ({ candidateKey, outcome }))
    .sort(compareCandidates)
    .slice(0, input.size)
  const id = randomUUID()
  await writes.transaction(async (manager) => {
    await manager.insert(Shortlist, {
      id,
      campaignId,
      targetVersionId: version.id,
      name: input.name,
      searchIds: [],
      columns: reportColumns(version.text),
      scoringHash,
      engineVersion,
      authorId,
      createdAt: new Date().toISOString(),
    })
    await manager.insert(
      ShortlistEntry,
      ranked.map(({ candidateKey, outcome }, place) => ({
        shortlistId: id,
        rank: place + 1,
        candidateKey,
        searchId: null,
        outcome,
      })),
    )
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'shortlists' })
  return readShortlist(source.manager, campaignId, id)
}
