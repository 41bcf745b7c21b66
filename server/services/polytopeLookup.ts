import type { EntityManager } from 'typeorm'
import { findPolytopesLimit, type FoundPolytopes } from '../../shared/polytopeStructure.ts'
import type { ServerContext } from '../context.ts'
import type { PolytopeFacts } from '../jobs/compute/polytopeFacts.ts'
import { Refusal, unprocessable } from '../problems.ts'
import { weightsIn } from './polytopeFilter.ts'
import { ownNames, visible } from './polytopes.ts'
import type { Viewer } from './visibility.ts'

type Found = FoundPolytopes['found'][number]
type Computed = Omit<Found, 'name'>

/**
 * Whether the library holds given polytopes, in whatever coordinates: five weights, or matrices of points as an import
 * takes them. Nothing is stored.
 */
export async function findPolytopes(
  context: ServerContext,
  viewer: Viewer,
  text: string,
): Promise<FoundPolytopes> {
  const weights = weightsIn(text)
  const { computed, problems } =
    weights === null ? await fromPoints(context, text) : await fromWeights(context, weights)
  const names = await namesOf(
    context.source.manager,
    viewer,
    computed.map(({ key }) => key),
  )
  return { found: computed.map((one) => ({ ...one, name: names.get(one.key) ?? null })), problems }
}

interface Outcome {
  readonly computed: Computed[]
  readonly problems: FoundPolytopes['problems']
}

async function fromPoints({ jobs }: ServerContext, text: string): Promise<Outcome> {
  const { polytopes, problems: unread } = await jobs.interactive.run('point-blocks', { text })
  if (polytopes.length === 0 && unread.length === 0) {
    throw unprocessable('no-points', 'The text holds no matrix of integer points, and not five weights.', {
      path: 'text',
    })
  }
  if (polytopes.length > findPolytopesLimit) {
    throw unprocessable(
      'too-many-polytopes',
      `At most ${findPolytopesLimit} polytopes can be looked up at once.`,
      { path: 'text', found: polytopes.length },
    )
  }
  const answers = await jobs.interactive.run('facts-of-each', { points: polytopes.map(({ rows }) => rows) })
  const computed: Computed[] = []
  const problems: Outcome['problems'] = unread.map(({ line, code, message }) => ({ line, code, message }))
  for (const [i, { facts, problem }] of answers.entries()) {
    const { line } = polytopes[i]
    if (facts) computed.push({ line, side: null, ...numbersOf(facts) })
    else problems.push({ line, code: problem.code, message: problem.message })
  }
  problems.sort((a, b) => (a.line ?? 0) - (b.line ?? 0))
  return { computed, problems }
}

async function fromWeights({ jobs }: ServerContext, weights: number[]): Promise<Outcome> {
  const computed: Computed[] = []
  try {
    for (const side of ['fan', 'newton'] as const) {
      const facts = await jobs.interactive.run('facts-of-weights', { weights, side })
      computed.push({ line: null, side, ...numbersOf(facts) })
    }
  } catch (error) {
    if (!(error instanceof Refusal)) throw error
    return { computed: [], problems: [{ line: null, code: error.code, message: error.message }] }
  }
  return { computed, problems: [] }
}

const numbersOf = ({ key, h11, h21 }: PolytopeFacts) => ({ key, h11, h21 })

async function namesOf(
  manager: EntityManager,
  viewer: Viewer,
  keys: readonly string[],
): Promise<Map<string, string>> {
  if (keys.length === 0) return new Map()
  const held = await visible(manager, viewer, {}).andWhere('polytope.key IN (:...keys)', { keys }).getMany()
  const own = await ownNames(manager, viewer, held)
  return new Map(held.map(({ key, name }) => [key, own.get(key) ?? name]))
}
