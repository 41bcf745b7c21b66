import type { ServerContext } from '../context.ts'
import { NullSample } from '../entities/nullSample.ts'
import { Search } from '../entities/search.ts'
import { readPolytopes } from '../jobs/searchProblem.ts'
import { notFound } from '../problems.ts'
import { readStarts } from './searchStarts.ts'

/** The search's budget before it was extended. */
export function originalBudget({ budget, extensions }: Pick<Search, 'budget' | 'extensions'>): number {
  return extensions.reduce((left, more) => left - more, budget)
}

/**
 * The specification of a search as the headless command takes it: run there, it ends with the same candidates, curve
 * and counts, to the bit. Polytopes stand in the order in which the search numbers them.
 */
export async function searchSpecification(
  { source }: Pick<ServerContext, 'source'>,
  campaignId: string,
  searchId: string,
): Promise<{ readonly name: string; readonly specification: Readonly<Record<string, unknown>> }> {
  const { manager } = source
  const search = await manager.findOne(Search, {
    where: { campaignId, id: searchId },
    relations: { targetVersion: true },
  })
  if (!search?.targetVersion) throw notFound('search')
  const {
    polytopeKeys,
    scopeHash,
    scoringHash,
    method,
    seed,
    islands,
    keep,
    settings,
    surrogate,
    extensions,
  } = search
  const polytopes = await readPolytopes(source, polytopeKeys)
  const starts = await readStarts(manager, searchId)
  const sample = await manager.findOneBy(NullSample, { scopeHash, scoringHash })
  const drawn = search.imported?.null ?? sample
  return {
    name: search.name,
    specification: {
      schema: 'tessellary.search/1',
      scope: { polytopes: polytopes.map(({ coordinates }) => ({ vertices: coordinates })) },
      rule: search.targetVersion.text,
      method,
      budget: originalBudget(search),
      seed,
      islands,
      keep,
      settings: { ...settings, surrogate },
      ...(starts.length > 0 && { starts }),
      ...(extensions.length > 0 && { extensions }),
      ...(drawn && { null: { size: drawn.size, seed: drawn.seed } }),
    },
  }
}
