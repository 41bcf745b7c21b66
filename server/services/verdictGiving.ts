import type { EntityManager } from 'typeorm'
import type { VerdictsGiven, VerdictValue } from '../../shared/verdicts.ts'
import type { ServerContext } from '../context.ts'
import { Campaign } from '../entities/campaign.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import type { Verdict } from '../entities/verdict.ts'
import { presentVerdict } from '../presenters/verdicts.ts'
import { unprocessable, type Refusal } from '../problems.ts'
import { latestCertificates } from './certificates.ts'
import { readCampaignCandidate, visibleKeys } from './candidates.ts'
import { readersAfter } from './secondReading.ts'
import { readVersion } from './targets.ts'
import { insertVerdicts, latestVerdicts, standingEntry, verdictsById } from './verdicts.ts'

interface Word {
  readonly targetVersionId: string
  readonly value: VerdictValue
  readonly reason: string
}

interface Judge {
  readonly id: string
  readonly name: string
}

/** Verdicts of one event: a list of thousands is told in parts. */
const perEvent = 500

/**
 * Records a person's word on a candidate for a target. "Verified" rests on a passing certificate for this scoring
 * (the latest of the campaign counts); where there is none it needs a reason and is kept as an override.
 */
export async function giveVerdict(
  { source, writes, streams }: ServerContext,
  { campaignId, candidateKey }: { campaignId: string; candidateKey: string },
  author: Judge,
  word: Word,
): Promise<Verdict> {
  await readCampaignCandidate(source.manager, campaignId, candidateKey)
  const version = await readVersion(source.manager, campaignId, word.targetVersionId)
  const { ids, refused } = await writes.transaction((manager) =>
    record(manager, { campaignId, version, author, word, keys: [candidateKey] }),
  )
  for (const refusal of refused.values()) throw refusal
  const [given] = await verdictsById(source.manager, ids)
  streams.toCampaign(campaignId, { kind: 'verdict', candidateKey, verdict: presentVerdict(given) })
  return given
}

/** The same word on many candidates: each is decided by itself, and a refusal of one holds up no other. */
export async function giveVerdicts(
  context: ServerContext,
  campaignId: string,
  author: Judge,
  { candidateKeys, ...word }: Word & { readonly candidateKeys: readonly string[] },
): Promise<VerdictsGiven> {
  const { source, writes } = context
  const version = await readVersion(source.manager, campaignId, word.targetVersionId)
  const asked = [...new Set(candidateKeys)]
  const seen = await visibleKeys(source.manager, { campaignId }, asked)
  const { ids, refused } = await writes.transaction((manager) =>
    record(manager, { campaignId, version, author, word, keys: asked.filter((key) => seen.has(key)) }),
  )
  const unknown = asked.filter((key) => !seen.has(key))
  return tell(context, campaignId, ids, [
    ...[...refused].map(([candidateKey, { code, message }]) => ({ candidateKey, code, message })),
    ...unknown.map((candidateKey) => ({
      candidateKey,
      code: 'not-found',
      message: 'There is no such candidate.',
    })),
  ])
}

/** Tells the campaign of new entries. */
export async function tell(
  { source, streams }: Pick<ServerContext, 'source' | 'streams'>,
  campaignId: string,
  ids: readonly number[],
  refused: VerdictsGiven['refused'],
): Promise<VerdictsGiven> {
  const entries = await verdictsById(source.manager, ids)
  const given = entries.map((entry) => ({
    candidateKey: entry.candidateKey,
    verdict: presentVerdict(entry),
  }))
  for (let from = 0; from < given.length; from += perEvent) {
    streams.toCampaign(campaignId, { kind: 'verdicts', verdicts: given.slice(from, from + perEvent) })
  }
  return { given, refused }
}

interface Record {
  readonly campaignId: string
  readonly version: TargetVersion
  readonly author: Judge
  readonly word: Word
  /** Different candidates, all known to the campaign. */
  readonly keys: readonly string[]
}

/** Stores one entry per candidate, but for those that are refused. */
async function record(
  manager: EntityManager,
  { campaignId, version, author, word, keys }: Record,
): Promise<{ ids: number[]; refused: Map<string, Refusal> }> {
  const { secondReader } = await manager.findOneByOrFail(Campaign, { id: campaignId })
  const certificates = await latestCertificates(manager, campaignId, version, keys)
  const standing = secondReader
    ? await latestVerdicts(manager, campaignId, version.targetId, keys)
    : new Map<string, Verdict>()
  const verified = word.value === 'verified'
  const createdAt = new Date().toISOString()
  const entries: Partial<Verdict>[] = []
  const refused = new Map<string, Refusal>()
  for (const candidateKey of keys) {
    const certificate = certificates.get(candidateKey)
    const override = verified && !certificate?.passed
    if (override && word.reason === '') {
      refused.set(candidateKey, reasonRequired(certificate !== undefined))
      continue
    }
    const before = standing.get(candidateKey)
    entries.push({
      campaignId,
      candidateKey,
      targetVersionId: version.id,
      value: word.value,
      reason: word.reason,
      override,
      certificateId: verified && !override ? (certificate?.id ?? null) : null,
      authorId: author.id,
      createdAt,
      readers: readersAfter(secondReader, before ? standingEntry(before) : null, {
        value: word.value,
        author: { id: author.id, name: author.name },
        targetVersionId: version.id,
      }),
      undoesId: null,
      restoresId: null,
    })
  }
  return { ids: await insertVerdicts(manager, entries), refused }
}

function reasonRequired(certificateFailed: boolean): Refusal {
  return unprocessable(
    'reason-required',
    certificateFailed
      ? 'The latest certificate of this candidate did not pass; to verify it all the same, give a reason.'
      : 'There is no passing certificate for this candidate; to verify it all the same, give a reason.',
    { path: 'reason' },
  )
}
