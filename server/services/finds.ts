import { In, type EntityManager } from 'typeorm'
import { compareOutcomes, type Infeasible, type Outcome } from '../../scoring/index.ts'
import type { OutcomeView, ScoredRow } from '../../shared/outcomes.ts'
import { CandidateValue } from '../entities/candidateValue.ts'
import { Find } from '../entities/find.ts'
import type { Search } from '../entities/search.ts'
import type { HitLine } from '../jobs/searchProgress.ts'

/** The order of candidates of the scoring language: negative when a is better. */
export function compareCandidates(
  a: { readonly candidateKey: string; readonly outcome: OutcomeView },
  b: { readonly candidateKey: string; readonly outcome: OutcomeView },
): number {
  return compareOutcomes(comparable(a.outcome), a.candidateKey, comparable(b.outcome), b.candidateKey)
}

/** What the order looks at; reports and labels play no part in it. */
export function comparable(outcome: OutcomeView): Outcome {
  if (outcome.kind === 'feasible') return { ...outcome, report: {} }
  if (outcome.kind === 'infeasible')
    return { ...outcome, stage: outcome.stage as Infeasible['stage'], failed: [] }
  return { ...outcome, stage: outcome.stage as Infeasible['stage'] }
}

/** The best finds of one search so far. */
export async function topFinds(manager: EntityManager, search: Search, count: number): Promise<ScoredRow[]> {
  const finds = await manager.find(Find, {
    where: { searchId: search.id },
    relations: { candidate: { polytope: true } },
    order: { rank: 'ASC' },
    take: count,
  })
  const keys = finds.map(({ candidateKey }) => candidateKey)
  const outcomes = await outcomesOf(manager, search.scoringHash, keys)
  return finds.flatMap(({ candidateKey, candidate }) => {
    const outcome = outcomes.get(candidateKey)
    const polytope = candidate?.polytope
    if (!outcome || !polytope) return []
    return [{ candidateKey, polytopeKey: polytope.key, h11: polytope.h11, h21: polytope.h21, outcome }]
  })
}

export async function outcomesOf(
  manager: EntityManager,
  scoringHash: string,
  candidateKeys: readonly string[],
): Promise<Map<string, OutcomeView>> {
  const values = await manager.findBy(CandidateValue, { scoringHash, candidateKey: In([...candidateKeys]) })
  return new Map(values.map(({ candidateKey, outcome }) => [candidateKey, outcome]))
}

/** Marks what lies above the null's quantile where that is the hit line; else nothing changes. */
export function withHitLine(outcome: OutcomeView, line: HitLine): OutcomeView {
  if (outcome.kind !== 'feasible' || typeof line !== 'number') return outcome
  return { ...outcome, hit: outcome.score > line }
}
