import { In, type EntityManager } from 'typeorm'
import type { VerdictValue } from '../../shared/verdicts.ts'
import type { ServerContext } from '../context.ts'
import { Verdict } from '../entities/verdict.ts'
import type { Tally } from '../presenters/shortlists.ts'
import { presentVerdict } from '../presenters/verdicts.ts'
import { unprocessable } from '../problems.ts'
import { latestCertificates } from './certificates.ts'
import { readCampaignCandidate } from './candidates.ts'
import { readVersion } from './targets.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/**
 * Records a person's word on a candidate for a target. "Verified" rests on a passing certificate for this scoring
 * (the latest of the campaign counts); where there is none it needs a reason and is kept as an override.
 */
export async function giveVerdict(
  { source, writes, streams }: ServerContext,
  place: { campaignId: string; candidateKey: string },
  authorId: string,
  input: { targetVersionId: string; value: VerdictValue; reason: string },
): Promise<Verdict> {
  const { campaignId, candidateKey } = place
  await readCampaignCandidate(source.manager, campaignId, candidateKey)
  const version = await readVersion(source.manager, campaignId, input.targetVersionId)
  const verified = input.value === 'verified'
  const id = await writes.transaction(async (manager) => {
    const latest = await latestCertificates(manager, campaignId, version, [candidateKey])
    const certificate = latest.get(candidateKey)
    const override = verified && !certificate?.passed
    if (override && input.reason === '') throw reasonRequired(certificate !== undefined)
    const inserted = await manager.insert(Verdict, {
      campaignId,
      candidateKey,
      targetVersionId: input.targetVersionId,
      value: input.value,
      reason: input.reason,
      override,
      certificateId: verified && !override ? (certificate?.id ?? null) : null,
      authorId,
      createdAt: new Date().toISOString(),
    })
    return Number(inserted.identifiers[0]?.id)
  })
  const given = await source.manager.findOneOrFail(Verdict, { where: { id }, relations: withWords })
  streams.toCampaign(campaignId, { kind: 'verdict', candidateKey, verdict: presentVerdict(given) })
  return given
}

function reasonRequired(certificateFailed: boolean) {
  return unprocessable(
    'reason-required',
    certificateFailed
      ? 'The latest certificate of this candidate did not pass; to verify it all the same, give a reason.'
      : 'There is no passing certificate for this candidate; to verify it all the same, give a reason.',
    { path: 'reason' },
  )
}

/** All verdicts of the campaign on a candidate, newest first. */
export function listVerdicts(
  manager: EntityManager,
  campaignId: string,
  candidateKey: string,
): Promise<Verdict[]> {
  return manager.find(Verdict, {
    where: { campaignId, candidateKey },
    relations: withWords,
    order: { id: 'DESC' },
  })
}

/** The verdict that counts, per candidate, for one target in one campaign. */
export async function latestVerdicts(
  manager: EntityManager,
  campaignId: string,
  targetId: string,
  candidateKeys: readonly string[],
): Promise<Map<string, Verdict>> {
  const verdicts = await manager.find(Verdict, {
    where: { campaignId, targetVersion: { targetId }, candidateKey: In([...candidateKeys]) },
    relations: withWords,
    order: { id: 'ASC' },
  })
  return new Map(verdicts.map((verdict) => [verdict.candidateKey, verdict]))
}

/** Size and decisions of every shortlist of some campaigns. */
export async function tallyShortlists(
  manager: EntityManager,
  campaignIds: readonly string[],
): Promise<Map<string, Tally>> {
  const places = campaignIds.map(() => '?').join(', ')
  const rows = await manager.query<{ id: string; size: number; verified: number; rejected: number }[]>(
    `WITH latest AS (
       SELECT MAX(v.id) AS id
       FROM verdict v JOIN target_version t ON t.id = v.targetVersionId
       WHERE v.campaignId IN (${places})
       GROUP BY v.campaignId, v.candidateKey, t.targetId
     ),
     word AS (
       SELECT v.campaignId, v.candidateKey, t.targetId, v.value
       FROM latest JOIN verdict v ON v.id = latest.id JOIN target_version t ON t.id = v.targetVersionId
     )
     SELECT s.id AS id, COUNT(*) AS size,
       COALESCE(SUM(w.value = 'verified'), 0) AS verified,
       COALESCE(SUM(w.value = 'rejected'), 0) AS rejected
     FROM shortlist s
     JOIN target_version st ON st.id = s.targetVersionId
     JOIN shortlist_entry e ON e.shortlistId = s.id
     LEFT JOIN word w
       ON w.campaignId = s.campaignId AND w.candidateKey = e.candidateKey AND w.targetId = st.targetId
     WHERE s.campaignId IN (${places})
     GROUP BY s.id`,
    [...campaignIds, ...campaignIds],
  )
  return new Map(rows.map(({ id, size, verified, rejected }) => [id, { size, verified, rejected }]))
}
