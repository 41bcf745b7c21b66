import { IsNull, type EntityManager, type FindOptionsWhere } from 'typeorm'
import { engineVersion } from '../../scoring/index.ts'
import type { CandidateCertificates, CertificateMark } from '../../shared/certificates.ts'
import { may } from '../../shared/roles.ts'
import { CertificateRecord } from '../entities/certificate.ts'
import { Membership } from '../entities/membership.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'
import { presentCertificate } from '../presenters/certificates.ts'
import { notFound } from '../problems.ts'
import { readCampaignCandidate, readVisibleCandidate } from './candidates.ts'
import { scoringHashOf } from './rules.ts'

const withWords = { author: true, targetVersion: { target: true } } as const

/** Certificates of one candidate that are shown; older ones stay stored. */
const shownCertificates = 50

/** Certificates of the geometry alone, for everybody who may see the candidate. */
export async function listGeometryCertificates(
  manager: EntityManager,
  accountId: string,
  candidateKey: string,
): Promise<CandidateCertificates> {
  await readVisibleCandidate(manager, { accountId }, candidateKey)
  const found = await listNewest(manager, [{ candidateKey, scoringHash: IsNull() }])
  return { certificates: found.map((certificate) => presentCertificate(certificate, false)), waiting: [] }
}

/** The campaign's certificates of a candidate, those of the geometry alone, and the requests it waits in. */
export async function listCampaignCertificates(
  manager: EntityManager,
  campaignId: string,
  candidateKey: string,
): Promise<CandidateCertificates> {
  await readCampaignCandidate(manager, campaignId, candidateKey)
  const found = await listNewest(manager, [
    { candidateKey, campaignId },
    { candidateKey, scoringHash: IsNull() },
  ])
  const waiting = await manager.query<CandidateCertificates['waiting']>(
    `SELECT c.id AS certificationId, c.targetVersionId AS targetVersionId,
       (SELECT COUNT(*) FROM certification_task b
        WHERE b.certificationId = c.id AND b.state = 'waiting' AND b.place < t.place) AS before
     FROM certification_task t JOIN certification c ON c.id = t.certificationId
     WHERE t.candidateKey = ? AND t.state = 'waiting' AND c.campaignId = ? AND c.state IN ('queued', 'running')
     ORDER BY c.createdAt`,
    [candidateKey, campaignId],
  )
  return {
    certificates: found.map((certificate) =>
      presentCertificate(certificate, certificate.campaignId === campaignId),
    ),
    waiting,
  }
}

function listNewest(
  manager: EntityManager,
  where: FindOptionsWhere<CertificateRecord>[],
): Promise<CertificateRecord[]> {
  return manager.find(CertificateRecord, {
    where,
    relations: withWords,
    order: { createdAt: 'DESC', id: 'ASC' },
    take: shownCertificates,
  })
}

/**
 * The whole of a certificate as JSON text: one of the geometry alone for everybody who may see the candidate, one
 * with a scoring for members of its campaign.
 */
export async function readCertificateBody(
  manager: EntityManager,
  accountId: string,
  candidateKey: string,
  id: string,
): Promise<string> {
  await readVisibleCandidate(manager, { accountId }, candidateKey)
  const certificate = await manager.findOne(CertificateRecord, {
    select: { id: true, campaignId: true, scoringHash: true, body: true },
    where: { id, candidateKey },
  })
  if (certificate === null) throw notFound('certificate')
  if (certificate.scoringHash !== null) {
    const { campaignId } = certificate
    const membership = await manager.findOneBy(Membership, { campaignId, accountId })
    if (!may(membership?.role, 'exports.read')) throw notFound('certificate')
  }
  return certificate.body
}

/**
 * The campaign's latest certificate of each candidate for a target version as it scores under the present engine; it
 * is the latest that counts.
 */
export async function latestCertificates(
  manager: EntityManager,
  campaignId: string,
  version: Pick<TargetVersion, 'text'>,
  candidateKeys: readonly string[],
): Promise<
  Map<string, { readonly id: string; readonly passed: boolean; readonly certifierVersion: string }>
> {
  const scoringHash = scoringHashOf(version.text)
  if (scoringHash === null) return new Map()
  const rows = await manager.query<
    { candidateKey: string; id: string; passed: number; certifierVersion: string }[]
  >(
    `SELECT candidateKey, id, passed, certifierVersion FROM certificate
     WHERE campaignId = ? AND scoringHash = ? AND candidateKey IN (SELECT value FROM json_each(?))
     ORDER BY createdAt, rowid`,
    [campaignId, scoringHash, JSON.stringify(candidateKeys)],
  )
  return new Map(
    rows.map(({ candidateKey, id, passed, certifierVersion }) => [
      candidateKey,
      { id, passed: passed === 1, certifierVersion },
    ]),
  )
}

/** Which of the candidates wait to be certified for a target version (null: for their geometry alone). */
async function waitingKeys(
  manager: EntityManager,
  campaignId: string,
  targetVersionId: string | null,
  candidateKeys: readonly string[],
): Promise<Set<string>> {
  const rows = await manager.query<{ key: string }[]>(
    `SELECT t.candidateKey AS "key"
     FROM certification_task t JOIN certification c ON c.id = t.certificationId
     WHERE t.state = 'waiting' AND c.campaignId = ? AND c.targetVersionId IS ? AND c.state IN ('queued', 'running')
       AND t.candidateKey IN (SELECT value FROM json_each(?))`,
    [campaignId, targetVersionId, JSON.stringify(candidateKeys)],
  )
  return new Set(rows.map(({ key }) => key))
}

const noMark: CertificateMark = { state: 'none', id: null }

/** What a list says of each candidate's certificate; absent: none. */
export async function certificateMarks(
  manager: EntityManager,
  campaignId: string,
  version: Pick<TargetVersion, 'id' | 'text'>,
  candidateKeys: readonly string[],
): Promise<(candidateKey: string) => CertificateMark> {
  const latest = await latestCertificates(manager, campaignId, version, candidateKeys)
  const waiting = await waitingKeys(manager, campaignId, version.id, candidateKeys)
  return (key) => {
    const certificate = latest.get(key)
    if (waiting.has(key)) return { state: 'waiting', id: certificate?.id ?? null }
    return certificate ? { state: certificate.passed ? 'passed' : 'failed', id: certificate.id } : noMark
  }
}

/**
 * Which of the candidates need not be certified: those that wait for it, and those that have a certificate of this
 * scoring (without a version: of the geometry, wherever it was asked for) by the given certifier.
 */
export async function certifiedKeys(
  manager: EntityManager,
  campaignId: string,
  version: Pick<TargetVersion, 'id' | 'text'> | null,
  candidateKeys: readonly string[],
  certifierVersion: string,
): Promise<{ waiting: Set<string>; certified: Set<string> }> {
  const waiting = await waitingKeys(manager, campaignId, version?.id ?? null, candidateKeys)
  if (version !== null) {
    const latest = await latestCertificates(manager, campaignId, version, candidateKeys)
    const present = [...latest].filter(([, certificate]) => certificate.certifierVersion === certifierVersion)
    return { waiting, certified: new Set(present.map(([key]) => key)) }
  }
  const rows = await manager.query<{ key: string }[]>(
    `SELECT DISTINCT candidateKey AS "key" FROM certificate
     WHERE scoringHash IS NULL AND engineVersion = ? AND certifierVersion = ?
       AND candidateKey IN (SELECT value FROM json_each(?))`,
    [engineVersion, certifierVersion, JSON.stringify(candidateKeys)],
  )
  return { waiting, certified: new Set(rows.map(({ key }) => key)) }
}
