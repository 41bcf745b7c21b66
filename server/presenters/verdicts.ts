import type { Verdict as VerdictView } from '../../shared/verdicts.ts'
import type { Verdict } from '../entities/verdict.ts'

/** @param verdict with author, target version, target, and the entry it restores with its author loaded */
export function presentVerdict(verdict: Verdict): VerdictView {
  const version = verdict.targetVersion
  return {
    id: String(verdict.id),
    value: verdict.value,
    reason: verdict.reason,
    override: verdict.override,
    certificateId: verdict.certificateId,
    author: (verdict.restores ?? verdict).author?.name ?? '',
    readers: verdict.readers,
    undoneBy: verdict.undoesId === null ? null : (verdict.author?.name ?? ''),
    createdAt: verdict.createdAt,
    targetId: version?.targetId ?? '',
    targetName: version?.target?.name ?? '',
    targetVersion: version?.number ?? 0,
  }
}
