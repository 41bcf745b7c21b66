import { randomUUID } from 'node:crypto'
import { In } from 'typeorm'
import type { z } from 'zod'
import type { shortlistImportedSchema } from '../../shared/importedCandidates.ts'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { ShortlistDetail } from '../../shared/shortlists.ts'
import type { ServerContext } from '../context.ts'
import type { CandidateRecord } from '../entities/candidate.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { ImportedCandidate } from '../entities/importedCandidate.ts'
import { Shortlist } from '../entities/shortlist.ts'
import { ShortlistEntry } from '../entities/shortlistEntry.ts'
import { unprocessable } from '../problems.ts'
import { compareCandidates } from './finds.ts'
import { reportColumns, requireSoundRule } from './rules.ts'
import { readShortlist } from './shortlists.ts'
import { readVersion } from './targets.ts'

/** Candidates sent to the interactive thread at a time; it answers for as many as a piece of its time allows. */
const stretchLength = 50

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
  const outcomes = await scored(context, version.text, scoringHash, candidates)
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

/** What the rule says of each candidate: known values under its scoring hash, the others computed and stored. */
async function scored(
  { source, writes, jobs }: ServerContext,
  rule: string,
  scoringHash: string,
  candidates: readonly CandidateRecord[],
): Promise<Map<string, OutcomeView>> {
  const outcomes = new Map<string, OutcomeView>()
  for (let from = 0; from < candidates.length; from += 500) {
    const keys = candidates.slice(from, from + 500).map(({ key }) => key)
    const known = await source.manager.findBy(CandidateValue, { scoringHash, candidateKey: In(keys) })
    for (const { candidateKey, outcome } of known) outcomes.set(candidateKey, outcome)
  }
  const open = candidates.filter(({ key }) => !outcomes.has(key))
  for (let from = 0; from < open.length;) {
    const stretch = open.slice(from, from + stretchLength)
    const answers = await jobs.interactive.run('score-candidates', {
      rule,
      polytopes: Object.fromEntries(
        stretch.map(({ polytopeKey, polytope }) => [polytopeKey, polytope?.coordinates ?? []]),
      ),
      candidates: stretch.map(({ key, polytopeKey, heights }) => ({ key, polytopeKey, heights })),
    })
    await writes.transaction(async (manager) => {
      for (const [i, outcome] of answers.entries()) {
        const { key } = stretch[i]
        outcomes.set(key, outcome)
        await manager.upsert(CandidateValue, { candidateKey: key, scoringHash, outcome }, [
          'candidateKey',
          'scoringHash',
        ])
      }
    })
    from += answers.length
  }
  return outcomes
}
