import type { EntityManager } from 'typeorm'
import type { VerdictsGiven } from '../../shared/verdicts.ts'
import type { ServerContext } from '../context.ts'
import { Verdict } from '../entities/verdict.ts'
import { insertVerdicts, verdictsById } from './verdicts.ts'
import { tell } from './verdictGiving.ts'

/**
 * Takes back verdicts of one's own, each as long as it is the one that stands. Nothing is erased: an entry says that it was
 * undone and what stands again. Verdicts can be taken back one after the other, to the first.
 */
export async function undoVerdicts(
  context: ServerContext,
  campaignId: string,
  accountId: string,
  ids: readonly string[],
): Promise<VerdictsGiven> {
  const { writes } = context
  const refused: VerdictsGiven['refused'] = []
  const made = await writes.transaction(async (manager) => {
    const asked = await verdictsById(manager, ids.map(Number).filter(Number.isSafeInteger))
    const entries = asked.filter((entry) => entry.campaignId === campaignId)
    const histories = await historiesOf(manager, campaignId, entries)
    const undone: Partial<Verdict>[] = []
    for (const entry of entries) {
      const history = histories.get(placeOf(entry)) ?? []
      const why = whyNot(entry, history, accountId)
      if (why) {
        refused.push({ candidateKey: entry.candidateKey, ...why })
        continue
      }
      undone.push(undoing(entry, history, accountId))
    }
    return insertVerdicts(manager, undone)
  })
  return tell(context, campaignId, made, refused)
}

const placeOf = ({ candidateKey, targetVersion }: Pick<Verdict, 'candidateKey' | 'targetVersion'>) =>
  `${candidateKey} ${targetVersion?.targetId ?? ''}`

/** All entries of the same candidates, by candidate and target, oldest first. */
async function historiesOf(
  manager: EntityManager,
  campaignId: string,
  entries: readonly Verdict[],
): Promise<Map<string, Verdict[]>> {
  const all = await manager
    .createQueryBuilder(Verdict, 'verdict')
    .innerJoinAndSelect('verdict.targetVersion', 'version')
    .where('verdict.campaignId = :campaignId', { campaignId })
    .andWhere('verdict.candidateKey IN (SELECT value FROM json_each(:keys))', {
      keys: JSON.stringify(entries.map(({ candidateKey }) => candidateKey)),
    })
    .orderBy('verdict.id', 'ASC')
    .getMany()
  const histories = new Map<string, Verdict[]>()
  for (const entry of all) {
    const place = placeOf(entry)
    const history = histories.get(place)
    if (history) history.push(entry)
    else histories.set(place, [entry])
  }
  return histories
}

/** The entry whose word stands: the last one given that was not taken back. */
function standingIn(history: readonly Verdict[]): number | null {
  const last = history.at(-1)
  if (!last) return null
  return last.undoesId === null ? last.id : last.restoresId
}

function whyNot(
  entry: Verdict,
  history: readonly Verdict[],
  accountId: string,
): { code: string; message: string } | null {
  if (entry.undoesId !== null) {
    return { code: 'is-an-undo', message: 'An undo is not undone: give the verdict again.' }
  }
  if (entry.authorId !== accountId) {
    return {
      code: 'not-yours',
      message: 'Only the person who gave a verdict takes it back; give another one.',
    }
  }
  return standingIn(history) === entry.id
    ? null
    : { code: 'overtaken', message: 'This verdict does not stand any more: another one came after it.' }
}

/** The entry that takes another back: it says what was said before that one. */
function undoing(entry: Verdict, history: readonly Verdict[], accountId: string): Partial<Verdict> {
  const before = history[history.findIndex(({ id }) => id === entry.id) - 1]
  return {
    campaignId: entry.campaignId,
    candidateKey: entry.candidateKey,
    targetVersionId: before?.targetVersionId ?? entry.targetVersionId,
    value: before?.value ?? 'undecided',
    reason: before?.reason ?? '',
    override: before?.override ?? false,
    certificateId: before?.certificateId ?? null,
    readers: before?.readers ?? null,
    authorId: accountId,
    createdAt: new Date().toISOString(),
    undoesId: entry.id,
    restoresId: before ? (before.undoesId === null ? before.id : before.restoresId) : null,
  }
}
