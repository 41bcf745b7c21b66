import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import type { Scope } from '../../shared/polytopes.ts'
import type { ServerContext } from '../context.ts'
import { Search } from '../entities/search.ts'
import { Target } from '../entities/target.ts'
import { TargetVersion } from '../entities/targetVersion.ts'
import type { CountedVersion } from '../presenters/targets.ts'
import { notFound } from '../problems.ts'
import { requireSoundRule } from './rules.ts'

export interface TargetWithVersions {
  readonly target: Target
  /** Newest first. */
  readonly versions: readonly CountedVersion[]
}

/** One target, with the scope of its latest search. */
export interface TargetWithScope extends TargetWithVersions {
  readonly latestScope: Scope | null
}

/** The campaign's targets with all their versions, in order of creation. */
export async function listTargets(manager: EntityManager, campaignId: string): Promise<TargetWithVersions[]> {
  const targets = await manager.find(Target, {
    where: { campaignId },
    order: { createdAt: 'ASC', id: 'ASC' },
  })
  return withVersions(manager, targets)
}

export async function readTarget(
  manager: EntityManager,
  campaignId: string,
  targetId: string,
): Promise<TargetWithScope> {
  const target = await manager.findOneBy(Target, { campaignId, id: targetId })
  if (target === null) throw notFound('target')
  const [found] = await withVersions(manager, [target])
  const latest = await manager.findOne(Search, {
    select: { id: true, scope: true, createdAt: true },
    where: { campaignId, targetVersion: { targetId } },
    order: { createdAt: 'DESC', id: 'ASC' },
  })
  return { ...found, latestScope: latest?.scope ?? null }
}

/** A version of a target of this campaign, with its target loaded. */
export async function readVersion(
  manager: EntityManager,
  campaignId: string,
  versionId: string,
): Promise<TargetVersion & { target: Target }> {
  const version = await manager.findOne(TargetVersion, {
    where: { id: versionId, target: { campaignId } },
    relations: { target: true },
  })
  if (!version?.target) throw notFound('target version')
  return version as TargetVersion & { target: Target }
}

export async function createTarget(
  { writes, source, streams }: ServerContext,
  campaignId: string,
  authorId: string,
  input: { name: string; text: string },
): Promise<TargetWithScope> {
  const { scoringHash } = requireSoundRule(input.text)
  const now = new Date().toISOString()
  const target = { id: randomUUID(), campaignId, name: input.name, createdAt: now }
  await writes.transaction(async (manager) => {
    await manager.insert(Target, target)
    await manager.insert(TargetVersion, {
      id: randomUUID(),
      targetId: target.id,
      number: 1,
      text: input.text,
      scoringHash,
      authorId,
      createdAt: now,
    })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'targets' })
  return readTarget(source.manager, campaignId, target.id)
}

/** Saves a new text. The text of the newest version again makes no new version. */
export async function addVersion(
  { writes, source, streams }: ServerContext,
  campaignId: string,
  targetId: string,
  authorId: string,
  text: string,
): Promise<TargetWithScope> {
  const { scoringHash } = requireSoundRule(text)
  await writes.transaction(async (manager) => {
    if (!(await manager.existsBy(Target, { campaignId, id: targetId }))) throw notFound('target')
    const latest = await manager.findOne(TargetVersion, { where: { targetId }, order: { number: 'DESC' } })
    if (latest?.text === text) return
    await manager.insert(TargetVersion, {
      id: randomUUID(),
      targetId,
      number: (latest?.number ?? 0) + 1,
      text,
      scoringHash,
      authorId,
      createdAt: new Date().toISOString(),
    })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'targets' })
  return readTarget(source.manager, campaignId, targetId)
}

export async function renameTarget(
  { writes, source, streams }: ServerContext,
  campaignId: string,
  targetId: string,
  name: string,
): Promise<TargetWithScope> {
  await writes.transaction(async (manager) => {
    const { affected } = await manager.update(Target, { campaignId, id: targetId }, { name })
    if (affected === 0) throw notFound('target')
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'targets' })
  return readTarget(source.manager, campaignId, targetId)
}

async function withVersions(
  manager: EntityManager,
  targets: readonly Target[],
): Promise<TargetWithVersions[]> {
  const versions = await manager.find(TargetVersion, {
    where: { targetId: In(targets.map((target) => target.id)) },
    relations: { author: true },
    order: { number: 'DESC' },
  })
  const counts = await manager
    .createQueryBuilder(Search, 'search')
    .select('search.targetVersionId', 'id')
    .addSelect('COUNT(*)', 'count')
    .where({ targetVersionId: In(versions.map((version) => version.id)) })
    .groupBy('search.targetVersionId')
    .getRawMany<{ id: string; count: number }>()
  const countOf = new Map(counts.map(({ id, count }) => [id, count]))
  return targets.map((target) => ({
    target,
    versions: versions
      .filter((version) => version.targetId === target.id)
      .map((version) => ({ version, searches: countOf.get(version.id) ?? 0 })),
  }))
}
