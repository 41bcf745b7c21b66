import { type Certification } from '../../shared/certificates.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../shared/shortlists.ts'
import { type Verdict } from '../../shared/verdicts.ts'

export const key = (n: number) => String(n).padStart(32, '0')

export function verdict(value: Verdict['value'], override = false): Verdict {
  return {
    id: '1',
    value,
    override,
    certificateId: null,
    reason: override ? 'recomputed by hand' : '',
    author: 'Ada Quill',
    readers: null,
    undoneBy: null,
    createdAt: '2026-01-02T03:04:05.000Z',
    targetId: 't1',
    targetName: 'Long reach',
    targetVersion: 1,
  }
}

export function row(rank: number, score: number, more: Partial<ShortlistRow> = {}): ShortlistRow {
  return {
    candidateKey: key(rank),
    polytopeKey: key(900),
    polytopeName: 'r5-0001',
    h11: 5,
    h21: 20,
    outcome: { kind: 'feasible', score, hit: score > -5, report: { reach: score, k3: rank % 2 === 0 } },
    rank,
    front: null,
    previous: null,
    external: [],
    searchId: 's1',
    certificate: { state: 'none', id: null },
    verdict: null,
    assignee: null,
    ...more,
  }
}

export function shortlist(rows: ShortlistRow[]): ShortlistDetail {
  return {
    id: 'l1',
    name: 'First pass',
    targetId: 't1',
    targetName: 'Long reach',
    targetVersion: 1,
    targetVersionId: 'tv1',
    size: rows.length,
    undecided: rows.filter(({ verdict: given }) => !given).length,
    verified: 0,
    rejected: 0,
    oneReader: 0,
    waiting: [],
    issue: 1,
    reissueOfId: null,
    reissueOf: null,
    reissues: [],
    createdAt: '2026-01-02T03:04:05.000Z',
    author: 'Ada Quill',
    rule: 'score log10(metric.divisor.top)',
    scoringHash: 'abc',
    engineVersion: '1',
    columns: ['reach', 'k3'],
    searches: [{ id: 's1', name: 'Search 1', seed: 7 }],
    provenance: null,
    rescored: [],
    external: [],
    rows,
  }
}

export function certification(total: number): Certification {
  return {
    id: 'cz1',
    state: 'running',
    targetVersionId: 'tv1',
    targetName: 'Long reach',
    targetVersion: 1,
    total,
    waiting: total,
    passed: 0,
    failed: 0,
    broken: 0,
    problems: [],
    author: 'Ada Quill',
    createdAt: '2026-01-02T03:04:05.000Z',
    finishedAt: null,
  }
}
