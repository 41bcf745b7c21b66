import type { EntityManager } from 'typeorm'
import type { ImportReport } from '../../shared/polytopes.ts'
import type { ServerContext } from '../context.ts'
import { CampaignPolytope } from '../entities/campaignPolytope.ts'
import { PolytopeRecord } from '../entities/polytope.ts'
import type { PolytopeFacts } from '../jobs/compute/polytopeFacts.ts'
import { unprocessable } from '../problems.ts'

/** Blocks per piece of work on the interactive thread, which previews share. */
const stretchLength = 20

export interface Importer {
  readonly campaignId: string
  readonly authorId: string
}

type Imported = ImportReport['imported'][number]
type Problem = ImportReport['problems'][number]

/** Imports every reflexive polytope of a text and reports every block that is none, with its line. */
export async function importText(
  { config, jobs, writes }: ServerContext,
  campaignId: string,
  authorId: string,
  text: string,
  name: string | undefined,
): Promise<ImportReport> {
  const { polytopes: blocks, problems: unread } = await jobs.interactive.run('point-blocks', { text })
  refuseTooMany('polytopes', blocks.length, config.importLimit)
  if (blocks.length === 0 && unread.length === 0) {
    throw unprocessable('no-points', 'The text holds no matrix of integer points.', { path: 'text' })
  }
  const imported: Imported[] = []
  const problems: Problem[] = unread.map(({ line, code, message }) => ({ line, code, message }))
  for (let from = 0; from < blocks.length; from += stretchLength) {
    const stretch = blocks.slice(from, from + stretchLength)
    const answers = await jobs.interactive.run('facts-of-each', { points: stretch.map(({ rows }) => rows) })
    await writes.transaction(async (manager) => {
      for (const [i, { facts, problem }] of answers.entries()) {
        const { line } = stretch[i]
        if (problem) {
          problems.push({ line, ...problem })
          continue
        }
        const number = blocks.length === 1 ? '' : ` ${from + i + 1}`
        const wanted = name === undefined || name === '' ? undefined : `${name}${number}`
        imported.push({
          line,
          ...(await storePolytope(manager, { campaignId, authorId }, facts, wanted, null)),
        })
      }
    })
  }
  problems.sort((a, b) => (a.line ?? 0) - (b.line ?? 0))
  return { imported, problems }
}

/** Imports the polytope of a weight system. Mistakes are refusals (422): there is nothing else to report on. */
export async function importWeights(
  { jobs, writes }: ServerContext,
  campaignId: string,
  authorId: string,
  input: { weights: number[]; side: 'fan' | 'newton'; name?: string },
): Promise<ImportReport> {
  const { weights, side } = input
  const facts = await jobs.interactive.run('facts-of-weights', { weights, side })
  const name = input.name || `${weights.join(' ')} ${side}`
  const imported = await writes.transaction((manager) =>
    storePolytope(manager, { campaignId, authorId }, facts, name, { weights, side }),
  )
  return { imported: [{ line: null, ...imported }], problems: [] }
}

/** @throws Refusal 422 */
export function refuseTooMany(what: 'polytopes' | 'candidates', found: number, limit: number): void {
  if (found <= limit) return
  const message = `The text holds ${found} ${what}; at most ${limit} can be imported at once. Split it.`
  throw unprocessable(`too-many-${what}`, message, { path: 'text', found })
}

/** Stores a polytope for a campaign unless the campaign has it; says what it is called there. */
export async function storePolytope(
  manager: EntityManager,
  { campaignId, authorId }: Importer,
  facts: PolytopeFacts,
  wanted: string | undefined,
  origin: { weights: number[]; side: 'fan' | 'newton' } | null,
): Promise<Omit<Imported, 'line'>> {
  const { key, h11, h21 } = facts
  const name = wanted ?? `(${h11}, ${h21}) ${key.slice(0, 6)}`
  const existing = await manager.findOneBy(PolytopeRecord, { key })
  if (existing?.origin === 'bundled') return { key, name: existing.name, h11, h21, known: true }
  const own = await manager.findOneBy(CampaignPolytope, { campaignId, polytopeKey: key })
  if (own !== null) return { key, name: own.name, h11, h21, known: true }
  if (existing === null) {
    const { weights, side } = origin ?? { weights: null, side: null }
    await manager.insert(PolytopeRecord, { ...facts, name, origin: 'imported', weights, side })
  }
  const createdAt = new Date().toISOString()
  await manager.insert(CampaignPolytope, { campaignId, polytopeKey: key, name, authorId, createdAt })
  return { key, name, h11, h21, known: false }
}
