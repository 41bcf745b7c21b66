import type { ImportReport } from '../../shared/polytopes.ts'
import type { ServerContext } from '../context.ts'
import { unprocessable } from '../problems.ts'
import { refuseTooMany, storePolytope } from './imports.ts'

/** Imports the polytopes of a list of weight systems, one a line; each line is reported. */
export async function importWeightLines(
  { config, jobs, writes }: ServerContext,
  campaignId: string,
  authorId: string,
  { text, side }: { readonly text: string; readonly side: 'fan' | 'newton' },
): Promise<ImportReport> {
  const { systems, problems: unread } = await jobs.interactive.run('weight-lines', { text })
  refuseTooMany('polytopes', systems.length, config.importLimit)
  if (systems.length === 0 && unread.length === 0) {
    throw unprocessable('no-weights', 'The text holds no weight system: five positive integers a line.', {
      path: 'text',
    })
  }
  const imported: ImportReport['imported'] = []
  const problems: ImportReport['problems'] = unread.map(({ line, code, message }) => ({
    line,
    code,
    message,
  }))
  for (let from = 0; from < systems.length;) {
    const rest = systems.slice(from, from + 100)
    const answers = await jobs.interactive.run('facts-of-weight-lines', {
      systems: rest.map(({ weights }) => weights),
      side,
    })
    await writes.transaction(async (manager) => {
      for (const [i, { facts, problem }] of answers.entries()) {
        const { line, weights, name } = rest[i]
        if (problem) problems.push({ line, ...problem })
        else {
          const wanted = name ?? `${weights.join(' ')} ${side}`
          const origin = { weights: [...weights], side }
          const stored = await storePolytope(manager, { campaignId, authorId }, facts, wanted, origin)
          imported.push({ line, ...stored })
        }
      }
    })
    from += answers.length
  }
  problems.sort((a, b) => (a.line ?? 0) - (b.line ?? 0))
  return { imported, problems }
}
