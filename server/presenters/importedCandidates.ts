import type { EarlierVerdict, ImportedCandidate as ImportedView } from '../../shared/importedCandidates.ts'
import type { ImportedCandidate } from '../entities/importedCandidate.ts'
import type { Verdict } from '../entities/verdict.ts'

/** @param verdict with target version and target loaded */
export function presentEarlierVerdict(verdict: Verdict): EarlierVerdict {
  const version = verdict.targetVersion
  return {
    value: verdict.value,
    override: verdict.override,
    readers: verdict.readers,
    targetId: version?.targetId ?? '',
    targetName: version?.target?.name ?? '',
    targetVersion: version?.number ?? 0,
  }
}

/** @param imported with author, candidate and polytope loaded */
export function presentImportedCandidate(
  imported: ImportedCandidate,
  names: ReadonlyMap<string, string>,
  verdicts: ReadonlyMap<string, EarlierVerdict[]>,
): ImportedView {
  const polytope = imported.candidate?.polytope
  if (!polytope) throw new Error('An imported candidate was presented without its polytope.')
  return {
    key: imported.candidateKey,
    name: imported.name,
    source: imported.source,
    line: imported.line,
    author: imported.author?.name ?? '',
    createdAt: imported.createdAt,
    polytopeKey: polytope.key,
    polytopeName: names.get(polytope.key) ?? polytope.name,
    h11: polytope.h11,
    h21: polytope.h21,
    favourable: polytope.favourable,
    verdicts: verdicts.get(imported.candidateKey) ?? [],
  }
}
