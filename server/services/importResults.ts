import { randomUUID } from 'node:crypto'
import { In, type EntityManager } from 'typeorm'
import { engineVersion } from '../../scoring/index.ts'
import { nullSummarySchema, type NullSummary } from '../../shared/nullSamples.ts'
import type { SearchDetail, SearchProgress } from '../../shared/searches.ts'
import type { ServerContext } from '../context.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import { Search } from '../entities/search.ts'
import { Target } from '../entities/target.ts'
import { TargetVersion } from '../entities/targetVersion.ts'
import type { PolytopeFacts } from '../jobs/compute/polytopeFacts.ts'
import type { ReportedResult } from '../jobs/compute/searchResults.ts'
import type { SegmentFind } from '../jobs/segment.ts'
import { unprocessable } from '../problems.ts'
import { refuseTooMany, storePolytope, type Importer } from './imports.ts'
import { requireSoundRule } from './rules.ts'
import { storeFinds } from './searchCommits.ts'
import { recordSearchEvent } from './searchEvents.ts'
import { readSearch } from './searches.ts'
import { storeStarts } from './searchStarts.ts'
import { scopeHash } from './scopes.ts'

/** Polytopes and candidates of one piece of work. */
const stretchLength = 20

/**
 * Imports what a headless search printed as a search of the campaign that has ended. Every candidate it lists is placed
 * and scored anew on the import's thread; a difference refuses the whole, with line, found and expected. Counts, curve and null sample cannot be found again without running it: they
 * are kept as reported.
 */
export async function importResult(
  context: ServerContext,
  importer: Importer,
  { text, source, name }: { readonly text: string; readonly source: string; readonly name?: string },
): Promise<SearchDetail> {
  const { jobs, writes, streams, config } = context
  const { manager } = context.source
  const reported = await jobs.unhurried.run('read-search-result', { text })
  const { spec } = reported
  refuseTooMany('polytopes', spec.polytopes.length, config.importLimit)
  const { scoringHash } = requireSoundRule(spec.ruleText)
  const finds = await checkedFinds(context, reported)
  requireBest(reported, finds)
  const facts = await unknownPolytopes(context, reported)
  // The order in which the engine numbers them decides about the run: it is kept as it was.
  const polytopeKeys = spec.polytopes.map(({ key }) => key)
  const id = randomUUID()
  const now = new Date().toISOString()
  const { campaignId, authorId } = importer
  const summary = reportedNull(reported)
  await writes.transaction(async (manager) => {
    for (const one of facts) await storePolytope(manager, importer, one, undefined, null)
    const version = await versionOf(manager, importer, spec.ruleText, scoringHash, source)
    const { progress } = reported
    await manager.insert(Search, {
      id,
      campaignId,
      targetVersionId: version.id,
      name: name || `Result of ${source}`.slice(0, 80),
      method: spec.method,
      scope: { kind: 'polytopes', keys: polytopeKeys.slice(0, 500) },
      polytopeKeys,
      scopeHash: scopeHash(polytopeKeys),
      budget: spec.extensions.reduce((sum, more) => sum + more, spec.settings.budget),
      seed: spec.seed,
      islands: spec.settings.islands,
      keep: spec.settings.keep,
      surrogate: spec.settings.surrogate,
      settings: spec.methodSettings,
      startsFrom:
        spec.starts.length === 0
          ? null
          : { kind: 'file', id: null, name: source, count: spec.starts.length, used: spec.startsUsed },
      extensions: [...spec.extensions],
      imported: { source, checked: finds.length, null: summary },
      scoringHash,
      engineVersion,
      state: 'finished',
      failureCode: null,
      failureMessage: null,
      progress: progressOf(progress),
      evaluations: progress.evaluations,
      best: progress.best,
      workMilliseconds: 0,
      leaseOwner: null,
      leaseBeat: null,
      authorId,
      createdAt: now,
      finishedAt: now,
    })
    await storeFinds(
      manager,
      id,
      scoringHash,
      finds.map((find) => ({ ...find, island: 0 })),
    )
    await storeStarts(manager, id, spec.starts)
    await recordSearchEvent(manager, id, 'imported', { accountId: authorId, note: source })
  })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'searches' })
  streams.toCampaign(campaignId, { kind: 'changed', what: 'targets' })
  jobs.invariants.wake()
  return readSearch(manager, campaignId, id)
}

/** Every listed candidate, placed and scored anew, piece by piece. */
async function checkedFinds({ jobs }: ServerContext, reported: ReportedResult): Promise<SegmentFind[]> {
  const { top, lines, spec } = reported
  const finds: SegmentFind[] = []
  while (finds.length < top.length) {
    const stretch = top.slice(finds.length, finds.length + stretchLength)
    const keys = new Set(stretch.map(({ polytopeKey }) => polytopeKey))
    const checked = await jobs.interactive.run('check-search-result', {
      rule: spec.ruleText,
      polytopes: spec.polytopes.filter(({ key }) => keys.has(key)),
      top: stretch,
      line: lines.final,
      first: finds.length + 1,
    })
    finds.push(...checked)
  }
  return finds
}

/** @throws Refusal result.order, result.other-best */
function requireBest({ progress, lines }: ReportedResult, finds: readonly SegmentFind[]): void {
  const [first] = finds
  const best = first?.outcome.kind === 'feasible' ? first.outcome.score : null
  if (progress.best === best) return
  throw unprocessable(
    'result.other-best',
    `Line ${lines.final}: found the best score ${progress.best}, expected ${best} from the first candidate of "top".`,
    { path: `line ${lines.final}: progress.best`, found: progress.best },
  )
}

async function unknownPolytopes(
  { source, jobs }: ServerContext,
  { spec }: ReportedResult,
): Promise<PolytopeFacts[]> {
  const keys = spec.polytopes.map(({ key }) => key)
  const bundled = new Set<string>()
  for (let from = 0; from < keys.length; from += 5_000) {
    const rows = await source.manager.find(PolytopeRecord, {
      select: { key: true },
      where: { key: In(keys.slice(from, from + 5_000)), origin: 'bundled' },
    })
    for (const { key } of rows) bundled.add(key)
  }
  const open = spec.polytopes.filter(({ key }) => !bundled.has(key))
  const facts: PolytopeFacts[] = []
  for (let from = 0; from < open.length; from += stretchLength) {
    const stretch = open.slice(from, from + stretchLength)
    const answers = await jobs.interactive.run('facts-of-each', {
      points: stretch.map(({ vertices }) => vertices),
    })
    for (const { facts: found } of answers) if (found) facts.push(found)
  }
  return facts
}

/** The campaign's latest version with this scoring; a target of its own where there is none. */
async function versionOf(
  manager: EntityManager,
  { campaignId, authorId }: Importer,
  text: string,
  scoringHash: string,
  source: string,
): Promise<{ readonly id: string }> {
  const known = await manager.findOne(TargetVersion, {
    where: { scoringHash, target: { campaignId } },
    order: { createdAt: 'DESC' },
  })
  if (known !== null) return known
  const createdAt = new Date().toISOString()
  const target = { id: randomUUID(), campaignId, name: `Rule of ${source}`.slice(0, 80), createdAt }
  await manager.insert(Target, target)
  const version = { id: randomUUID(), targetId: target.id, number: 1, text, scoringHash, authorId, createdAt }
  await manager.insert(TargetVersion, version)
  return version
}

/** @throws Refusal result.null */
function reportedNull({ null: given, lines }: ReportedResult): NullSummary | null {
  if (given === null || given === undefined) return null
  const parsed = nullSummarySchema.safeParse(given)
  if (parsed.success) return parsed.data
  const [issue] = parsed.error.issues
  throw unprocessable('result.null', `Line ${lines.final}, null.${issue.path.join('.')}: ${issue.message}`, {
    path: `line ${lines.final}: null`,
  })
}

function progressOf(progress: ReportedResult['progress']): SearchProgress {
  return {
    ...progress,
    islands: progress.islands.map(({ ended, ...island }) => ({
      ...island,
      exhausted: ended === 'space-exhausted',
    })),
    evaluationsPerSecond: null,
    secondsLeft: 0,
  }
}
