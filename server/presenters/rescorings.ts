import type { Rescoring as RescoringView } from '../../shared/rescorings.ts'
import type { Rescoring } from '../entities/rescoring.ts'

/** @param rescoring with author, target version and target loaded */
export function presentRescoring(rescoring: Rescoring, scored: number): RescoringView {
  const { id, name, state, origin, targetVersion, total, broken, shortlistId, failure } = rescoring
  return {
    id,
    name,
    state,
    fromId: 'shortlistId' in origin ? origin.shortlistId : (origin.reissueOf ?? null),
    targetVersionId: rescoring.targetVersionId,
    targetName: targetVersion?.target?.name ?? '',
    targetVersion: targetVersion?.number ?? 0,
    total,
    scored,
    broken,
    shortlistId,
    failure,
    author: rescoring.author?.name ?? '',
    createdAt: rescoring.createdAt,
    finishedAt: rescoring.finishedAt,
  }
}
