import { In } from 'typeorm'
import type { SearchCost, SearchCostRequest } from '../../shared/searchRunning.ts'
import type { ServerContext } from '../context.ts'
import { NullSample } from '../entities/nullSample.ts'
import { Search } from '../entities/search.ts'
import { polytopesText } from '../jobs/searchProblem.ts'
import { requireSoundRule } from './rules.ts'
import { resolveScope, scopeHash } from './scopes.ts'
import { readVersion } from './targets.ts'

/** What a search would cost on this server: a few evaluations of its rule over its scope are timed. */
export async function searchCost(
  { source, jobs }: ServerContext,
  campaignId: string,
  { targetVersionId, scope, method }: SearchCostRequest,
): Promise<SearchCost> {
  const { manager } = source
  const version = await readVersion(manager, campaignId, targetVersionId)
  const { scoringHash } = requireSoundRule(version.text, 'targetVersionId')
  const polytopes = await resolveScope(manager, campaignId, scope)
  const address = { scoringHash, scopeHash: scopeHash(polytopes.map(({ key }) => key)) }
  const measured = await jobs.costs.measure(
    `${address.scoringHash} ${address.scopeHash}`,
    () => Promise.resolve({ rule: version.text, polytopes: polytopesText(polytopes) }),
    method,
  )
  const sample = await manager.findOneBy(NullSample, address)
  const pointsMax = polytopes.reduce((most, { points }) => Math.max(most, points), 0)
  const size = sample?.size ?? jobs.nullSize(pointsMax)
  const isOver = sample !== null && (sample.complete || sample.failure !== null)
  return {
    ...measured,
    threads: jobs.background.threads,
    running: await manager.countBy(Search, { state: In(['queued', 'running']) }),
    nullLeft: isOver ? 0 : Math.max(0, size - (sample?.summary?.evaluated ?? 0)),
  }
}
