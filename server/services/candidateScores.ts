import { In } from 'typeorm'
import type { CandidateScore } from '../../shared/candidates.ts'
import type { OutcomeView } from '../../shared/outcomes.ts'
import type { ServerContext } from '../context.ts'
import type { CandidateRecord } from '../entities/candidate.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { readCampaignCandidate } from './candidates.ts'
import { certificateMarks } from './certificates.ts'
import { requireSoundRule } from './rules.ts'
import { readVersion } from './targets.ts'

/** Candidates sent to the interactive thread at a time; it answers for as many as a piece of its time allows. */
const stretchLength = 50

/** What a target version says of one candidate that the campaign may see. */
export async function readCandidateScore(
  context: ServerContext,
  campaignId: string,
  candidateKey: string,
  versionId: string,
): Promise<CandidateScore> {
  const { manager } = context.source
  const candidate = await readCampaignCandidate(manager, campaignId, candidateKey)
  const version = await readVersion(manager, campaignId, versionId)
  const { scoringHash, engineVersion } = requireSoundRule(version.text, 'version')
  const outcome = (await scoresOf(context, version.text, scoringHash, [candidate])).get(candidateKey)
  if (outcome === undefined) throw new Error('A candidate was not scored.')
  const marks = await certificateMarks(manager, campaignId, version, [candidateKey])
  return {
    targetId: version.targetId,
    targetName: version.target.name,
    targetVersion: version.number,
    targetVersionId: version.id,
    scoringHash,
    engineVersion,
    outcome,
    certificate: marks(candidateKey),
  }
}

/**
 * What a rule says of each candidate: known values under its scoring hash, the others computed and stored.
 *
 * @param candidates with their polytopes loaded
 */
export async function scoresOf(
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
