import type { z } from 'zod'
import type { Scope } from '../../shared/polytopes.ts'
import type { TargetDetail, TargetSummary, targetVersionSchema } from '../../shared/targets.ts'
import type { Target } from '../entities/target.ts'
import type { TargetVersion } from '../entities/targetVersion.ts'

/** A version with its author loaded and the number of searches that used it. */
export interface CountedVersion {
  readonly version: TargetVersion
  readonly searches: number
}

export function presentVersion({ version, searches }: CountedVersion): z.infer<typeof targetVersionSchema> {
  return {
    id: version.id,
    number: version.number,
    text: version.text,
    scoringHash: version.scoringHash,
    author: version.author?.name ?? '',
    createdAt: version.createdAt,
    searches,
  }
}

/** @param versions of this target, newest first, at least one */
export function presentTargetSummary(target: Target, versions: readonly CountedVersion[]): TargetSummary {
  return { id: target.id, name: target.name, latest: presentVersion(versions[0]), versions: versions.length }
}

export function presentTarget(
  target: Target,
  versions: readonly CountedVersion[],
  latestScope: Scope | null,
): TargetDetail {
  return { id: target.id, name: target.name, versions: versions.map(presentVersion), latestScope }
}
